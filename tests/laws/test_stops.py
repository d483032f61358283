import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.laws import Annulus, Disc, HalfPlane, Rectangle, Strip

places = st.floats(-3, 3)
SHAPES = [
    Disc(1.5),
    Disc(1.5, opaque=True),
    Annulus(0.5, 2.0),
    Rectangle(2.0, 1.0),
    Strip(0.8, 0.6, math.cos(0.6), math.sin(0.6)),
    HalfPlane(0.6, math.cos(0.6), math.sin(0.6)),
]


@pytest.mark.parametrize(
    ("shape", "place", "depth"),
    [
        (Disc(2.0), (0.0, 1.5), 0.5),
        (Disc(2.0, opaque=True), (3.0, 0.0), 1.0),
        (Annulus(1.0, 2.0), (0.0, 1.25), 0.25),
        (Annulus(1.0, 2.0), (0.5, 0.0), -0.5),
        (Rectangle(4.0, 2.0), (1.5, 0.0), 0.5),
        (Rectangle(4.0, 2.0), (0.0, 1.5), -0.5),
        (Strip(2.0, 0.0, 1.0, 0.0), (7.0, 0.25), 0.75),
        (HalfPlane(0.0, 1.0, 0.0), (0.25, 9.0), 0.25),
    ],
)
def test_depth_is_the_signed_distance_to_the_rim(shape, place, depth):
    assert shape.depth(*place) == depth


@pytest.mark.parametrize("shape", SHAPES, ids=lambda shape: type(shape).__name__)
@pytest.mark.parametrize("axis", ["x", "y"])
@settings(max_examples=20, deadline=None)
@given(x=places, y=places)
def test_mirrored_shape_at_the_mirrored_place(shape, axis, x, y):
    there = (-x, y) if axis == "x" else (x, -y)
    # Two products and a sum of numbers up to 3.
    assert shape.mirrored(axis).depth(*there) == pytest.approx(shape.depth(x, y), abs=1e-14)


@pytest.mark.parametrize("shape", SHAPES, ids=lambda shape: type(shape).__name__)
def test_angle_and_its_cosine_stay_together(shape):
    if isinstance(shape, Strip | HalfPlane):
        for axis in ("x", "y"):
            mirrored = shape.mirrored(axis)
            direction = (math.cos(mirrored.angle), math.sin(mirrored.angle))
            assert (mirrored.cosine, mirrored.sine) == pytest.approx(direction, abs=1e-15)


@pytest.mark.parametrize("shape", SHAPES, ids=lambda shape: type(shape).__name__)
def test_round_shapes_do_not_change_when_turned(shape):
    phi = np.linspace(0, 2 * np.pi, 33)
    depth = shape.depth(1.2 * np.cos(phi), 1.2 * np.sin(phi))
    assert (np.ptp(depth) < 1e-14) == shape.round


def test_values():
    assert [len(shape.values) for shape in SHAPES] == [1, 1, 2, 2, 2, 1]
