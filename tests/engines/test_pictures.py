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


@pytest.fixture(autouse=True)
def all_room():
    yield
    fa.remember_light(up_to=UP_TO)


def asked(train, camera="cam", grid=GRID, **options):
    """The exposure, and whether there was a warning."""
    with warnings.catch_warnings(record=True) as told:
        warnings.simplefilter("always")
        shots = train.expose(camera, [fa.H], grid=grid, **options)
    return shots, any(issubclass(one.category, fa.SamplingWarning) for one in told)


def assert_alike(known, fresh, tolerance=1e-13):
    """Beside the answer of an empty memory: some dozen roundings of each pixel, 16 times as large where light was lost."""
    (known, told), (fresh, warned) = known, fresh
    assert told == warned
    if fresh.total_power < DUST * fresh.sent:
        assert known.total_power < DUST * fresh.sent
        return
    assert known.stokes.dtype == fresh.stokes.dtype
    assert abs(known.stokes - fresh.stokes).max() <= tolerance * fresh.stokes[0].max()
    assert known.arrived == pytest.approx(fresh.arrived, rel=tolerance)


def assert_fresh(trains, **options):
    """Answers one after the other beside those of an empty memory."""
    forget_light()
    known = [asked(train, **options) for train in trains]
    fa.remember_light(up_to=0)
    try:
        fresh = [asked(train, **options) for train in trains]
    finally:
        fa.remember_light(up_to=UP_TO)
    for one, other in zip(known, fresh, strict=True):
        assert_alike(one, other)


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
def test_remembered_is_fresh_on_a_grid(laser, early, late, camera, behind, travels):
    late = [[*some, behind] if travels else some for some in late]
    try:
        assert_fresh(turned(laser, early, late, camera), engine="grid")
    except fa.SamplingError:
        assume(False)


def on_axis(parts):
    return [replace(part, centre=(0, 0)) if hasattr(part, "centre") else part for part in parts]


@settings(max_examples=8, deadline=None)
@given(lasers, around(st.one_of(plates, patterns), 1), lates, cameras, spaces, st.booleans())
def test_remembered_is_fresh_of_harmonics(laser, early, late, camera, behind, travels):
    late = [on_axis([*some, behind] if travels else some) for some in late]
    assert_fresh(turned(laser, on_axis(early), late, camera), engine="azimuthal", grid=None)


@pytest.fixture
def read(monkeypatch):
    """Counts the readings of pixels."""
    done = []
    for kind in (GridField, FarField, AzimuthalField, JoinedField):
        monkeypatch.setattr(
            kind, "stokes_on", lambda field, raster, own=kind.stokes_on: done.append(field) or own(field, raster)
        )
    return done


def bench(*parts, centre=CENTRE, **laser):
    return fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.6 * mm, name="laser", **{"state": fa.D, **laser}),
        fa.QPlate(q=0.5, centre=centre, name="first"),
        fa.FreeSpace(0.2, name="arm"),
        *parts,
        fa.HalfWavePlate(fast=10 * deg, name="late"),
        fa.FreeSpace(0.1, name="leg"),
        fa.Camera(pixel=100 * um, shape=(24, 20), name="cam"),
    )


BOTH = [("grid", GRID), ("azimuthal", None)]


@quiet
@pytest.mark.parametrize(("engine", "grid"), BOTH)
@pytest.mark.parametrize("knob", ["late.fast", "laser.power"])
def test_from_the_third_turn_on_no_pixel_is_read(read, engine, grid, knob):
    train, counts = bench(centre=(0, 0)), []
    for value in (0.1, 0.2, 0.3, 0.4):
        asked(train.with_changes({knob: value}), engine=engine, grid=grid)
        counts.append(len(read))
    assert counts == [1, 2, 2, 2]


@quiet
@pytest.mark.parametrize(("engine", "grid"), BOTH)
def test_a_camera_set_otherwise_reads_no_pixel_again(read, engine, grid):
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
def test_what_comes_before_counts(read):
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


@quiet
def test_a_polarizer_turned_at_the_end_reads_no_pixel_again_while_enough_passes(read):
    train = bench(fa.Polarizer(axis=0, name="pol"))
    trains = [train.with_changes({"pol.axis": a}) for a in (0.0, 0.2, 0.4, 1.2)]
    for one in trains:
        asked(one, grid=None)
    assert len(read) == 2
    assert_fresh(trains, grid=None)


def test_a_polarizer_turned_behind_harmonics_costs_what_it_did(read):
    """Harmonics don't say in which state light is that goes round the picture, so it is followed; and not twice."""
    train = bench(fa.Polarizer(axis=0, name="pol"), centre=(0, 0))
    trains = [train.with_changes({"pol.axis": a}) for a in (0.0, 0.4, 0.8, 1.2)]
    for one in trains:
        asked(one, engine="azimuthal", grid=None)
    assert len(read) == 4
    assert_fresh(trains, engine="azimuthal", grid=None)


@pytest.mark.parametrize("parts", [[], [fa.QPlate(q=0.5, retardance=360 * deg, centre=(2.2 * mm, 1 * mm))]])
def test_crossed_polarizers_are_dark(read, parts):
    """Of evenly polarized light what is left is told by its one state; of other light it is followed."""
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm, state=fa.H), *parts, fa.Polarizer(axis=0, name="pol"), fa.FreeSpace(0.1),
        fa.Camera(pixel=100 * um, shape=(16, 16), name="cam"),
    )  # fmt: skip
    for axis in (0.1, 0.2, 0.3, 90 * deg):
        shots, _ = asked(train.with_changes({"pol.axis": axis}))
    assert len(read) == (3 if parts else 2)
    assert shots.total_power < DUST * shots.sent
    assert shots.arrived < DUST * shots.sent


def test_a_small_picture_of_much_light_is_followed_where_polarizers_leave_little_of_it(read):
    """The camera looks where the plate has turned the light across; most of the power is elsewhere."""
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.6 * mm, state=fa.H), fa.QPlate(q=1.5, centre=(0, 2.2 * mm)), fa.Polarizer(axis=0, name="pol"),
        fa.Camera(pixel=20 * um, shape=(4, 4), name="cam"),
    )  # fmt: skip
    # Below the plate's own middle its axis stands at -135 deg: H comes out as V there, and tilted beside.
    trains = [train.with_changes({"pol.axis": a}) for a in (1.2, 1.3, 1.4, 0.0)]
    for one in trains:
        asked(one)
    assert len(read) == 3
    assert_fresh(trains)


@quiet
def test_a_polarizer_before_a_stop_leaves_another_share_at_its_rim():
    train = bench(fa.Polarizer(axis=0, name="pol"), fa.Aperture(radius=1.2 * mm, centre=(0.3 * mm, 0)))
    assert_fresh([train.with_changes({"pol.axis": a}) for a in (0.0, 0.4, 0.8)], grid=None)


def halves(retardance, axis):
    """R comes out as it was or twisted; a quarter-wave plate and a polarizer at 90 deg or 0 pass one or the other."""
    return fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.6 * mm, state=fa.R), fa.QPlate(q=0.5, retardance=retardance), fa.FreeSpace(2.0),
        fa.QuarterWavePlate(fast=45 * deg), fa.Polarizer(axis=axis), fa.Camera(pixel=100 * um, shape=(9, 9), name="cam"),
    )  # fmt: skip


def test_no_one_is_warned_of_light_that_a_polarizer_took_out():
    trains = [halves(60 * deg, axis) for axis in (90 * deg, 90 * deg, 90 * deg, 0)]
    assert [asked(one)[1] for one in trains] == [False, False, False, True]
    assert_fresh(trains)


def test_light_near_the_limits_that_a_polarizer_lets_out_is_told_of(monkeypatch):
    monkeypatch.setattr(guard, "EDGE_WARN", 4e-4)  # between all of the light, 1.6e-4, and its twisted part, 6.3e-4
    trains = [halves(60 * deg, axis) for axis in (90 * deg, 90 * deg, 90 * deg, 0)]
    assert [asked(one)[1] for one in trains] == [False, False, False, True]


@quiet
def test_light_handed_over_in_one_state_is_turned_in_it(read):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm, state=fa.D), fa.Aperture(radius=0.4 * mm), fa.FreeSpace(0.3),
        fa.Wedge(x=0.2 * mrad), fa.Polarizer(axis=0, name="pol"),
        fa.Camera(pixel=100 * um, shape=(16, 16), name="cam"),
    )  # fmt: skip
    trains = [train.with_changes({"pol.axis": a}) for a in (0.0, 0.4, 135 * deg)]
    assert trains[0].plan("cam").engine == "handover"
    for one in trains:
        asked(one, grid=None)
    assert len(read) == 2
    assert_fresh(trains, grid=None)


@quiet
def test_light_near_the_limits_of_its_samples_is_told_of_each_time():
    train = bench().with_changes({"leg.distance": 30.0})
    for angle in (0.1, 0.2, 0.3, 0.4):
        assert asked(train.with_changes({"late.fast": angle}))[1]


@quiet
def test_light_refused_without_its_last_parts_is_followed(monkeypatch, read):
    tried = []

    def refuse(*_):
        tried.append(1)
        raise fa.SamplingError("a rule", got="some light", fix="a fix")

    train = bench()
    expected, _ = asked(train)
    monkeypatch.setattr(pictures, "arrived", refuse)
    for _ in range(3):
        shots, _ = asked(train)
    assert (len(tried), len(read)) == (1, 4)
    assert abs(shots.stokes - expected.stokes).max() <= 1e-13 * expected.stokes[0].max()


def interferometer():
    train = fa.Train(wavelength=633 * nm, name="Cinder Lane").along(
        fa.Laser(waist=0.5 * mm, power=2 * mW, state=fa.D, name="laser"), fa.BeamSplitter(name="in"),
        fa.QPlate(q=0.5, name="qp"), fa.HalfWavePlate(fast=0.2, name="plate"), fa.Mirror(name="m1"),
        fa.BeamSplitter(name="out"), fa.QuarterWavePlate(fast=0.1, name="late"),
        fa.Camera(pixel=50 * um, shape=(16, 20), name="cam"),
    )  # fmt: skip
    return train.along("in.reflected", fa.Mirror(name="m2"), fa.Wedge(x=0.5 * mrad), "out.side")


@quiet
def test_arms_that_meet_are_read_once_for_one_question(read):
    train = interferometer()
    for _ in range(4):
        asked(train, grid=None)
    assert sum(isinstance(field, JoinedField) for field in read) == 2


@quiet
def test_plates_in_arms_count():
    train = interferometer()
    knobs = [{}, {}, {}, {"plate.fast": 0.4}, {"plate.fast": 0.4}, {"plate.fast": 0.4}, {"late.fast": 0.5}]
    assert_fresh([train.with_changes(one) for one in knobs], grid=None)


@quiet
@pytest.mark.parametrize("parts", [(), (fa.QPlate(q=-1),)])
def test_an_exposure_changed_by_hand_changes_no_other(parts):
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
def test_two_sensors_are_remembered_as_well(read):
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
def test_pictures_too_large_are_not_kept(read, monkeypatch):
    monkeypatch.setattr(pictures, "arrived", lambda *_: pytest.fail("followed without its last parts"))
    fa.remember_light(up_to=64 * 24 * 20 * 4 * 8 // 16)
    for _ in range(3):
        asked(bench())
    assert len(read) == 3


def test_what_is_kept_cannot_be_written_to():
    for _ in range(2):
        asked(bench())
    (kept,) = [answer for answer, _ in LIGHT._kept.values() if isinstance(answer, Kept)]
    assert not kept.images.flags.writeable


@quiet
def test_a_small_picture_of_large_light_is_kept(read):
    fa.remember_light(up_to=16 * 64 * 64 * 16)  # of which a fifth is less than the samples of two states
    for angle in (0.1, 0.2, 0.3, 0.4):
        asked(bench().with_changes({"late.fast": angle}), grid=fa.Grid(samples=256, window=12 * mm))
    assert len(read) == 2


@quiet
def test_large_light_on_its_way_to_two_sensors_goes_there_once(read):
    fa.remember_light(up_to=16 * 64 * 64 * 16)
    train = bench(fa.BeamSplitter(name="split")).along(
        "split.reflected", fa.FreeSpace(0.3), fa.Camera(pixel=50 * um, shape=(16, 16), name="other")
    )
    for _ in range(3):
        train.expose(["cam", "other"], [fa.H], grid=fa.Grid(samples=256, window=12 * mm))
    assert len(read) == 6


@quiet
def test_threads_ask_at_once():
    trains = [bench().with_changes({"late.fast": angle}) for angle in (0.1, 0.2, 0.3, 0.4)]
    with ThreadPoolExecutor(3) as pool:
        known = list(pool.map(lambda one: one.expose("cam", [fa.H], grid=GRID).stokes, trains * 3))
    fa.remember_light(up_to=0)
    for one, *found in zip(trains, known[:4], known[4:8], known[8:], strict=True):
        fresh, _ = asked(one)
        assert max(abs(stokes - fresh.stokes).max() for stokes in found) <= 1e-13 * fresh.stokes[0].max()
