"""Weights kept for circles, against the spline read point by point."""

import numpy as np
import pytest

from fastaxis.analysis import circles
from fastaxis.analysis.circles import means_on_circles
from fastaxis.analysis.places import on_circles

# 16 neighbours of 128 points, each to some roundings of a picture of order one.
ROUNDED = 1e-14


@pytest.mark.parametrize("centre", [(0.0, 0.0), (0.37, -0.21)])
@pytest.mark.parametrize("pitch", [0.1, 0.13])
def test_means_are_those_of_the_spline_read_point_by_point(centre, pitch):
    x, y = np.arange(-17, 18) * 0.1, np.arange(-14, 15) * pitch
    picture = np.random.default_rng(5).uniform(size=(29, 35))  # noise: every neighbour counts
    # Out to the last row, where the picture is carried on beyond its edge.
    radii = np.linspace(0, min(1.7 - abs(centre[0]), 14 * pitch - abs(centre[1])), 23)
    asked = {"centre": centre, "radii": radii, "count": 128}
    expected = on_circles(picture, x, y, **asked).mean(axis=1)
    assert means_on_circles(picture, x, y, **asked) == pytest.approx(expected, abs=ROUNDED)


def test_weights_are_worked_out_once_for_all_frames_of_a_camera():
    x = np.arange(-10, 11) * 3e-6
    asked = {"centre": (0.0, 0.0), "radii": np.arange(8) * 2e-6, "count": 64}
    circles._weights.cache_clear()
    one, two = (means_on_circles(np.full((21, 21), level), x, x, **asked) for level in (1.0, 2.0))
    assert circles._weights.cache_info().misses == 1
    assert (one, two) == (pytest.approx(1.0, abs=ROUNDED), pytest.approx(2.0, abs=ROUNDED))


def test_circles_of_more_points_than_are_kept_are_read_point_by_point(monkeypatch):
    x = np.arange(-10, 11) * 3e-6
    asked = {"centre": (1e-6, 0.0), "radii": np.arange(8) * 2e-6, "count": 64}
    picture = np.random.default_rng(6).uniform(size=(21, 21))
    kept = means_on_circles(picture, x, x, **asked)
    monkeypatch.setattr(circles, "MOST", 8 * 64 - 1)
    monkeypatch.setattr(circles, "_weights", None)
    assert means_on_circles(picture, x, x, **asked) == pytest.approx(kept, abs=ROUNDED)
