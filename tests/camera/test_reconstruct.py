"""Stokes images from frames, and what a wrongly assumed instrument does to them."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.camera import (
    SIX_STATES,
    condition_number,
    four_frames,
    plate_harmonics,
    plate_then_polarizer,
    polarizer_at,
    reconstruct,
    rotating_plate,
)
from fastaxis.camera.settings import as_settings, weight_matrix
from fastaxis.errors import ParameterError
from fastaxis.light.states import H, R
from fastaxis.units import deg

EPS = np.finfo(float).eps
SETS = {
    "six": SIX_STATES,
    "four": four_frames(),
    "plate": rotating_plate(5),
    "odd": rotating_plate(7, retardance=132 * deg, axis=20 * deg, extinction=30),
}


@pytest.mark.parametrize("name", SETS)
@given(vector=st.tuples(*[st.floats(-1, 1)] * 3))
@settings(max_examples=20, deadline=None)
def test_frames_give_back_the_light_they_were_made_of(name, vector):
    stokes = np.array([2.0, *vector])
    found = reconstruct(weight_matrix(as_settings(SETS[name])) @ stokes, SETS[name])
    # Roundings of a few sums, enlarged by the condition number of the set (below 10).
    np.testing.assert_allclose(found.stokes, stokes, atol=10 * 20 * EPS)
    assert found.residual == pytest.approx(0, abs=10 * 20 * EPS)


def test_maps_are_reduced_pixel_by_pixel(shots):
    found = reconstruct(shots.frames, shots.settings)
    np.testing.assert_allclose(found.stokes, shots.stokes, atol=20 * EPS * shots.stokes[0].max())
    # Far out the light is a thousandth of the peak; a degree is a ratio of roundings that much larger.
    np.testing.assert_allclose(found.degree, 1, atol=1e4 * EPS)


def test_the_residual_shows_a_frame_that_does_not_fit():
    found = reconstruct([1.2, 0, 0.5, 0.5, 0.5, 0.5], SIX_STATES)
    # H + V = 1.2 while the other pairs say 1.0.
    assert found.residual > 0.03


def test_no_set_conditions_better_than_the_square_root_of_three():
    # The singular values are square roots of simple fractions, known to a few roundings.
    assert condition_number(SIX_STATES) == pytest.approx(math.sqrt(3), rel=20 * EPS)
    assert condition_number(four_frames()) > math.sqrt(3)
    assert condition_number(rotating_plate(4)) == math.inf
    assert condition_number([H]) == math.inf


@pytest.mark.parametrize(
    ("analyzers", "blind"),
    [
        (rotating_plate(4), "S2"),  # sin 4t is zero at 0, 45, 90 and 135 deg
        ([polarizer_at(a * deg) for a in (0, 45, 90, 135)], "S3"),
    ],
)
def test_sets_that_miss_a_component_are_refused_by_its_name(analyzers, blind):
    with pytest.raises(ParameterError, match=rf"4 settings of rank 3; .*do not see {blind} \(fix: fa.rotating_plate"):
        reconstruct(np.ones(4), analyzers)


def test_too_few_settings_are_refused():
    with pytest.raises(ParameterError, match="1 settings of rank 1"):
        reconstruct(np.ones(1), R)


@pytest.mark.parametrize(
    ("frames", "message"), [(np.ones(5), "5 frames for 6 settings"), (1.0, "one number for 6 settings")]
)
def test_each_frame_has_its_setting(frames, message):
    with pytest.raises(ParameterError, match=message + "; each frame has its setting"):
        reconstruct(frames, SIX_STATES)


@pytest.mark.parametrize("count", [5, 8, 64])
def test_harmonics_and_least_squares_agree_for_a_perfect_plate(count):
    plates = rotating_plate(count)
    frames = weight_matrix(as_settings(plates)) @ [1.0, 0.3, -0.4, 0.5]
    by_sums = plate_harmonics(frames, [s.laws[0].angle for s in plates])
    np.testing.assert_allclose(by_sums.stokes(), reconstruct(frames, plates).stokes, atol=50 * EPS)
    assert by_sums.cos2 == pytest.approx(0, abs=50 * EPS)


def test_harmonics_of_maps_keep_their_shape(shots):
    fast = np.arange(6) * 30 * deg
    frames = np.stack([shots.frame(plate_then_polarizer(fast=t)) for t in fast])
    np.testing.assert_allclose(
        plate_harmonics(frames, fast).stokes(), shots.stokes, atol=50 * EPS * shots.stokes[0].max()
    )


@pytest.mark.parametrize("fast", [np.arange(4) * 45 * deg, np.arange(8) * 10 * deg, np.arange(6) * 60 * deg])
def test_angles_whose_sums_mix_harmonics_are_refused(fast):
    with pytest.raises(
        ParameterError, match=rf"{len(fast)} angles; the harmonics need 5 or more angles in equal steps"
    ):
        plate_harmonics(np.ones(len(fast)), fast)
