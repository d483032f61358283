import numpy as np
import pytest

from fastaxis.laws import Amplitude, AxisLaw, ScalarLaw
from fastaxis.maths import NUMBERS, Pattern
from fastaxis.plan.gather_flips import seen_before_flip


@pytest.mark.parametrize("axis", ["x", "y"])
@pytest.mark.parametrize("q", [0.5, 1, -1.5])
def test_a_q_plate_behind_a_flip_is_seen_at_the_reversed_place(axis, q):
    law = AxisLaw(Amplitude(1.0, -0.8), Amplitude(1.0, 0.8), 0.3, q, (0.1, -0.2))
    before = seen_before_flip(law, axis)
    for x, y in [(0.4, 0.9), (-0.7, 0.2), (0.5, -0.6)]:
        fx, fy = (-x, y) if axis == "x" else (x, -y)
        assert np.allclose(_matrix(before, x, y), _matrix(law, fx, fy), atol=1e-14)  # a few roundings of angles


@pytest.mark.parametrize("axis", ["x", "y"])
def test_patterns_are_looked_up_at_the_reversed_place(axis):
    law = AxisLaw(Amplitude(1.0, Pattern(lambda x, y: x + 2 * y)), angle=Pattern(lambda x, y: x * y + x))
    before = seen_before_flip(law, axis)
    x, y = 0.3, 0.8
    fx, fy = (-x, y) if axis == "x" else (x, -y)
    assert np.allclose(_matrix(before, x, y), _matrix(law, fx, fy), atol=1e-15)


def test_a_spiral_plate_changes_hand_behind_a_flip():
    law = seen_before_flip(ScalarLaw(charge=3), "x")
    phase = law.charge * 0.4 + law.transmission.phase
    assert np.exp(1j * phase) == pytest.approx(np.exp(3j * (np.pi - 0.4)), abs=1e-14)


def _matrix(law, x, y):
    x, y = x - law.centre[0], y - law.centre[1]
    return np.array(law.linear(NUMBERS, np.arctan2(y, x), x, y))
