"""Shares of Gaussian beams inside stops: closed forms, and sums over a fine grid."""

import math

import numpy as np
import pytest

from fastaxis.inspect.clear_area import passed
from fastaxis.laws import Annulus, Disc, HalfPlane, Rectangle, Strip
from fastaxis.plan.spread import Spread

W = 1e-3
BEAM = Spread(W / 2, 0.0, 1e-4)
BESIDE = Spread(W / 2, 0.0, 1e-4, offset=(0.4e-3, -0.2e-3))


def summed(stop, centre, spread):
    """Irradiance 2/(pi w^2) exp(-2 r^2/w^2) summed where the stop is clear."""
    side = np.linspace(-5e-3, 5e-3, 2001)
    x, y = np.meshgrid(side, side)
    x0, y0 = spread.offset
    light = 2 / (math.pi * W**2) * np.exp(-2 * ((x - x0) ** 2 + (y - y0) ** 2) / W**2)
    clear = stop.depth(x - centre[0], y - centre[1]) >= 0
    return float((light * clear).sum() * (side[1] - side[0]) ** 2)


def test_a_centred_hole_passes_what_the_handbook_says():
    # 1 - exp(-2 a^2/w^2): three roundings
    assert passed(Disc(W), (0, 0), BEAM) == pytest.approx(1 - math.exp(-2), rel=1e-14)
    assert passed(Disc(1.5 * W), (0, 0), BEAM) == pytest.approx(1 - math.exp(-4.5), rel=1e-14)


STOPS = [
    Disc(0.7e-3),
    Disc(0.7e-3, opaque=True),
    Annulus(0.3e-3, 0.9e-3),
    Rectangle(0.8e-3, 1.4e-3),
    Strip(0.5e-3, math.pi / 6, math.cos(math.pi / 6), math.sin(math.pi / 6)),
    HalfPlane(0.3, math.cos(0.3), math.sin(0.3)),
]


@pytest.mark.parametrize("spread", [BEAM, BESIDE], ids=["centred", "beside"])
@pytest.mark.parametrize("stop", STOPS, ids=lambda stop: type(stop).__name__)
def test_every_stop_agrees_with_a_sum_over_the_plane(stop, spread):
    # The sum counts cells of 5 um whole: an edge of length s is off by at most s * 2.5 um * peak irradiance,
    # 2.5 um * 4 mm * 2/(pi w^2) = 6e-3; cells on both sides cancel to a tenth of that.
    centre = (0.1e-3, 0.05e-3)
    assert passed(stop, centre, spread) == pytest.approx(summed(stop, centre, spread), abs=2e-3)


def test_a_plane_wave_counts_as_passed():
    assert passed(Disc(1e-3), (0, 0), Spread(math.inf, 0.0, 0.0)) == 1.0
