"""Checks of the whole train: what is warned about, and what is not."""

import warnings

import pytest
import sympy

import fastaxis as fa
from fastaxis.units import deg, mm, nm, um


def told(train):
    with warnings.catch_warnings(record=True) as caught:
        warnings.simplefilter("always")
        train.validate()
    return [w.message for w in caught]


def test_a_good_bench_is_silent(line, isolator, fork):
    assert [told(train) for train in (line, isolator, fork)] == [[], [], []]


def test_an_unfed_camera_is_told_with_the_likely_connection(isolator):
    isolator.add(fa.Camera(pixel=3.45 * um, name="cam2"))
    (warning,) = told(isolator)
    assert isinstance(warning, fa.WiringWarning)
    assert str(warning).startswith("cam2 (Camera); nothing feeds it")
    exec(warning.fix, {"train": isolator})
    assert told(isolator) == []


def test_a_dark_stretch_is_told_once_at_the_place_where_light_is_missing(isolator):
    isolator.along(fa.Lens(focal=0.1, name="lens"), fa.FreeSpace(distance=0.1, name="gap"), fa.Detector(name="meter"))
    (warning,) = told(isolator)
    assert (warning.got, warning.fix.split(", ")[1]) == ("meter (Detector)", '"lens.front")')


def test_a_dark_part_without_a_camera_is_told(line):
    line.along(fa.Lens(focal=0.1, name="spare"), fa.BeamDump(name="dump"))
    assert [w.rule for w in told(line)] == ["no light reaches it"]


def test_the_nearest_open_port_is_suggested():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"),
        fa.BeamSplitter(name="bs1"),
        fa.BeamSplitter(name="bs2"),
        fa.BeamDump(name="dump"),
    )
    train.add(fa.Detector(name="meter"))
    assert told(train)[0].fix == 'train.join("bs2.reflected", "meter.in")'


def test_open_ports_are_no_mistake(fork):
    assert fork.open_ports()
    assert told(fork) == []


def test_cautions_of_parts_are_passed_on(line):
    line.add(fa.HalfWavePlate(fast=0.0, design=1064 * nm, name="infrared")).along("hwp")
    expected = [str(c) for part in line.elements.values() for c in part.cautions(line.wavelength)]
    assert len(expected) == 1
    assert expected[0] in [str(w) for w in told(line)]


def test_a_part_exchanged_for_one_without_that_port_is_caught(isolator):
    isolator.elements["pbs"] = fa.Lens(focal=1.0, name="pbs")
    with pytest.raises(fa.WiringError, match="pbs.transmitted: no face 'transmitted'"):
        isolator.validate()


def test_a_target_without_light_is_an_error_and_no_warning_before_it(line):
    line.add(fa.Camera(pixel=3.45 * um, name="cam2"))
    with pytest.raises(fa.WiringError, match="cam2.in: not on any path"):
        line.route("cam2")


@pytest.mark.parametrize("angle", [0 * deg, 45 * deg])
def test_validation_does_not_depend_on_values(line, angle):
    assert told(line.with_changes({"hwp.fast": angle})) == []


def test_letters_do_not_disturb_validation():
    a, wavelength = sympy.symbols("a lambda", positive=True)
    train = fa.Train(wavelength=wavelength).along(
        fa.Laser(waist=a, state=fa.linear(a), name="laser"),
        fa.HalfWavePlate(fast=a, design=532 * nm, name="hwp"),
        fa.QPlate(q=a, name="qp"),
        fa.Polarizer(axis=a, extinction=a),
        fa.Aperture(radius=a),
        fa.Detector(name="meter"),
    )
    assert told(train) == []
    assert train.route("meter").reflections == 0
    assert "letters: a, lambda" in str(train)
