"""Counting lobes and reading their angle."""

import math

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fastaxis.analysis import lobes
from fastaxis.errors import ParameterError

keep_plane = settings(max_examples=25, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])


def petals(plane, order, angle):
    """The ring of two modes of charge +order/2 and -order/2: order lobes, dark between them."""
    return plane.r**order * np.exp(-2 * plane.r**2) * np.cos(order * (plane.phi - angle) / 2) ** 2


@pytest.mark.parametrize("order", [1, 2, 3, 4, 5, 6, 8, 10])
def test_the_number_of_petals_is_counted(plane, order):
    found = lobes(petals(plane, order, 0.2), **plane.axes)
    assert found.count == order
    # The picture reaches 2.7 w, where exp(-2 r^2) r^10 is still 1e-3 of its peak: the taper leaves the rest.
    assert found.angle == pytest.approx(0.2, abs=1e-6)


@given(angle=st.floats(0, math.pi - 1e-3))
@keep_plane
def test_the_angle_of_two_lobes_is_read_anywhere(plane, angle):
    # A smooth picture summed on w/15 is exact to the tail beyond its edge, exp(-2 * 2.7^2) = 5e-7.
    assert lobes(petals(plane, 2, angle), **plane.axes).angle == pytest.approx(angle, abs=1e-6)


def test_cosine_squared_lobes_have_contrast_one(plane):
    assert lobes(petals(plane, 2, 0.7), **plane.axes).contrast == pytest.approx(1, abs=1e-6)


def test_a_constant_beside_the_lobes_lowers_the_contrast(plane):
    ring = plane.r**2 * np.exp(-2 * plane.r**2)
    half = ring * (1 + 0.5 * np.cos(2 * plane.phi))
    assert lobes(half, **plane.axes).contrast == pytest.approx(0.5, abs=1e-6)


@pytest.mark.parametrize("power", [0, 1, 4])
def test_round_pictures_have_no_lobes(plane, power):
    found = lobes(plane.r**power * np.exp(-2 * plane.r**2), **plane.axes)
    assert found.count == 0
    assert math.isnan(found.angle)
    assert found.contrast < 1e-3


def test_a_full_sensor_has_no_lobes_though_it_is_square(plane):
    assert lobes(np.ones((81, 101)), **plane.axes).count == 0


def test_a_round_spot_beside_the_axis_is_round(plane):
    spot = np.exp(-2 * ((plane.X - 0.4) ** 2 + (plane.Y + 0.2) ** 2))
    assert lobes(spot, **plane.axes).count == 0


def test_one_bright_side_is_one_lobe(plane):
    # A flat and a charge-one mode of one state: dark at one side of the axis, bright at the other.
    one = np.exp(-2 * plane.r**2) * np.abs(1 + 1.2 * plane.r * np.exp(1j * (plane.phi - 0.5))) ** 2
    found = lobes(one, **plane.axes)
    assert (found.count, found.angle) == (1, pytest.approx(0.5, abs=1e-6))


def test_narrow_lobes_are_not_taken_for_their_overtones(plane):
    narrow = sum(np.exp(-30 * ((plane.X - np.cos(a)) ** 2 + (plane.Y - np.sin(a)) ** 2)) for a in (0.3, 0.3 + math.pi))
    assert lobes(narrow, **plane.axes).count == 2


def test_lobes_are_counted_about_the_centre_asked_for(plane):
    X, Y = plane.X - 0.5, plane.Y
    shifted = X**2 * np.exp(-2 * (X**2 + Y**2))
    found = lobes(shifted, **plane.axes, centre=(0.5, 0.0))
    assert (found.count, found.contrast) == (2, pytest.approx(1, abs=1e-5))


def test_a_lobe_at_zero_is_at_zero_and_not_at_one_spacing(plane):
    for order in (1, 2, 4, 5):
        assert lobes(petals(plane, order, 0.0), **plane.axes).angle == pytest.approx(
            0, abs=1e-12
        )  # sums of 8181 roundings


@pytest.mark.parametrize("frame", [np.zeros((81, 101)), np.full((81, 101), np.nan)])
def test_darkness_has_no_lobes(plane, frame):
    assert lobes(frame, **plane.axes).count == 0


def test_a_single_pixel_has_no_lobes():
    assert lobes([[1.0]], x=[0.0], y=[0.0]).count == 0


def test_a_centre_outside_the_picture_is_refused(plane):
    with pytest.raises(
        ParameterError, match=r"centre = \(9 m, 0 m\), .*; the centre lies inside the picture \(fix: centre="
    ):
        lobes(np.ones((81, 101)), **plane.axes, centre=(9.0, 0.0))


def test_axes_that_do_not_belong_to_the_picture_are_refused(plane):
    with pytest.raises(
        ParameterError, match=r"picture of shape \(81, 101\), x of 81, y of 101; a picture has rows along y"
    ):
        lobes(np.ones((81, 101)), x=plane.y, y=plane.x)


def test_large_pictures_are_binned_and_small_spots_in_them_are_not_lost():
    axis = (np.arange(1600) - 799.5) / 1600
    X, Y = np.meshgrid(axis, axis)
    for w in (0.3, 0.02):  # 480 and 32 pixels
        u = X * math.cos(0.4) + Y * math.sin(0.4)
        found = lobes(u**2 * np.exp(-2 * (X**2 + Y**2) / w**2), x=axis, y=axis)
        # The wider beam is cut at 1.67 w, where a round taper still leaves the sum of a cosine alone.
        assert (found.count, found.angle) == (2, pytest.approx(0.4, abs=1e-4))


def test_light_in_the_corners_alone_says_nothing(plane):
    corner = np.zeros((81, 101))
    corner[0, 0] = 1.0
    assert lobes(corner, **plane.axes).count == 0


@pytest.mark.parametrize("w", [1.0, 2.0, 3.0, 5.0])
def test_a_round_ring_of_few_pixels_is_round(w):
    axis = np.arange(-12, 13) / w
    r2 = axis**2 + axis[:, None] ** 2
    assert lobes(r2 * np.exp(-2 * r2), x=axis, y=axis).count == 0


def test_stripes_are_no_number_of_lobes(plane):
    found = lobes(np.exp(-2 * plane.r**2) * (1 - np.cos(12 * plane.X)), **plane.axes)
    assert (found.count, found.kind) == (0, "other")


def test_each_picture_is_told_by_its_kind(plane):
    beside = np.exp(-2 * ((plane.X - 0.4) ** 2 + (plane.Y + 0.2) ** 2))
    pictures = (np.zeros((81, 101)), np.exp(-2 * plane.r**2), beside, petals(plane, 3, 0.2))
    assert [lobes(one, **plane.axes).kind for one in pictures] == ["dark", "round", "beside", "lobes"]
