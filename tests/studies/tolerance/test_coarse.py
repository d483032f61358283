"""Frames in blocks against the frames themselves."""

import numpy as np
import pytest

from fastaxis.analysis import lobes
from fastaxis.studies.tolerance.coarse import coarse
from fastaxis.units import deg, um


def petals(count, angle, *, side=256, waist=100 * um, place=(0.0, 0.0)):
    """Lobes r^2 exp(-2 r^2/w^2) (1 + cos(count (phi - angle))) on pixels of 3.45 um, the camera beside the axis."""
    axis = (np.arange(side) - (side - 1) / 2) * 3.45 * um
    x, y = axis + place[0], axis + place[1]
    r2, phi = x**2 + y[:, None] ** 2, np.arctan2(y[:, None], x)
    return r2 * np.exp(-2 * r2 / waist**2) * (1 + np.cos(count * (phi - angle))), x, y


@pytest.mark.parametrize("count", [2, 4, 10])
@pytest.mark.parametrize("place", [(0.0, 0.0), (40 * um, -25 * um)])
def test_lobes_stand_where_they_stood_and_are_as_many(count, place):
    frame, x, y = petals(count, 7.3 * deg, place=place)
    few, across, down = coarse(frame, x, y)
    assert few.size < frame.size / 3
    found, before = lobes(few, x=across, y=down), lobes(frame, x=x, y=y)
    assert found.count == before.count == count
    # What square pixels do to an angle, some 1e-7 for lobes many pixels wide and 1e-4 for those of some pixels.
    assert found.angle == pytest.approx(before.angle, abs=1e-7 if count < 10 else 1e-4)


def test_light_is_added_up_and_keeps_its_middle():
    frame, x, y = petals(2, 0.0, place=(40 * um, -25 * um))
    few, across, down = coarse(frame, x, y)
    # The outermost pixels that make no whole block hold nothing here: exp(-2 (400/100)^2).
    assert few.sum() == pytest.approx(frame.sum(), rel=1e-6)
    assert few.sum(axis=0) @ across == pytest.approx(frame.sum(axis=0) @ x, rel=1e-3)
    assert few.sum(axis=1) @ down == pytest.approx(frame.sum(axis=1) @ y, rel=1e-3)


def test_few_pixels_of_light_and_darkness_stay_as_they_are():
    frame, x, y = petals(2, 0.0, side=32, waist=15 * um)
    assert coarse(frame, x, y)[0] is frame
    dark = np.zeros((64, 64))
    assert coarse(dark, np.arange(64.0), np.arange(64.0))[0] is dark
    assert coarse(np.ones((1, 1)), np.zeros(1), np.zeros(1))[0].size == 1
