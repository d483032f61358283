"""From fields to exposures: sums of incoherent light, offset and orientation of the camera, detectors."""

from dataclasses import dataclass, replace

import numpy as np
import pytest

from fastaxis.camera import SIX_STATES, expose
from fastaxis.camera.exposing import merge_guards
from fastaxis.elements.camera import ORIENTATIONS, Camera
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.light.raster import Raster
from fastaxis.light import H, linear


def mounted(bench, **changes):
    bench.elements["cam"] = replace(bench.elements["cam"], **changes)
    return expose(bench, "cam", SIX_STATES)


def test_an_exposure_says_where_it_comes_from(bench, light):
    shots = expose(bench, "cam", SIX_STATES)
    assert (shots.name, shots.target, shots.pixel, shots.wavelength) == ("Low Quay", "cam", 1e-6, 633e-9)
    assert shots.plan == "a plan"
    assert shots.stokes.shape == (4, 2, 3)


def test_incoherent_parts_add_as_powers(bench, light):
    alone = expose(bench, "cam", H).stokes
    light.append(light[0])
    np.testing.assert_array_equal(expose(bench, "cam", H).stokes, 2 * alone)


def test_a_detector_collects_everything_into_one_pixel(bench, light):
    shots = expose(bench, "bucket", SIX_STATES)
    assert shots.frames.shape == (6, 1, 1)
    assert shots.pixel is None
    assert shots.power("H") == 1.5


def test_offset_moves_the_sensor_and_not_the_light(bench, light):
    shots = mounted(bench, centre=(5e-6, -1e-6))
    np.testing.assert_allclose(shots.x, np.array([4e-6, 5e-6, 6e-6]), rtol=1e-15)
    np.testing.assert_allclose(shots.stokes[0, 0], 2 * (1 + 1e5 * shots.x + 1e6 * shots.y[0]), rtol=1e-14)


@pytest.mark.parametrize("name", ORIENTATIONS)
def test_each_orientation_keeps_the_shape_of_the_sensor(bench, light, name):
    shots = mounted(bench, orientation=name)
    assert shots.stokes.shape == (4, 2, 3)
    assert (shots.x.size, shots.y.size) == (3, 2)
    assert np.all(np.diff(shots.x) > 0)
    assert np.all(np.diff(shots.y) > 0)


# Where a point at (x, y) of the beam is seen: counter-clockwise turns, after a mirroring left-right.
SEEN = {
    "upright": lambda x, y: (x, y),
    "turned 90": lambda x, y: (-y, x),
    "turned 180": lambda x, y: (-x, -y),
    "turned 270": lambda x, y: (y, -x),
    "mirrored": lambda x, y: (-x, y),
    "mirrored, turned 90": lambda x, y: (-y, -x),
    "mirrored, turned 180": lambda x, y: (x, -y),
    "mirrored, turned 270": lambda x, y: (y, x),
}


@pytest.mark.parametrize("name", ORIENTATIONS)
def test_the_axes_of_a_turned_camera_follow_its_picture(bench, light, name):
    shots = mounted(bench, orientation=name, centre=(7e-6, -2e-6))
    seen = Raster(1e-6, bench.elements["cam"].seen, (7e-6, -2e-6))
    for x in seen.x:
        for y in seen.y:
            u, v = SEEN[name](x, y)
            column, row = np.argmin(np.abs(shots.x - u)), np.argmin(np.abs(shots.y - v))
            # Coordinates are sums of two roundings of micrometres.
            assert shots.x[column] == pytest.approx(u, abs=1e-20)
            assert shots.y[row] == pytest.approx(v, abs=1e-20)
            assert shots.stokes[0, row, column] == pytest.approx(2 * (1 + 1e5 * x + 1e6 * y), rel=1e-14)


def test_the_eight_orientations_are_different_and_closed_under_composition():
    def acts(*names):
        picture = np.arange(9).reshape(3, 3)
        for name in names:
            picture = Camera(pixel=1e-6, shape=(3, 3), orientation=name).oriented(picture)
        return tuple(picture.ravel())

    single = {acts(name): name for name in ORIENTATIONS}
    assert len(single) == 8
    assert {acts(one, other) for one in ORIENTATIONS for other in ORIENTATIONS} == single.keys()
    assert single[acts("turned 90", "turned 90")] == "turned 180"
    assert single[acts("mirrored", "turned 90")] == "mirrored, turned 90"
    assert single[acts("turned 90", "mirrored")] == "mirrored, turned 270"


@dataclass(frozen=True)
class Guard:
    edge_power: float
    phase_step: float


def test_the_worst_guard_of_all_parts_is_kept():
    assert merge_guards([Guard(0.1, 2.0), None, Guard(0.2, 1.0)]) == Guard(0.2, 2.0)
    assert merge_guards([None]) is None


@pytest.mark.parametrize("target", ["nowhere", "hwp"])
def test_only_cameras_and_detectors_take_pictures(bench, light, target):
    bench.elements["hwp"] = object()
    with pytest.raises(
        ParameterError, match=rf"target '{target}' .*; pictures are taken by a Camera .*fix: train.expose"
    ):
        expose(bench, target, H)


def test_letters_are_refused_before_anything_is_computed(bench, monkeypatch):
    import sympy

    monkeypatch.setattr("fastaxis.camera.exposing.late", lambda *_: pytest.fail("propagated"))
    with pytest.raises(SymbolError, match="a frame needs numbers"):
        expose(bench, "cam", linear(sympy.Symbol("a", real=True)))
