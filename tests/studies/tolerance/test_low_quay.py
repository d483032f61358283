"""Error budget of a rotating-plate polarimeter."""

import math

import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import measured, normal, worst_case
from fastaxis.units import deg, mm, mW, nm

SETTINGS = fa.rotating_plate(64, span=360 * deg)


def bench(**plate):
    return fa.Train(wavelength=632.8 * nm, name="Low Quay").along(
        fa.Laser(waist=0.5 * mm, power=1 * mW, state=fa.elliptical(20 * deg, 15 * deg), name="laser"),
        fa.QuarterWavePlate(**{"fast": 0 * deg, **plate}, name="plate"),
        fa.Polarizer(axis=0 * deg, name="analyzer"),
        fa.Detector(name="meter"),
    )


MERITS = {
    **{name: measured("meter", name, knob="plate.fast", settings=SETTINGS) for name in ("s1", "s2", "s3")},
    "azimuth": measured("meter", "azimuth", knob="plate.fast", settings=SETTINGS, wanted=20 * deg),
    "ellipticity": measured("meter", "ellipticity", knob="plate.fast", settings=SETTINGS, wanted=15 * deg),
}
ERRORS = {"plate.retardance": normal(1 * deg), "plate.fast": normal(0.5 * deg), "analyzer.axis": normal(0.2 * deg)}


def test_a_right_instrument_measures_the_state():
    found = bench().tolerance(ERRORS, MERITS, draws=1)
    # S1 = cos 30 cos 40, S2 = cos 30 sin 40, S3 = sin 30 (degrees); the reduction costs a few roundings.
    expected = [math.cos(30 * deg) * math.cos(40 * deg), math.cos(30 * deg) * math.sin(40 * deg), 0.5, 0, 0]
    assert list(found.nominal.values()) == pytest.approx(expected, abs=1e-12)


def test_a_plate_of_85_degrees_read_as_90():
    found = bench(retardance=85 * deg).tolerance(ERRORS, MERITS, draws=1)
    # S0 .. S3 = 1.0578, 0.6056, 0.5082, 0.4981 from an independent sum; the last digit of a ratio is 5e-5.
    expected = [0.6056 / 1.0578, 0.5082 / 1.0578, 0.4981 / 1.0578]
    assert [found.nominal[name] for name in ("s1", "s2", "s3")] == pytest.approx(expected, abs=1e-4)


def test_a_zero_two_degrees_off_turns_the_azimuth_by_four():
    found = bench().tolerance({"plate.fast": worst_case(2 * deg)}, MERITS, draws=4)
    # The readings go as cos(4t - 2 azimuth): a plate that stands at t + e is taken for an azimuth less 2 e.
    assert found.sensitivities["azimuth"]["plate.fast"].value == pytest.approx(-2, abs=1e-9)
    assert abs(found.samples["azimuth"]) == pytest.approx([4 * deg] * 4, rel=2e-3)


def test_budget():
    found = bench().tolerance(ERRORS, MERITS, draws=400, limits={"azimuth": (-1.5 * deg, 1.5 * deg)})
    azimuth, ellipticity = found.rankings["azimuth"], found.rankings["ellipticity"]
    assert azimuth[0].cause == "plate.fast"
    assert ellipticity[0].cause in ("plate.retardance", "plate.fast")
    # Twice 0.5 deg from the zero; the analyzer turns it by its own 0.2 deg or less.
    assert azimuth[0].sigma == pytest.approx(1 * deg, rel=0.01)
    assert all(slope.exact for slope in found.sensitivities["s3"].values())
    assert found.yield_.low < math.erf(1.5 / math.sqrt(2)) + 0.02


def test_refusals():
    with pytest.raises(fa.ParameterError, match="all four"):
        measured("meter", "s1", knob="plate.fast", settings=[fa.H])
    with pytest.raises(fa.ParameterError, match="measures"):
        measured("meter", "s4", knob="plate.fast", settings=SETTINGS)
    with pytest.raises(fa.ParameterError, match="turns a plate"):
        measured("meter", "s1", knob="plate.fast", settings=fa.SIX_STATES)
