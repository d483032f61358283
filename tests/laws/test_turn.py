import math

import pytest

from fastaxis.laws import Flip, Passage, Turn


def moved(laws, x, y):
    for law in laws:
        if isinstance(law, Flip):
            x, y = (-x, y) if law.axis == "x" else (x, -y)
        else:
            c, s = math.cos(law.angle), math.sin(law.angle)
            x, y = c * x - s * y, s * x + c * y
    return x, y


@pytest.mark.parametrize("laws", [(Turn(0.4),), (Flip("y"), Turn(0.4)), (Turn(-1.0), Flip("x"), Turn(0.2))])
def test_the_way_back_brings_a_ray_to_where_it_started(laws):
    x, y = moved(laws, 0.3, -0.7)
    back = Passage(laws).backward().laws
    assert moved(back, -x, y) == pytest.approx((-0.3, -0.7), abs=1e-15)  # x counts the other way


@pytest.mark.parametrize("axis", ["x", "y"])
def test_seen_in_a_reversed_frame_it_turns_the_other_way(axis):
    flip = Flip(axis)
    there = moved((flip, Turn(0.4).mirrored(axis), flip), 0.3, -0.7)
    assert there == pytest.approx(moved((Turn(0.4),), 0.3, -0.7), abs=1e-15)


def test_it_carries_its_angle():
    assert Turn(0.4).values == (0.4,)
    assert not Turn(0.4).uniform
