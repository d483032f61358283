"""Sums with Bessel kernels of large arguments, against Bessel functions one by one."""

import mpmath
import numpy as np
import pytest
from scipy.special import jv

from fastaxis.engines.azimuthal.far import HIGHEST, amplitudes, far_from, far_runs, far_sums
from fastaxis.engines.azimuthal.panels import NODES, ORDER

BORDERS = np.linspace(2.0, 8.0, 13)
RHO = ((BORDERS[1:] + BORDERS[:-1])[:, None] / 2 + np.diff(BORDERS)[:, None] / 2 * NODES).ravel()


@pytest.mark.parametrize("order", range(HIGHEST + 1))
def test_each_kernel_against_many_digits(order):
    """Values that pick one node each; the first argument is the smallest that is allowed."""
    picked = [0, 1, 31, 100, len(RHO) - 1]
    values = np.zeros((len(picked), len(RHO)), dtype=complex)
    values[np.arange(len(picked)), picked] = 1
    radii = far_from(order) / BORDERS[0] * np.array([1.0, 1.3, 4.0, 17.0])
    sums = far_sums(order, 1.0, radii, BORDERS, values.reshape(len(picked), -1, ORDER))
    with mpmath.workdps(30):
        exact = [[float(mpmath.besselj(order, mpmath.mpf(r) * mpmath.mpf(RHO[i]))) for r in radii] for i in picked]
    # Some ten roundings of 1, and angles x up to 6000 rounded as eps x, times sqrt(2/pi x).
    x = np.multiply.outer(RHO[picked], radii)
    assert (abs(sums - exact) <= 3e-15 + 2.2e-16 * np.sqrt(x)).all()


def test_sums_of_several_functions_are_those_of_a_kernel():
    rng = np.random.default_rng(4)
    values = rng.normal(size=(3, len(RHO))) + 1j * rng.normal(size=(3, len(RHO)))
    radii = np.sort(rng.uniform(10, 50, 40))
    kernel = jv(2, 1.5 * np.multiply.outer(radii, RHO))
    sums = far_sums(2, 1.5, radii, BORDERS, values.reshape(3, -1, ORDER))
    # 400 terms of order 0.05 with the roundings of the kernels.
    assert abs(sums - values @ kernel.T).max() < 1e-13


def test_amplitudes_begin_with_the_series_in_one_over_x():
    """P = 1 - ..., Q = (4 l^2 - 1)/8x: DLMF 10.17.1."""
    for order in (0, 1, 3):
        series = amplitudes(order)
        assert series[:2] == pytest.approx([1, (4 * order**2 - 1) / 8 / far_from(order)], rel=1e-11)


def test_runs_have_large_arguments_and_one_width():
    widths = np.array([1.0] * 20 + [2.0] * 20)
    borders = np.append(0, np.cumsum(widths))
    radii = np.linspace(far_from(1) / 4, 10, 100)
    assert far_runs(1, 1.0, radii, borders) == [slice(4, 20), slice(20, 40)]
    assert far_runs(HIGHEST + 1, 1e6, radii, borders) == []
    assert far_runs(1, 1.0, radii[:1], borders) == []
