"""What all tests share: the same random cases each time, so that a green run stays green.

``pytest --hypothesis-profile=search`` draws new cases instead; do that now and then, and before a release.
"""

import pytest
import sympy
from hypothesis import settings

settings.register_profile("repeatable", derandomize=True, deadline=None)
settings.register_profile("search", deadline=None)
settings.load_profile("repeatable")


class SympyMaths:
    """A bare sympy namespace: enough to see that laws and states read the same on symbols."""

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
        return sympy.nsimplify(value)


@pytest.fixture(scope="session")
def letters():
    """The maths namespace of letters."""
    return SympyMaths()
