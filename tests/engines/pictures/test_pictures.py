"""Pictures of earlier questions, turned by the last uniform parts, are the pictures that following the light gives."""

import warnings
from concurrent.futures import ThreadPoolExecutor
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.camera.exposure import DUST
from fastaxis.engines import pictures
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.grid import FarField, GridField, guard
from fastaxis.engines.joined import JoinedField
from fastaxis.engines.kept_picture import Kept
from fastaxis.engines.memory import LIGHT, UP_TO, forget_light
from fastaxis.units import deg, mm, mrad, ms, mW, nm, um

GRID = fa.Grid(samples=64, window=6 * mm)
CENTRE = (0.1 * mm, -0.2 * mm)

quiet = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


angles = st.floats(-1.5, 1.5)
plates = st.one_of(
    st.builds(lambda a, d: fa.Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda a: fa.Polarizer(axis=a), angles),
    st.builds(lambda a, e: fa.Polarizer(axis=a, extinction=e), angles, st.sampled_from([3.0, 1e4])),
    st.builds(lambda a: fa.FaradayRotator(angle=a), angles),
    st.builds(lambda t: fa.NeutralDensity(transmission=t), st.floats(0.2, 1.0)),
)
spaces = st.builds(lambda d: fa.FreeSpace(d), st.floats(0.05, 0.4))
places = st.one_of(
    spaces,
    st.builds(lambda f: fa.Lens(focal=f), st.sampled_from([0.5, -0.8])),
    st.builds(
        lambda r, c: fa.Aperture(radius=r, centre=c), st.floats(0.6e-3, 1.5e-3), st.sampled_from([(0, 0), CENTRE])
    ),
)
# With its axis beside the beam a q-plate turns slowly and leaves nothing near the limits of the samples.
patterns = st.builds(
    lambda q, d, c: fa.QPlate(q=q, retardance=d, centre=c),
    st.sampled_from([0.5, -1]), st.floats(1.0, 3.0), st.sampled_from([(0, 0), CENTRE, (2.2 * mm, 1 * mm)]),
)  # fmt: skip
lasers = st.sampled_from([
    {"state": fa.elliptical(0.3, 0.2)}, {"state": fa.UNPOLARIZED}, {"state": fa.partially_polarized(fa.D, 0.4)},
])  # fmt: skip
cameras = st.sampled_from([
    {"pixel": 100 * um, "shape": (20, 24)}, {"pixel": 40 * um, "shape": (12, 9), "centre": CENTRE},
    {"pixel": 200 * um, "shape": (12, 16), "orientation": "turned 90"},
])  # fmt: skip


def turned(laser, early, late, camera):
    """Trains alike up to their last plates and the power of the laser."""
    return [
        fa.Train(wavelength=633 * nm, name="Saltpan").along(
            fa.Laser(waist=0.5 * mm, power=power, name="laser", **laser), *early, *some, fa.Camera(name="cam", **camera)
        )
        for power, some in zip((0.8, 1.0, 0.5, 0.8), late, strict=True)
    ]


lates = st.lists(st.lists(plates, max_size=2), min_size=4, max_size=4)


def around(parts, most):
    """A pattern with other parts before and behind it."""
    some = st.lists(parts, max_size=most)
    return st.builds(lambda before, one, behind: [*before, one, *behind], some, patterns, some)


@settings(max_examples=50, deadline=None)
@given(
    lasers,
    st.one_of(st.lists(places, max_size=2), around(st.one_of(plates, places, patterns), 2)),
    lates,
    cameras,
    places,
    st.booleans(),
)
def test_remembered_is_fresh_on_a_grid(assert_fresh, laser, early, late, camera, behind, travels):
    late = [[*some, behind] if travels else some for some in late]
    try:
        assert_fresh(turned(laser, early, late, camera), engine="grid")
    except fa.SamplingError:
        assume(False)


def on_axis(parts):
    return [replace(part, centre=(0, 0)) if hasattr(part, "centre") else part for part in parts]


@settings(max_examples=8, deadline=None)
@given(lasers, around(st.one_of(plates, patterns), 1), lates, cameras, spaces, st.booleans())
def test_remembered_is_fresh_of_harmonics(assert_fresh, laser, early, late, camera, behind, travels):
    late = [on_axis([*some, behind] if travels else some) for some in late]
    assert_fresh(turned(laser, on_axis(early), late, camera), engine="azimuthal", grid=None)


BOTH = [("grid", GRID), ("azimuthal", None)]


@quiet
@pytest.mark.parametrize(("engine", "grid"), BOTH)
@pytest.mark.parametrize("knob", ["late.fast", "laser.power"])
def test_from_the_third_turn_on_no_pixel_is_read(read, engine, grid, knob, asked, bench):
    train, counts = bench(centre=(0, 0)), []
    for value in (0.1, 0.2, 0.3, 0.4):
        asked(train.with_changes({knob: value}), engine=engine, grid=grid)
        counts.append(len(read))
    assert counts == [1, 2, 2, 2]


@quiet
@pytest.mark.parametrize(("engine", "grid"), BOTH)
def test_a_camera_set_otherwise_reads_no_pixel_again(read, engine, grid, asked, bench):
    train = bench(centre=(0, 0))
    first = [asked(train, engine=engine, grid=grid)[0] for _ in range(2)][0]
    read.clear()
    sensor = fa.Sensor(full_well=10_500, quantum_efficiency=0.62, read_noise=2.4)
    other = train.with_changes({"cam.sensor": sensor, "cam.exposure_time": 1 * ms, "cam.orientation": "mirrored"})
    shots = other.expose("cam", [fa.linear(a) for a in (0.1, 0.2)], engine=engine, grid=grid)
    assert not read
    assert abs(shots.upright.stokes - first.stokes).max() <= 1e-13 * first.stokes[0].max()
    other = train.with_changes({"cam.pixel": 50 * um})
    asked(other, engine=engine, grid=grid)
    assert len(read) == 1


@quiet
def test_what_comes_before_counts(read, asked, bench):
    train = bench(fa.QPlate(q=-1, name="middle"), fa.Aperture(radius=2 * mm, name="stop"))
    for _ in range(3):
        asked(train)
    read.clear()
    for knob, value in {
        "laser.waist": 0.5 * mm, "laser.state": fa.R, "first.offset": 0.2, "middle.retardance": 2.0, "arm.distance": 0.3,
        "leg.distance": 0.2, "stop.radius": 1.9 * mm, "cam.shape": (24, 24), "cam.centre": (0, 0.1 * mm),
    }.items():  # fmt: skip
        asked(train.with_changes({knob: value}))
        assert len(read) == 1, knob
        read.clear()
    asked(train, grid=fa.Grid(samples=62, window=6 * mm))
    asked(train, precision="single")
    assert len(read) == 2


def interferometer():
    train = fa.Train(wavelength=633 * nm, name="Cinder Lane").along(
        fa.Laser(waist=0.5 * mm, power=2 * mW, state=fa.D, name="laser"), fa.BeamSplitter(name="in"),
        fa.QPlate(q=0.5, name="qp"), fa.HalfWavePlate(fast=0.2, name="plate"), fa.Mirror(name="m1"),
        fa.BeamSplitter(name="out"), fa.QuarterWavePlate(fast=0.1, name="late"),
        fa.Camera(pixel=50 * um, shape=(16, 20), name="cam"),
    )  # fmt: skip
    return train.along("in.reflected", fa.Mirror(name="m2"), fa.Wedge(x=0.5 * mrad), "out.side")


@quiet
def test_arms_that_meet_are_read_once_for_one_question(read, asked):
    train = interferometer()
    for _ in range(4):
        asked(train, grid=None)
    assert sum(isinstance(field, JoinedField) for field in read) == 2


@quiet
def test_plates_in_arms_count(assert_fresh):
    train = interferometer()
    knobs = [{}, {}, {}, {"plate.fast": 0.4}, {"plate.fast": 0.4}, {"plate.fast": 0.4}, {"late.fast": 0.5}]
    assert_fresh([train.with_changes(one) for one in knobs], grid=None)


@quiet
@pytest.mark.parametrize("parts", [(), (fa.QPlate(q=-1),)])
def test_an_exposure_changed_by_hand_changes_no_other(parts, asked, bench):
    train = bench(*parts)
    known = []
    for _ in range(4):
        shots, _ = asked(train)
        known.append(shots.stokes.copy())
        assert shots.stokes.flags.writeable
        shots.stokes[:] = 7.0
    for one in known[1:]:
        assert abs(one - known[0]).max() <= 1e-13 * known[0][0].max()


@quiet
def test_two_sensors_are_remembered_as_well(read, asked, bench):
    train = bench(fa.QPlate(q=-1, centre=CENTRE), fa.BeamSplitter(name="split"))
    train = train.along("split.reflected", fa.FreeSpace(0.3), fa.Camera(pixel=50 * um, shape=(16, 16), name="other"))
    both = [train.with_changes({"late.fast": a}).expose(["cam", "other"], [fa.H], grid=GRID) for a in (0.1, 0.2, 0.3)]
    # The way to the other camera does not meet the plate: the third time neither is read.
    assert len(read) == 4
    fa.remember_light(up_to=0)
    for shots, camera in zip(both[-1], ("cam", "other"), strict=True):
        fresh, _ = asked(train.with_changes({"late.fast": 0.3}), camera)
        assert abs(shots.stokes - fresh.stokes).max() <= 1e-13 * fresh.stokes[0].max()


@quiet
def test_pictures_too_large_are_not_kept(read, monkeypatch, asked, bench):
    monkeypatch.setattr(pictures, "arrived", lambda *_: pytest.fail("followed without its last parts"))
    fa.remember_light(up_to=64 * 24 * 20 * 4 * 8 // 16)
    for _ in range(3):
        asked(bench())
    assert len(read) == 3


def test_what_is_kept_cannot_be_written_to(asked, bench):
    for _ in range(2):
        asked(bench())
    (kept,) = [answer for answer, _ in LIGHT._kept.values() if isinstance(answer, Kept)]
    assert not kept.images.flags.writeable


@quiet
def test_a_small_picture_of_large_light_is_kept(read, asked, bench):
    fa.remember_light(up_to=16 * 64 * 64 * 16)  # of which a fifth is less than the samples of two states
    for angle in (0.1, 0.2, 0.3, 0.4):
        asked(bench().with_changes({"late.fast": angle}), grid=fa.Grid(samples=256, window=12 * mm))
    assert len(read) == 2


@quiet
def test_large_light_on_its_way_to_two_sensors_goes_there_once(read, bench):
    fa.remember_light(up_to=16 * 64 * 64 * 16)
    train = bench(fa.BeamSplitter(name="split")).along(
        "split.reflected", fa.FreeSpace(0.3), fa.Camera(pixel=50 * um, shape=(16, 16), name="other")
    )
    for _ in range(3):
        train.expose(["cam", "other"], [fa.H], grid=fa.Grid(samples=256, window=12 * mm))
    assert len(read) == 6


@quiet
def test_threads_ask_at_once(asked, bench):
    trains = [bench().with_changes({"late.fast": angle}) for angle in (0.1, 0.2, 0.3, 0.4)]
    with ThreadPoolExecutor(3) as pool:
        known = list(pool.map(lambda one: one.expose("cam", [fa.H], grid=GRID).stokes, trains * 3))
    fa.remember_light(up_to=0)
    for one, *found in zip(trains, known[:4], known[4:8], known[8:], strict=True):
        fresh, _ = asked(one)
        assert max(abs(stokes - fresh.stokes).max() for stokes in found) <= 1e-13 * fresh.stokes[0].max()
