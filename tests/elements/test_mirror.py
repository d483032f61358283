import cmath
import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import Mirror
from fastaxis.maths import NUMBERS

ROUNDING = 1e-14  # one 2x2 matrix
WAYS = ("front", "front")
folds = st.sampled_from(["horizontal", "vertical"])
mirrors = st.builds(
    Mirror, fold=folds, Rp=st.floats(0, 1), Rs=st.floats(0, 1), phase_p=st.floats(-6, 6), phase_s=st.floats(-6, 6)
)


def test_ideal_mirror(jones):
    assert jones(Mirror(), WAYS) == pytest.approx(np.diag([1, -1]), abs=0)


def test_straight_return_is_the_same_light_by_either_fold(jones):
    # The two frames of the returning beam differ by half a turn, which reverses both components (and both x and y).
    half_turn = -np.eye(2)
    assert jones(Mirror(fold="vertical"), WAYS) == pytest.approx(half_turn @ jones(Mirror(), WAYS), abs=0)


def test_p_lies_in_the_plane_of_the_fold(jones):
    made = {"Rp": 0.64, "Rs": 0.81, "phase_p": 0.2, "phase_s": -0.1}
    p, s = 0.8 * cmath.exp(0.2j), 0.9 * cmath.exp(-0.1j)
    assert jones(Mirror(**made), WAYS) == pytest.approx(np.diag([p, -s]), abs=ROUNDING)
    assert jones(Mirror(fold="vertical", **made), WAYS) == pytest.approx(np.diag([-s, p]), abs=ROUNDING)


@settings(max_examples=50, deadline=None)
@given(mirrors)
def test_passive_and_the_same_both_ways(jones, mirror):
    matrix = jones(mirror, WAYS)
    assert np.linalg.norm(matrix, 2) <= 1 + ROUNDING
    way = mirror.passages(5e-7)[WAYS]
    assert way.backward().reflected == way.reflected
    back = np.array(way.backward().laws[0].linear(NUMBERS), dtype=complex)
    assert back == pytest.approx(np.diag([-1, 1]) @ matrix.T @ np.diag([-1, 1]), abs=ROUNDING)


@settings(max_examples=50, deadline=None)
@given(folds)
def test_two_reflections_restore(jones, fold):
    matrix = jones(Mirror(fold=fold), WAYS)
    assert matrix @ matrix == pytest.approx(np.eye(2), abs=0)


def test_numbers_agree_with_letters(agrees):
    agrees(Mirror, {"Rp": 0.8, "Rs": 0.9, "phase_p": 0.3, "phase_s": math.pi / 5}, WAYS)
