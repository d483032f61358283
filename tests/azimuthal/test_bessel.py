import mpmath
import numpy as np
import pytest

from fastaxis.engines.azimuthal.bessel import bessel


@pytest.mark.parametrize("order", [0, 1, 2, 3, 7, 20, 60])
def test_against_many_digits(order):
    x = np.array([0.0, 1e-3, 0.5 * order, order - 0.1, order + 0.1, 2.0 * order + 1, 100.0, 3000.0])
    x = x[x >= 0]
    exact = np.array([float(mpmath.besselj(order, mpmath.mpf(float(v)))) for v in x])
    # The argument's own rounding moves the fringes by eps x, next to some ten roundings of the climb.
    assert np.all(abs(bessel(order, x) - exact) <= 4e-15 + 2e-16 * x * 0.1)
