"""Checks where they hold back, and where a question has no answer."""

import math
from dataclasses import replace

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.inspect.checks.isolators import backward_leak
from fastaxis.inspect.checks.planes import waist_beyond
from fastaxis.inspect.checks.polarizers import passing
from fastaxis.inspect.laser_safety.limits import limit
from fastaxis.inspect.strands import state_in_words
from fastaxis.inspect.surveying import survey
from fastaxis.units import deg, mm, nm, um

METER = fa.Detector(name="meter")
CAMERA = fa.Camera(pixel=10 * um, shape=(640, 640), name="cam")


def checks(train, check):
    return [f for f in train.inspect() if f.check == check]


def test_unpolarized_light_on_a_polarizer_is_a_note(bench_of):
    (found,) = checks(bench_of(fa.Polarizer(axis=10 * deg, name="pol"), METER, state=fa.UNPOLARIZED), "polarizer")
    assert found.severity.value == "note"
    assert "unpolarized light meets" in found.got


def test_a_patterned_beam_on_a_polarizer_is_no_finding(bench_of):
    train = bench_of(fa.QPlate(q=0.5, name="qp"), fa.Polarizer(axis=90 * deg, name="pol"), CAMERA)
    assert not checks(train, "polarizer")
    assert not checks(train, "idle plate")


def test_a_tuned_quarter_wave_q_plate_is_a_note(bench_of):
    (found,) = checks(bench_of(fa.QPlate(q=0.5, retardance=90 * deg, name="qp"), CAMERA), "unconverted light")
    assert found.severity.value == "note"
    assert "50 % unconverted" in found.got


def test_a_polarizer_met_from_behind_is_turned_the_right_way(bench_of):
    train = bench_of(
        fa.BeamSplitter(name="split"), fa.Polarizer(axis=20 * deg, name="pol"), fa.Mirror(name="end"), state=fa.D
    )
    train.along("end", "pol.back", "split.transmitted").along("split.reflected", fa.BeamDump(name="dump"))
    train.along("split.side", METER)
    first = [v for v in survey(train).visits if v.name == "pol"]
    assert passing(first[0]) == pytest.approx(math.cos(25 * deg) ** 2)
    # What passed comes back along the axis, mirrored and met from behind: all of it passes again.
    assert passing(first[1]) == pytest.approx(1)


@pytest.mark.parametrize("angle", [45, 40, 30, 0])
def test_backward_leak_of_an_isolator_is_cos_squared_of_twice_the_angle(bench_of, angle):
    train = bench_of(
        fa.Polarizer(axis=10 * deg, name="in"),
        fa.FaradayRotator(angle=angle * deg, name="rotator"),
        fa.Polarizer(axis=(10 + angle) * deg, name="out"),
        METER,
    )
    trio = survey(train).visits[:3]
    assert backward_leak(trio, 532 * nm) == pytest.approx(math.cos(2 * angle * deg) ** 2, abs=1e-15)


@pytest.mark.parametrize("ahead", [-40 * mm, 0.0, 25 * mm])
def test_the_distance_to_a_waist(bench_of, ahead):
    laser = fa.Laser(waist=0.1 * mm, waist_at=ahead, name="laser")
    train = fa.Train(wavelength=532 * nm).along(laser, METER)
    found, rayleigh = waist_beyond(survey(train).visits[0])
    assert found == pytest.approx(ahead, abs=1e-12)
    assert rayleigh == pytest.approx(math.pi * (0.1 * mm) ** 2 / (532 * nm))


def test_a_laser_without_a_bench_gets_its_caution():
    train = fa.Train(wavelength=532 * nm).add(fa.Laser(waist=1 * mm, power=20e-3, name="laser"))
    (found,) = checks(train, "laser caution")
    assert found.element == "laser.out"
    assert found.severity.value == "high"
    assert "2 mm (1/e²)" in found.got
    assert [f.element for f in checks(train, "open port")] == ["laser.out"]


def test_light_that_cannot_be_sampled_leaves_estimates():
    train = fa.Train(wavelength=532 * nm, name="bench").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1e-3, name="laser"),
        fa.Lens(focal=0.3, name="lens"),
        fa.FreeSpace(0.3),
        fa.Aperture(radius=1 * mm, name="stop"),
        CAMERA,
    )
    bench = survey(train)
    assert bench.ledger == {}
    assert bench.arriving(bench.visits[-1]) == pytest.approx(1e-3)
    (found,) = checks(train, "estimated powers")
    assert found.rule.startswith("a plane wave has no finite focus")


def test_two_colours_are_each_checked(bench_of):
    beam = fa.Beam((fa.Term(1, fa.Gaussian(1 * mm), fa.H),))
    laser = fa.Laser(incoherent=[(0.5, beam, 532 * nm), (0.5, beam, 633 * nm)], power=1e-3, name="laser")
    plate = fa.HalfWavePlate(fast=20 * deg, design=532 * nm, name="hwp")
    (found,) = checks(fa.Train(wavelength=532 * nm).along(laser, plate, METER), "design wavelength")
    # 180 deg 532/633 = 151.28 deg
    assert "151.3° at 633 nm" in found.got


def test_states_in_words(bench_of):
    def words(state):
        return state_in_words(survey(bench_of(METER, state=state)).visits[0].before)

    assert words(fa.R) == "circular R"
    assert words(fa.L) == "circular L"
    assert words(fa.linear(-30 * deg)) == "linear -30°"
    assert words(fa.elliptical(20 * deg, 10 * deg)) == "azimuth 20°, ellipticity +10°"
    assert words(fa.UNPOLARIZED) == "unpolarized"
    assert words(fa.partially_polarized(fa.H, 0.5)) == "linear 0°, 50 % polarized"


def test_a_relay_shows_the_plane_inverted(bench_of):
    train = bench_of(
        fa.QPlate(q=0.5, name="qp"), fa.FreeSpace(200 * mm), fa.Lens(focal=200 * mm, name="l1"),
        fa.FreeSpace(300 * mm), fa.Lens(focal=100 * mm, name="l2"), fa.FreeSpace(100 * mm),
        fa.Camera(pixel=3.45 * um, shape=(1024, 1024), name="cam"),
    )  # fmt: skip
    (found,) = checks(train, "plane shown")
    assert "shows the plane of qp, magnification -0.5 (turned by 180°)" in found.got
    assert not checks(train, "relay spacing")


def test_a_wedged_window_has_a_ghost(bench_of):
    (found,) = checks(bench_of(fa.Window(index=1.5, wedge=0.5 * deg, name="window"), METER), "ghost")
    # R = (0.5/2.5)^2 = 4 %, twice: 0.16 %
    assert "0.16 %" in found.got
    assert found.severity.value == "note"


def test_the_gain_of_a_lossless_splitter_is_one(bench_of):
    from fastaxis.inspect.checks.gain import largest_gain

    train = bench_of(fa.PolarizingBeamSplitter(Tp=0.9, Ts=0.2, name="pbs"), METER, state=fa.D)
    np.testing.assert_allclose(largest_gain(survey(train).visits[0], 532 * nm), 1, rtol=1e-14)


def test_paths_that_meet_without_a_ledger_are_taken_at_their_brightest(bench_of):
    """Two arms of a quarter of the power each can leave by one port with all of it."""
    train = bench_of(fa.BeamSplitter(name="split"), fa.Mirror(name="m1"), fa.BeamSplitter(name="join"), METER)
    train.along("split.reflected", fa.Mirror(name="m2"), "join.side")
    known = survey(train)
    unknown = replace(known, ledger={})
    ends = [visit for visit in known.visits if visit.name == "meter"]
    assert len(ends) == 2
    assert known.arriving_together(ends) == pytest.approx(train.power("meter"))
    assert unknown.arriving_together(ends) == pytest.approx(1e-3)
    open_end = [visit for visit in known.visits if (visit.name, visit.left) == ("join", "reflected")]
    assert unknown.leaving_together(open_end) == pytest.approx(1e-3)
    assert known.leaving_together(open_end) + known.arriving_together(ends) == pytest.approx(1e-3)


def test_loops_and_return_arms_are_followed(bench_of):
    sagnac = bench_of(fa.BeamSplitter(name="split"), state=fa.D)
    sagnac.loop("split.transmitted", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "split.reflected")
    sagnac.along("split.side", METER)
    inspection = sagnac.inspect()
    assert inspection.passed, str(inspection)
    assert not [f for f in inspection if f.check == "light runs round"]
    (back,) = [f for f in inspection if f.check == "returning light"]
    assert back.element == "split.front"


@pytest.mark.parametrize("off", [15, 30])
def test_a_missed_focus_is_told_alike_on_both_sides(bench_of, off):
    for distance in (200 - off, 200 + off):
        lens = fa.Lens(focal=200 * mm, name="lens")
        (found,) = checks(bench_of(lens, fa.FreeSpace(distance * mm), CAMERA), "off focus")
        assert ("behind" in found.got) == (distance > 200)


@pytest.mark.parametrize("distance", [150, 250])
def test_a_camera_far_from_the_focus_was_not_meant_to_be_there(bench_of, distance):
    lens = fa.Lens(focal=200 * mm, name="lens")
    assert not checks(bench_of(lens, fa.FreeSpace(distance * mm), CAMERA), "off focus")


def test_an_iris_beside_the_beam_is_off_centre_and_its_fix_centres_it(bench_of):
    train = bench_of(fa.Aperture(radius=1.2 * mm, centre=(1 * mm, 0), name="iris"), METER)
    (found,) = checks(train, "off centre")
    assert (found.element, found.severity.value) == ("iris", "medium")
    assert "1 mm beside the beam" in found.got
    assert not checks(eval(found.fix, {"train": train, "mm": mm}), "off centre")


@pytest.mark.parametrize("stop", [fa.Aperture(radius=0.3 * mm, name="stop"), fa.KnifeEdge(name="stop")])
def test_a_small_stop_in_the_middle_and_a_knife_edge_are_not_off_centre(bench_of, stop):
    assert checks(bench_of(stop, METER), "clipped beam")
    assert not checks(bench_of(stop, METER), "off centre")


SENSOR = fa.Sensor(full_well=10_000, quantum_efficiency=0.6)


def read(bench_of, exposure_time, **laser):
    """One pixel that takes a tenth of a microwatt of 532 nm: 1.6e11 electrons a second, full after 62 ns."""
    camera = fa.Camera(pixel=5 * mm, shape=(1, 1), sensor=SENSOR, exposure_time=exposure_time, name="cam")
    return [f for f in bench_of(camera, power=1e-7, **laser).inspect() if f.check in ("saturation", "few counts")]


def test_a_camera_without_an_exposure_time_is_told_when_it_is_full(bench_of):
    (found,) = read(bench_of, None)
    assert found.severity.value == "note"
    assert "full after 62.2 ns" in found.got  # 1e4 h c/(0.6 * 1e-7 W * 532 nm)
    assert '"cam.exposure_time": 5e-08' in found.fix


def test_an_exposure_too_short_for_a_shutter_is_mended_by_a_filter(bench_of):
    (found,) = read(bench_of, 1e-6)
    # 1e-6/62.2e-9 = 16.1; log10(16.1/0.8) = 1.30 and a little
    assert found.fix == "fa.NeutralDensity(density=1.4) before cam"


def test_unpolarized_light_is_brighter_without_an_analyzer(bench_of):
    (found,) = read(bench_of, 100e-9, state=fa.UNPOLARIZED)
    assert found.severity.value == "low"
    assert "in 100 ns without an analyzer the brightest pixel gets 1.61 times its fill" in found.got


def test_a_camera_whose_light_cannot_be_worked_out_is_told_by_sampling_alone():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), name="laser"), fa.Lens(focal=0.3), fa.FreeSpace(0.3),
        fa.Camera(pixel=10 * um, sensor=SENSOR, exposure_time=1e-3, name="cam"),
    )  # fmt: skip
    assert not checks(train, "saturation")
    assert checks(train, "sampling")


@pytest.mark.parametrize("time", [None, 1e-3])
def test_a_sensor_that_the_light_misses_is_told_by_its_size_alone(bench_of, time):
    camera = fa.Camera(pixel=5 * um, shape=(8, 8), centre=(200 * mm, 0), sensor=SENSOR, exposure_time=time, name="cam")
    found = [f.check for f in bench_of(camera).inspect() if f.element == "cam"]
    assert "sensor too small" in found
    assert not {"saturation", "few counts"} & set(found)


def test_a_temperature_without_a_drift_is_a_note(bench_of):
    plate = fa.HalfWavePlate(fast=20 * deg, temperature=303.15, name="hwp")
    (found,) = checks(bench_of(plate, METER), "plate temperature")
    assert found.severity.value == "note"
    assert "drift 0" in found.got


@pytest.mark.parametrize("retardance", [lambda x, y: np.pi + 0 * x * y, np.full((64, 64), np.pi), np.pi])
def test_the_drift_of_a_patterned_plate(bench_of, retardance):
    plate = fa.PatternedRetarder(
        fast=0.3, retardance=retardance, pixel=100 * um, drift=-2e-3, temperature=303.15, name="plate"
    )
    (found,) = checks(bench_of(plate, CAMERA), "plate temperature")
    assert "10 K above its design temperature, retardance off by -3.6°" in found.got


@pytest.mark.parametrize(("coherence", "told"), [(2.0, 0), (0.02, 1)])
def test_a_path_difference_that_leaves_the_fringes_alone_is_not_told(bench_of, coherence, told):
    train = bench_of(fa.BeamSplitter(name="split"), fa.FreeSpace(110 * mm), fa.BeamSplitter(name="join"), CAMERA)
    train.along("split.reflected", fa.FreeSpace(100 * mm), "join.side").along("join.reflected", fa.BeamDump())
    line = fa.GaussianLine(coherence_length=coherence)
    assert len(checks(train.with_changes({"laser.line": line}), "path difference")) == told


def mach_zehnder(bench_of, state=fa.H):
    train = bench_of(fa.BeamSplitter(name="split"), fa.Mirror(name="m1"), fa.BeamSplitter(name="join"), state=state)
    train.along("split.reflected", fa.Mirror(name="m2"), fa.PhaseShift(phase=90 * deg), "join.side")
    train.along("join.transmitted", CAMERA).along("join.reflected", fa.BeamDump(name="dump"))
    return train


def test_a_sensor_too_small_is_told_once_of_both_arms(bench_of):
    train = mach_zehnder(bench_of).with_changes({"cam.shape": (150, 150)})
    (found,) = checks(train, "sensor too small")
    assert "middle at (0 m, 0 m)" in found.got


@pytest.mark.parametrize(("state", "severity"), [(fa.H, "low"), (fa.D, "medium")])
def test_a_mirrored_picture_is_told_once_of_both_arms(bench_of, state, severity):
    (found,) = checks(mach_zehnder(bench_of, state), "mirrored picture")
    assert found.severity.value == severity  # H on a round beam is its own mirror image
    assert "1 and 3 reflections" in found.got


def test_a_beam_beside_the_axis_is_not_its_own_mirror_image(bench_of):
    train = bench_of(fa.Wedge(x=1e-3, name="wedge"), fa.FreeSpace(100 * mm), fa.Mirror(name="m1"), CAMERA)
    (found,) = checks(train, "mirrored picture")
    assert found.severity.value == "medium"


@pytest.mark.parametrize(
    ("camera", "fixed"),
    [
        (fa.Camera(pixel=10 * um, shape=(100, 100), name="cam"), "cam.shape"),
        (fa.Camera(pixel=10 * um, shape=(640, 640), centre=(4 * mm, 0), name="cam"), "cam.centre"),
        (fa.Camera(pixel=10 * um, shape=(640, 120), name="cam"), "cam.shape"),
    ],
)
def test_the_fix_of_a_sensor_makes_it_larger_or_moves_it(bench_of, camera, fixed):
    train = bench_of(camera)
    (found,) = checks(train, "sensor too small")
    assert fixed in found.fix
    assert not checks(eval(found.fix, {"train": train, "mm": mm}), "sensor too small")


def test_arms_that_are_alike_give_each_finding_once(bench_of):
    train = bench_of(fa.QPlate(q=0.5, name="qp"), fa.BeamSplitter(name="split"), fa.BeamSplitter(name="join"))
    train.along("split.reflected", "join.side").along("join.reflected", CAMERA)
    train.along("join.transmitted", fa.BeamDump(name="dump"))
    assert len(checks(train, "plane shown")) == 1


def test_a_dark_fringe_is_told_from_blocked_light(bench_of):
    train = bench_of(fa.BeamSplitter(name="split"), fa.Mirror(name="m1"), fa.BeamSplitter(name="join"))
    train.along("split.reflected", fa.Mirror(name="m2"), "join.side")
    # r and t of a splitter are a quarter wave apart: twice reflected light meets twice transmitted light inverted.
    train.along("join.transmitted", fa.Detector(name="dark")).along("join.reflected", fa.Detector(name="bright"))
    (found,) = checks(train, "dark port")
    assert (found.element, found.severity.value) == ("dark", "low")
    assert "2 paths with light end here and cancel" in found.got
    assert "PhaseShift" in found.fix
    blocked = bench_of(fa.Polarizer(axis=90 * deg, name="pol"), fa.Detector(name="meter"))
    (found,) = checks(blocked, "dark port")
    assert found.severity.value == "medium"


@pytest.mark.parametrize(("asked", "got"), [(1550 * nm, "wavelength = 1.55 µm;"), (532.0, "wavelength = 532 m;")])
def test_a_wavelength_beyond_the_limits_is_told_in_its_unit(asked, got):
    with pytest.raises(fa.FastaxisError, match="the table of limits covers 400 to 1400 nm") as told:
        limit("3R", asked)
    assert str(told.value).startswith(got)


def test_values_of_slips_are_in_the_units_of_the_lab():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, power=2e-8, name="laser"), fa.Lens(focal=20 * mm, radius=12.7 * mm, name="lens"), METER
    )
    told = [finding.got for finding in train.inspect()]
    assert "laser: power 20 nW" in told
    assert "lens: radius = 12.7*mm, focal = 20*mm" in told
