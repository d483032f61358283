import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.light import elliptical
from fastaxis.report.glyphs import Glyphs

TURN = np.linspace(0, 1, 33)


def glyph(azimuth, ellipticity):
    one = np.ones(1)
    return Glyphs(0 * one, 0 * one, azimuth * one, ellipticity * one, one)


def turning(points):
    """Signed area: positive for counter-clockwise."""
    x, y = np.asarray(points).T
    return float(np.sum(x[:-1] * y[1:] - x[1:] * y[:-1]) / 2)


@settings(max_examples=40, deadline=None)
@given(st.floats(-1.5, 1.5), st.floats(-0.75, 0.75))
def test_the_curve_is_the_path_of_the_field(azimuth, ellipticity):
    """The tip of Re(E exp(-i w t)), in shape, slant and order of time."""
    jones = elliptical(azimuth, ellipticity).jones
    field = np.real(np.asarray(jones)[None, :] * np.exp(-2j * np.pi * TURN)[:, None])
    curve = glyph(azimuth, ellipticity).curve(TURN)[0] * np.cos(ellipticity)
    # A few roundings of sines of order one.
    assert np.allclose(curve, field, atol=1e-14)


def test_right_handed_light_runs_clockwise():
    assert turning(glyph(0.3, 0.5).curve(TURN)[0]) < 0
    assert turning(glyph(0.3, -0.5).curve(TURN)[0]) > 0


def test_the_arrow_points_the_way_the_field_runs():
    here = glyph(0.4, 0.6)
    tip, left, right = here.arrow_heads(0.2)[0]
    ahead = tip - (left + right) / 2
    before, after = here.curve(np.array([0.13, 0.15]))[0]
    assert ahead @ (after - before) / np.linalg.norm(ahead) / np.linalg.norm(after - before) > 0.99
