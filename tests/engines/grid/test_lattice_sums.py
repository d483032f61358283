import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import integrate, special

from fastaxis.engines.grid.lattice_sums import factors, reach

offsets = st.floats(-0.5, 0.5)
charges = st.sampled_from([1, 2, 3, 4, 5, 8, 12, 20])


def plane(charge, x, y, size):
    """(places from the point, what stands for exp(il phi)) on (2 size + 1)^2 samples."""
    places = np.arange(-size, size + 1) + x + 1j * (np.arange(-size, size + 1)[:, None] + y)
    values, half = np.exp(1j * charge * np.angle(places)), int(np.ceil(reach(charge)))
    block = slice(size - half, size + half + 1)
    values[block, block] = factors(charge, x, y, half)
    return places, values


@settings(max_examples=25, deadline=None)
@given(charges, offsets, offsets)
def test_a_sum_of_twists_unwound_is_its_integral(charge, x, y):
    """The integral of exp(il phi) conj(z)^l exp(-r^2/w^2) is pi w^(l+2) Gamma(l/2 + 1); of polynomials up to degree 4
    sums are exact, of this bell what is left goes as w^-7: some times 4e-9."""
    w = 16.0
    z, values = plane(charge, x, y, 90 + 2 * charge)
    bell = np.exp(-(abs(z) ** 2) / w**2) * (z.conj() / w) ** charge
    exact = np.pi * w**2 * special.gamma(charge / 2 + 1)
    assert np.sum(values * bell) == pytest.approx(exact, rel=(2 / w) ** 7)


@settings(max_examples=25, deadline=None)
@given(charges, offsets, offsets)
def test_a_sum_of_twists_about_the_middle_of_a_bell_is_nothing(charge, x, y):
    z, values = plane(charge, x, y, 130)
    # Point values of charge 4 leave 1, of order 2. The first term left here is of order 7: some times 20^-5 = 3e-7, more
    # where the phase is still steep at 20 samples.
    assert abs(np.sum(values * np.exp(-(abs(z) ** 2) / 20**2))) < 1e-7 * (1 + (charge / 5) ** 4)


@pytest.mark.parametrize("charge", [1, 2, 3, 4, 7, 12])
@pytest.mark.parametrize("place", [(0.5, 0.5), (0.0, 0.0), (0.37, -0.12)])
def test_sums_beside_the_middle_of_a_bell_converge_to_seventh_order(charge, place):
    """A bell of width w at a distance of 0.7 w: 2 pi exp(il phi_s - s^2) int I_l(2rs) exp(-r^2) r dr in units of w."""
    s = 0.7
    radial, _ = integrate.quad(
        lambda r: special.ive(charge, 2 * r * s) * np.exp(2 * r * s - r * r - s * s) * r, 0, 9, epsabs=1e-14
    )
    exact, errors = 2 * np.pi * radial * np.exp(1j * charge * 0.4), []
    widths = np.array([8.0, 12.0, 16.0, 24.0]) * max(charge / 4, 1)
    for w in widths:
        z, values = plane(charge, *place, int(7 * w))
        errors.append(abs(np.sum(values * np.exp(-(abs(z / w - s * np.exp(0.4j)) ** 2))) / w**2 - exact))
    falling = np.array(errors) > 1e-13  # below, sums round
    assert -np.polyfit(np.log(widths[falling]), np.log(np.array(errors)[falling]), 1)[0] > 6.5


@settings(max_examples=25, deadline=None)
@given(charges, offsets, offsets)
def test_samples_further_off_are_point_values(charge, x, y):
    half = 2 * int(np.ceil(reach(charge)))
    found = factors(charge, x, y, half)
    places = np.arange(-half, half + 1) + x + 1j * (np.arange(-half, half + 1)[:, None] + y)
    far = abs(places) > reach(charge)
    assert np.allclose(found[far], np.exp(1j * charge * np.angle(places[far])), rtol=0, atol=1e-13)
    # Where the phase turns by 6 rad and more from one sample to the next, next to no wave of the samples is left.
    steep = abs(places) < charge / 6 - 1
    assert np.all(abs(found[steep]) < 0.4)


def test_a_mirrored_place_gives_mirrored_values():
    here, below, beside = (factors(3, x, y, 3) for x, y in ((0.2, 0.4), (0.2, -0.4), (-0.2, 0.4)))
    # Some 10^3 terms of up to (r/reach)^4 = 10^3, each rounded.
    assert np.allclose(here, below[::-1].conj(), rtol=0, atol=1e-10)
    assert np.allclose(here, -beside[:, ::-1].conj(), rtol=0, atol=1e-10)
