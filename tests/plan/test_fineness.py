"""Pitch at singular axes and edges: pictures behind them right to one part in a thousand, or a word about it."""

import re
import warnings

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.errors import SamplingWarning
from fastaxis.plan import Grid, make_plan
from fastaxis.units import mm, nm, um

WAVELENGTH = 633 * nm
VISIBLE = 1e-3
SHAPE = (64, 64)


def bench(*parts, distance, pixel=None):
    """What a camera sees of a beam with w = 0.5 mm; its pixels are finer than what singular light draws on it."""
    pixel = pixel or min(np.sqrt(WAVELENGTH * distance) / 4, 20 * um)
    camera = fa.Camera(pixel=pixel, shape=SHAPE, name="cam")
    laser = fa.Laser(waist=0.5 * mm, power=1.0)
    return fa.Train(wavelength=WAVELENGTH).along(laser, *parts, fa.FreeSpace(distance), camera)


def told(train, grid=None):
    with warnings.catch_warnings(record=True) as caught:
        warnings.simplefilter("always", SamplingWarning)
        images = train.expose("cam", fa.H, grid=grid, engine="grid").stokes
    return images, [str(one.message) for one in caught]


def wrong(images, train):
    best = train.expose("cam", fa.H, engine="azimuthal").stokes
    return abs(images - best).max() / best[0].max()


def named(said):
    samples, window = re.search(r"Grid\(samples=(\d+), window=([\d.]+)\)", said).groups()
    return Grid(int(samples), float(window))


SHARP = {
    "spiral 1": fa.SpiralPlate(charge=1),
    "spiral 4": fa.SpiralPlate(charge=4),
    "q-plate": fa.QPlate(q=0.5),
    "detuned q-plate": fa.QPlate(q=1, retardance=2.0),
    "hole": fa.Aperture(radius=0.4 * mm),
    "wide hole": fa.Aperture(radius=0.8 * mm),
}


@pytest.mark.parametrize("distance", [4 * mm, 30 * mm, 250 * mm])
@pytest.mark.parametrize("part", SHARP)
def test_what_is_visibly_wrong_is_told_and_what_is_right_is_not(part, distance):
    """Over grids from too coarse to fine. Near the border it may be either, by what the measure scatters."""
    train, seen = bench(SHARP[part], distance=distance), set()
    for samples in (64, 256, 1024):
        images, said = told(train, Grid(samples, 5 * mm))
        error = wrong(images, train)
        assert said or error < 1.6 * VISIBLE
        # Stops may be told of for their power alone.
        assert not said or error > VISIBLE / 40 or "right to 1e-3" not in said[0]
        seen.add(bool(said))
    assert True in seen


@pytest.mark.parametrize("part", ["spiral 1", "detuned q-plate", "hole"])
def test_the_pitch_that_is_named_is_enough(part):
    train = bench(SHARP[part], distance=30 * mm)
    _, (said, *more) = told(train, Grid(200, 5 * mm))
    assert "30 mm behind it" in said
    assert not more  # one message, one grid
    images, left = told(train, named(said))
    assert not left
    assert wrong(images, train) < 1.6 * VISIBLE


def test_automatic_grids_are_as_fine_as_the_distance_asks_for():
    far, near = (make_plan(bench(fa.QPlate(q=1), distance=z), "cam", engine="grid") for z in (100 * mm, 3 * mm))
    assert far.sampling.grid.samples == 1024
    assert near.sampling.grid.samples > 1024
    assert wrong(told(bench(fa.QPlate(q=1), distance=3 * mm))[0], bench(fa.QPlate(q=1), distance=3 * mm)) < 2 * VISIBLE


def test_automatic_grids_that_would_be_too_large_are_told_with_the_one_needed():
    with pytest.warns(SamplingWarning, match="a picture 1 mm behind it, right to 1e-3") as found:
        make_plan(bench(fa.QPlate(q=1), distance=1 * mm), "cam", engine="grid")
    better = named(str(found[0].message))
    assert better.samples == 3072
    make_plan(bench(fa.QPlate(q=1), distance=1 * mm), "cam", engine="grid", grid=better)  # warns no more


def test_where_no_grid_is_fine_enough_the_distance_is_named():
    with pytest.warns(SamplingWarning, match="behind it") as found:
        make_plan(bench(fa.SpiralPlate(charge=1), distance=1 * um), "cam", engine="grid")
    distance = float(re.fullmatch(r"fa.FreeSpace\((.*)\)", found[0].message.fix)[1])
    with pytest.warns(SamplingWarning, match="behind it") as found:  # the largest grid now
        make_plan(bench(fa.SpiralPlate(charge=1), distance=1.01 * distance), "cam", engine="grid")
    assert named(str(found[0].message)).samples == 16384


def test_behind_a_relay_the_distance_is_that_from_the_image():
    """Two lenses with f = 100 mm, 200 mm apart, image the plate onto a camera 100 mm behind the second."""
    parts = [fa.SpiralPlate(charge=1), fa.FreeSpace(0.1), fa.Lens(focal=0.1), fa.FreeSpace(0.2), fa.Lens(focal=0.1)]
    grid = Grid(512, 6 * mm)
    make_plan(bench(*parts, distance=100 * mm), "cam", engine="grid", grid=grid)  # on the image itself: as it is
    with pytest.warns(SamplingWarning, match="a picture 3 mm behind it"):
        make_plan(bench(*parts, distance=103 * mm), "cam", engine="grid", grid=grid)


@pytest.mark.parametrize("charge", [1, 2, 4, 8])
def test_automatic_grids_hold_what_an_axis_in_a_focus_scatters(charge):
    """The plate in the middle of a relay: in the focus, w = 0.08 mm, and a whole Fourier transform before the camera."""
    first, second = ([fa.FreeSpace(0.2), fa.Lens(focal=0.2, name=name)] for name in ("first", "second"))
    plate = fa.SpiralPlate(charge=charge)
    train = bench(*first, fa.FreeSpace(0.2), plate, *second, distance=200 * mm, pixel=30 * um)
    images, said = told(train)
    assert not said
    assert wrong(images, train) < VISIBLE


def test_an_edge_in_the_dark_asks_for_nothing():
    make_plan(bench(fa.Aperture(radius=2 * mm), distance=5 * mm), "cam", engine="grid", grid=Grid(256, 6 * mm))


def test_a_power_asks_for_less_than_a_picture():
    laser = fa.Laser(waist=0.5 * mm, power=1.0)
    plate = fa.QPlate(q=1, centre=(0.1 * mm, 0.0))
    train = fa.Train(wavelength=WAVELENGTH).along(laser, plate, fa.FreeSpace(1 * mm), fa.Detector(name="meter"))
    make_plan(train, "meter", engine="grid")


@settings(max_examples=30, deadline=None)
@given(st.floats(5e-3, 1.0), st.integers(1, 8))
def test_pitch_goes_as_the_root_of_the_distance(distance, charge):
    from fastaxis.plan.fineness import needs

    plan = make_plan(bench(fa.SpiralPlate(charge=charge), distance=distance), "cam", engine="grid")
    (need,) = needs(plan.steps, plan.sampling.planes, WAVELENGTH)
    # The beam is flat at its waist, where the plate stands.
    assert need.distance == pytest.approx(distance, rel=1e-9)
    assert need.pitch == pytest.approx(0.09 * charge**-0.2 * np.sqrt(WAVELENGTH * distance), rel=1e-9)
