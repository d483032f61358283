import numpy as np
import pytest
import sympy

from fastaxis.maths import NUMBERS


WAVELENGTH = 532e-9


@pytest.fixture(scope="session")
def jones():
    """The matrix of a part, as numbers, from one face to another."""
    return _jones


def _jones(part, ways=("front", "back"), phi=0.0, x=0.0, y=0.0, wavelength=WAVELENGTH):
    out = np.eye(2, dtype=complex)
    for law in part.passages(wavelength)[ways].laws:
        out = np.array(law.linear(NUMBERS, phi, x, y), dtype=complex) @ out
    return out


@pytest.fixture(scope="session")
def agrees(letters):
    """Whether a part with letters, evaluated, has the matrix of the same part with numbers."""

    def check(make, values, ways=("front", "back"), phi=0.7):
        symbols = {name: sympy.Symbol(name, real=True) for name in values}
        lettered, plain = make(**symbols), make(**values)
        assert {str(symbol) for symbol in lettered.symbols} == set(values)
        matrix = sympy.eye(2)
        for law in lettered.passages(WAVELENGTH)[ways].laws:
            matrix = sympy.Matrix(law.linear(letters, phi)) * matrix
        number = matrix.subs({symbols[name]: value for name, value in values.items()}).evalf()
        # A product of two or three 2x2 matrices, evaluated by two routes.
        assert np.array(number, dtype=complex) == pytest.approx(_jones(plain, ways, phi), abs=1e-14)

    return check
