"""Figures of a camera that is turned or mirrored: polarization turns with the picture, names stay."""

from dataclasses import replace

import numpy as np
import pytest
from matplotlib.collections import LineCollection
from matplotlib.colors import to_rgba

import fastaxis as fa
from fastaxis.elements.camera import ORIENTATIONS
from fastaxis.report.ellipses import draw_ellipses
from fastaxis.report.frames import draw_frames
from fastaxis.report.stokes import draw_stokes
from fastaxis.report.style import LEFT, LINEAR, RIGHT
from fastaxis.units import deg, mm, nm, um

turned = pytest.mark.parametrize("name", ORIENTATIONS)


def exposed(name, *parts, settings=(fa.H,), shape=(64, 64), **laser):
    train = fa.Train(wavelength=532 * nm, name="Cinder Lane").along(
        fa.Laser(waist=0.5 * mm, name="laser", **laser),
        *parts,
        fa.Camera(pixel=50 * um, shape=shape, orientation=name, name="cam"),
    )
    return train.expose("cam", settings)


def vector_beam(name, offset):
    """Radial for offset 0, azimuthal for 45 deg, a spiral between them."""
    return exposed(name, fa.QPlate(q=0.5, offset=offset, name="qp"), fa.FreeSpace(100 * mm), state=fa.H)


def curves(figure, colour):
    found = [c for c in figure.axes[0].collections if type(c) is LineCollection]
    return [path.vertices for c in found if np.allclose(c.get_edgecolor(), to_rgba(colour)) for path in c.get_paths()]


def turns(points):
    x, y = np.asarray(points).T
    return np.sign(np.sum(x[:-1] * y[1:] - x[1:] * y[:-1]))


def slants(figure):
    """Angle of each linear glyph from the radius to its place, -90 .. 90 deg."""
    found = []
    for points in curves(figure, LINEAR):
        middle, along = (points[0] + points[20]) / 2, points[0] - points[20]
        radius = np.arctan2(middle[1], middle[0])
        found.append((np.degrees(np.arctan2(along[1], along[0]) - radius) + 90) % 180 - 90)
    return np.array(found)


@turned
def test_a_radial_beam_is_drawn_radial_and_a_spiral_winds_the_other_way_in_the_mirror(name):
    sign = -1 if name.startswith("mirrored") else 1
    for offset, slant in ((0, 0), (15, 30)):
        drawn = slants(draw_ellipses(vector_beam(name, offset * deg)))
        assert len(drawn) > 40
        # The mean over a block of pixels beside the axis leans by up to a degree.
        assert drawn == pytest.approx(sign * slant, abs=1.5)


@turned
def test_glyphs_on_the_axes_of_the_picture_lie_exactly_on_them(name):
    points = [(p[0] + p[20]) / 2 for p in curves(draw_ellipses(vector_beam(name, 0.0)), LINEAR)]
    least = np.abs(points).min(axis=0)
    assert least == pytest.approx([0, 0], abs=1e-12)  # roundings of millimetres


@turned
def test_r_keeps_its_colour_and_name_and_turns_as_it_is_seen(name):
    mirrored = name.startswith("mirrored")
    figure = draw_ellipses(exposed(name, state=fa.R))
    senses = {turns(points) for points in curves(figure, RIGHT)}
    assert senses == {1.0 if mirrored else -1.0}
    assert not curves(figure, LEFT)
    [label] = [text.get_text() for text in figure.axes[0].get_legend().texts]
    assert label == ("R: drawn counter-clockwise, helicity -1" if mirrored else "R: clockwise, helicity -1")
    foot = figure.texts[-1].get_text().replace("\n", " ")
    assert ("states keep the names of the beam's own frame" in foot) == (name != "upright")
    assert ("mirrored left-right" in foot) == mirrored


@turned
def test_azimuth_maps_show_the_direction_seen_in_the_picture(name):
    figure = draw_stokes(vector_beam(name, 0.0))
    axes = next(one for one in figure.axes if one.get_title().startswith("azimuth"))
    values = np.ma.filled(axes.images[0].get_array().astype(float), np.nan)
    left, right, bottom, top = axes.images[0].get_extent()
    ny, nx = values.shape
    x = left + (np.arange(nx) + 0.5) * (right - left) / nx
    y = bottom + (np.arange(ny) + 0.5) * (top - bottom) / ny
    apart = values - np.degrees(np.arctan2(y[:, None], x))
    far = (np.hypot(x, y[:, None]) > 0.2) & ~np.isnan(values)
    # Light is collected over a pixel, whose phi at 0.2 mm is not quite that of its middle.
    assert np.abs((apart[far] + 90) % 180 - 90).max() < 1.0


@turned
def test_the_mark_of_the_analyzer_is_parallel_to_the_lobes_of_a_radial_beam(name):
    figure = draw_frames(exposed(name, fa.QPlate(q=0.5), fa.FreeSpace(100 * mm), settings=[fa.linear(25 * deg)]))
    axes = figure.axes[0]
    line, picture = axes.lines[0].get_xydata(), np.asarray(axes.images[0].get_array())
    along = line[0] - line[20]
    n = picture.shape[0]
    at = np.arange(n) - (n - 1) / 2
    lobe = np.angle(np.sum(picture * (at + 1j * at[:, None]) ** 2)) / 2
    assert abs(np.sin(np.arctan2(along[1], along[0]) - lobe)) < 0.01  # half a degree


def test_the_legend_names_only_what_is_drawn():
    labels = [text.get_text() for text in draw_ellipses(exposed("upright", state=fa.H)).axes[0].get_legend().texts]
    assert labels == ["linear (ellipticity within 2°)"]


@pytest.mark.parametrize("draw", [draw_ellipses, draw_stokes, draw_frames])
def test_a_dark_camera_is_called_dark(draw):
    lit = exposed("upright", state=fa.H)
    shots = replace(lit, stokes=lit.stokes * 1e-33)  # what roundings leave of a polarizer across the light
    figure = draw(shots)
    assert [text.get_text() for text in figure.axes[0].texts] == ["dark"]
