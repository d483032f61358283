"""Sets of settings."""

import numpy as np
import pytest

from fastaxis.camera import SIX_STATES, condition_number, four_frames, rotating_plate
from fastaxis.camera.settings import as_settings, weight_matrix
from fastaxis.errors import ParameterError
from fastaxis.units import deg


def test_each_pair_of_the_six_states_adds_up_to_all_light():
    weights = weight_matrix(as_settings(SIX_STATES))
    for pair in (weights[:2], weights[2:4], weights[4:]):
        np.testing.assert_array_equal(pair.sum(axis=0), [1, 0, 0, 0])


def test_four_frames_measure_everything():
    assert np.linalg.matrix_rank(weight_matrix(as_settings(four_frames()))) == 4


def test_the_plate_turns_in_equal_steps_and_leaves_the_end_out():
    angles = [setting.laws[0].angle for setting in rotating_plate(8, start=10 * deg)]
    # Sums and products of a few angles of order one.
    np.testing.assert_allclose(angles, np.radians(10 + 22.5 * np.arange(8)), atol=8 * np.finfo(float).eps)


def test_half_a_turn_and_a_full_turn_condition_alike():
    half, full = rotating_plate(8), rotating_plate(16, span=360 * deg)
    # A condition number of order 3 from a few roundings.
    assert condition_number(half) == pytest.approx(condition_number(full), rel=1e-13)


def test_parts_of_the_polarimeter_reach_each_setting():
    one = rotating_plate(1, retardance=85 * deg, axis=30 * deg, extinction=100)[0]
    assert one.laws[0].across.phase == 85 * deg / 2
    assert one.laws[1].angle == 30 * deg
    assert one.laws[1].across.power == 0.01


@pytest.mark.parametrize("count", [0, -1, 2.5, True])
def test_the_count_is_a_number_of_frames(count):
    with pytest.raises(ParameterError, match=r"count = .*whole number of frames.*fix: count=16"):
        rotating_plate(count)
