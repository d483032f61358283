"""Widths of pictures, against closed forms of Gaussian beams."""

import math

import numpy as np
import pytest

from fastaxis.analysis import fwhm, radial_profile, ring_radius, widths
from fastaxis.errors import ParameterError


def test_a_tilted_elliptic_gaussian_has_its_moments(plane):
    along, across, tilt, cx, cy = 0.6, 0.3, 0.4, 0.25, -0.1
    u = (plane.X - cx) * math.cos(tilt) + (plane.Y - cy) * math.sin(tilt)
    v = -(plane.X - cx) * math.sin(tilt) + (plane.Y - cy) * math.cos(tilt)
    found = widths(np.exp(-2 * (u / along) ** 2 - 2 * (v / across) ** 2), **plane.axes)
    # Sums of a smooth picture that has died out at the edge are exact to rounding.
    assert found.centroid == pytest.approx((cx, cy), abs=1e-10)
    assert found.principal == pytest.approx((2 * along, 2 * across, tilt), abs=1e-10)
    assert found.xx + found.yy == pytest.approx((along**2 + across**2) / 4, abs=1e-10)


def test_a_gaussian_has_d4sigma_of_two_w(plane):
    found = widths(np.exp(-2 * plane.r**2 / 0.8**2), **plane.axes)
    assert found.d4sigma == pytest.approx((1.6, 1.6), abs=1e-6)  # cut at 2.7: exp(-2 * 11) of the power is missing
    assert found.peak == 1.0


def test_power_is_the_sum_of_the_pixels(plane):
    assert widths(np.full((81, 101), 0.5), **plane.axes).power == pytest.approx(81 * 101 / 2, rel=1e-12)


@pytest.mark.parametrize("charge", [1, 2, 5])
def test_the_ring_of_a_laguerre_gauss_mode_is_at_w_root_half_l(plane, charge):
    ring = plane.r ** (2 * charge) * np.exp(-2 * plane.r**2)
    # Cubic splines on w/15 and a parabola over w/60: measured error 1e-4 at most.
    assert ring_radius(ring, **plane.axes) == pytest.approx(math.sqrt(charge / 2), abs=2e-4)


def test_the_ring_of_an_offset_beam_is_found_about_its_own_centre(plane):
    r2 = (plane.X - 0.3) ** 2 + (plane.Y - 0.2) ** 2
    found = ring_radius(r2 * np.exp(-2 * r2), **plane.axes, centre=(0.3, 0.2))
    assert found == pytest.approx(math.sqrt(0.5), abs=2e-4)


def test_a_spot_is_brightest_at_its_centre(plane):
    assert ring_radius(np.exp(-2 * plane.r**2), **plane.axes) == 0.0


def test_the_half_maximum_diameter_of_a_gaussian_is_1_1774_w(plane):
    # Linear interpolation over w/60: curvature 4/w^2 times step^2/8 over slope 1.7/w gives 1e-4 w.
    assert fwhm(np.exp(-2 * plane.r**2), **plane.axes) == pytest.approx(math.sqrt(2 * math.log(2)), abs=2e-4)


def test_means_over_circles_lose_the_lobes(plane):
    two = plane.X**2 * np.exp(-2 * plane.r**2)
    radii, means = radial_profile(two, **plane.axes)
    np.testing.assert_allclose(means, radii**2 * np.exp(-2 * radii**2) / 2, atol=1e-5)  # cubic splines on w/15


def test_a_picture_that_does_not_fall_to_a_half_has_no_such_width(plane):
    with pytest.raises(ParameterError, match=r"fwhm: 1.00 of the maximum at r = 2\..* m; a half-maximum width needs"):
        fwhm(np.ones((81, 101)), **plane.axes)


@pytest.mark.parametrize("measure", [widths, ring_radius])
def test_darkness_has_no_width(plane, measure):
    with pytest.raises(ParameterError, match=r"picture of power 0; a width needs light \(fix: shots.frame"):
        measure(np.zeros((81, 101)), **plane.axes)
