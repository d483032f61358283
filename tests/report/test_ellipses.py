import numpy as np
import pytest
from matplotlib.collections import LineCollection, PolyCollection
from matplotlib.colors import to_rgba

from fastaxis.conventions import View
from fastaxis.light.raster import Raster
from fastaxis.report.ellipses import draw_ellipses
from fastaxis.report.style import LEFT, LINEAR, RIGHT


def turning(points):
    """Signed area: positive for counter-clockwise."""
    x, y = np.asarray(points).T
    return float(np.sum(x[:-1] * y[1:] - x[1:] * y[:-1]) / 2)


def drawn(figure, kind, colour):
    return [
        piece
        for group in figure.axes[0].collections
        if type(group) is kind
        and np.allclose(group.get_edgecolor() if kind is LineCollection else group.get_facecolor(), to_rgba(colour))
        for piece in group.get_paths()
    ]


def test_colour_and_arrow_tell_the_sense_on_either_side_of_the_l_line(six_shots):
    figure = draw_ellipses(six_shots)
    ring = 0.6 / np.sqrt(2)
    for colour, sign, outside in ((RIGHT, -1, True), (LEFT, 1, False)):
        curves = drawn(figure, LineCollection, colour)
        assert len(curves) > 10
        assert len(curves) == len(drawn(figure, PolyCollection, colour))
        for path in curves:
            assert np.sign(turning(path.vertices)) == sign
            middle = path.vertices[:-1].mean(axis=0) - [0.2, 0]
            # A block of six pixels of 25 um blurs the line by half its diagonal, 0.11 mm.
            assert np.hypot(*middle) > ring - 0.11 if outside else np.hypot(*middle) < ring + 0.11


def test_the_view_changes_the_names_in_the_legend_and_no_arrow(six_shots):
    here, there = draw_ellipses(six_shots), draw_ellipses(six_shots.in_view(View.SOURCE))
    names = [[text.get_text() for text in one.axes[0].get_legend().texts] for one in (here, there)]
    assert names[0][0] == "R: clockwise, helicity -1"
    assert names[1][0] == "L: clockwise, helicity -1"
    for colour in (RIGHT, LEFT):
        assert len(drawn(here, PolyCollection, colour)) == len(drawn(there, PolyCollection, colour))


def test_linear_light_has_no_arrows(exposure):
    stokes = np.zeros((4, 34, 34))
    stokes[0] = stokes[2] = 1e-9
    figure = draw_ellipses(exposure(stokes, Raster(1e-5, (34, 34))))
    curves = drawn(figure, LineCollection, LINEAR)
    assert len(curves) == 17 * 17
    assert not drawn(figure, PolyCollection, RIGHT) + drawn(figure, PolyCollection, LEFT)
    slope = np.ptp(curves[0].vertices, axis=0)
    assert slope[0] == pytest.approx(slope[1])  # D lies at 45 deg


def test_dark_and_unpolarized_places_have_no_ellipse(exposure):
    stokes = np.zeros((4, 34, 34))
    stokes[0, :, :17] = 1e-9  # unpolarized
    stokes[:2, :, 17:] = 0.01e-9  # dark
    figure = draw_ellipses(exposure(stokes, Raster(1e-5, (34, 34))))
    assert not drawn(figure, LineCollection, LINEAR)


def test_partly_polarized_light_has_smaller_ellipses(exposure):
    stokes = np.zeros((4, 34, 34))
    stokes[0], stokes[1] = 1e-9, 0.25e-9
    figure = draw_ellipses(exposure(stokes, Raster(1e-5, (34, 34))))
    length = np.ptp(drawn(figure, LineCollection, LINEAR)[0].vertices[:, 0])
    assert length == pytest.approx(2 * 0.43 * 0.02 * 0.5)  # block 20 um, root of 0.25
