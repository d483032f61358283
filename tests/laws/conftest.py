import pytest
import sympy


class TinyLetters:
    """A maths namespace of bare sympy, to set against the numbers."""

    half = sympy.Rational(1, 2)

    def phasor(self, angle):
        return sympy.exp(sympy.I * angle)

    def cos(self, angle):
        return sympy.cos(angle)

    def sin(self, angle):
        return sympy.sin(angle)

    def root(self, power):
        return sympy.sqrt(power)

    def number(self, value):
        return sympy.sympify(value)


@pytest.fixture(scope="session")
def letters():
    return TinyLetters()
