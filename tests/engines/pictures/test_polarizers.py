"""Pictures kept, behind polarizers that are turned: what they leave of the light may be another share of it."""

import pytest

import fastaxis as fa
from fastaxis.camera.exposure import DUST
from fastaxis.engines import pictures
from fastaxis.engines.grid import guard
from fastaxis.units import deg, mm, mrad, nm, um

CENTRE = (0.1 * mm, -0.2 * mm)

quiet = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


@quiet
def test_a_polarizer_turned_at_the_end_reads_no_pixel_again_while_enough_passes(read, asked, assert_fresh, bench):
    train = bench(fa.Polarizer(axis=0, name="pol"))
    trains = [train.with_changes({"pol.axis": a}) for a in (0.0, 0.2, 0.4, 1.2)]
    for one in trains:
        asked(one, grid=None)
    assert len(read) == 2
    assert_fresh(trains, grid=None)


def test_a_polarizer_turned_behind_harmonics_costs_what_it_did(read, asked, assert_fresh, bench):
    """Harmonics don't say in which state light is that goes round the picture, so it is followed; and not twice."""
    train = bench(fa.Polarizer(axis=0, name="pol"), centre=(0, 0))
    trains = [train.with_changes({"pol.axis": a}) for a in (0.0, 0.4, 0.8, 1.2)]
    for one in trains:
        asked(one, engine="azimuthal", grid=None)
    assert len(read) == 4
    assert_fresh(trains, engine="azimuthal", grid=None)


@pytest.mark.parametrize("parts", [[], [fa.QPlate(q=0.5, retardance=360 * deg, centre=(2.2 * mm, 1 * mm))]])
def test_crossed_polarizers_are_dark(read, parts, asked):
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


def test_a_small_picture_of_much_light_is_followed_where_polarizers_leave_little_of_it(read, asked, assert_fresh):
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
def test_a_polarizer_before_a_stop_leaves_another_share_at_its_rim(assert_fresh, bench):
    train = bench(fa.Polarizer(axis=0, name="pol"), fa.Aperture(radius=1.2 * mm, centre=(0.3 * mm, 0)))
    assert_fresh([train.with_changes({"pol.axis": a}) for a in (0.0, 0.4, 0.8)], grid=None)


def halves(retardance, axis):
    """R comes out as it was or twisted; a quarter-wave plate and a polarizer at 90 deg or 0 pass one or the other."""
    return fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.6 * mm, state=fa.R), fa.QPlate(q=0.5, retardance=retardance), fa.FreeSpace(2.0),
        fa.QuarterWavePlate(fast=45 * deg), fa.Polarizer(axis=axis), fa.Camera(pixel=100 * um, shape=(9, 9), name="cam"),
    )  # fmt: skip


def test_no_one_is_warned_of_light_that_a_polarizer_took_out(asked, assert_fresh):
    trains = [halves(60 * deg, axis) for axis in (90 * deg, 90 * deg, 90 * deg, 0)]
    assert [asked(one)[1] for one in trains] == [False, False, False, True]
    assert_fresh(trains)


def test_light_near_the_limits_that_a_polarizer_lets_out_is_told_of(monkeypatch, asked):
    monkeypatch.setattr(guard, "EDGE_WARN", 4e-4)  # between all of the light, 1.6e-4, and its twisted part, 6.3e-4
    trains = [halves(60 * deg, axis) for axis in (90 * deg, 90 * deg, 90 * deg, 0)]
    assert [asked(one)[1] for one in trains] == [False, False, False, True]


@quiet
def test_light_handed_over_in_one_state_is_turned_in_it(read, asked, assert_fresh):
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
def test_light_near_the_limits_of_its_samples_is_told_of_each_time(asked, bench):
    train = bench().with_changes({"leg.distance": 30.0})
    for angle in (0.1, 0.2, 0.3, 0.4):
        assert asked(train.with_changes({"late.fast": angle}))[1]


@quiet
def test_light_refused_without_its_last_parts_is_followed(monkeypatch, read, asked, bench):
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
