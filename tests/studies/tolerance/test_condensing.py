"""Readings of a turned plate from the few angles that tell all others."""

import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import measured, normal
from fastaxis.studies.tolerance.condensing import condensed
from fastaxis.studies.tolerance.reading import readings
from fastaxis.units import deg, mm, nm

SETTINGS = fa.rotating_plate(32, span=360 * deg)


def looks(angles, phase):
    """Stokes parameters that hold 0, 2 and 4 times an angle, each of its own size."""
    turned = np.asarray(angles)[:, None] + phase
    return 3 + np.cos(2 * turned) * [1, 0.3, -0.2, 0.5] + np.sin(4 * turned) * [0.7, -0.4, 0.1, 0.2]


def test_five_readings_tell_as_much_as_thirty_two():
    (reading,) = readings([measured("meter", name, knob="plate.fast", settings=SETTINGS) for name in ("s1", "azimuth")])
    few = condensed(reading, 5)
    assert len(few.steps) == 5
    for merit, short in zip(reading.merits, few.merits, strict=True):
        whole = merit.rows @ looks(merit.steps, 0.3).ravel()
        assert short.rows @ looks(short.steps, 0.3).ravel() == pytest.approx(whole, abs=1e-13)


def test_three_readings_do_not():
    (reading,) = readings([measured("meter", "s1", knob="plate.fast", settings=SETTINGS)])
    few = condensed(reading, 3)
    whole = reading.merits[0].rows @ looks(reading.steps, 0.3).ravel()
    assert not np.allclose(few.merits[0].rows @ looks(few.steps, 0.3).ravel(), whole, atol=1e-3)


def test_merits_of_one_light_are_read_together():
    merits = [measured("meter", name, knob="plate.fast", settings=SETTINGS) for name in ("s1", "s2")]
    other = measured("meter", "s1", knob="plate.fast", settings=fa.rotating_plate(16))
    assert [one.columns for one in readings([merits[0], other, merits[1], len])] == [(0, 2), (1,), (3,)]


def test_a_plate_met_twice_takes_more_readings_and_gives_the_same():
    # Through the turned plate, off a mirror and back through it: eight times its angle.
    train = fa.Train(wavelength=633 * nm, name="Kelp").along(
        fa.Laser(waist=1 * mm, power=1.0, state=fa.H, name="laser"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=0 * deg, retardance=80 * deg, name="plate"),
        fa.Mirror(name="end"),
    )
    train.along("end", "plate.back", "pbs.transmitted")
    train.along("pbs.side", fa.Detector(name="meter"))
    merits = {"s1": measured("meter", "s1", knob="plate.fast", settings=SETTINGS)}
    found = train.tolerance({"plate.retardance": normal(1 * deg)}, merits, draws=3)
    row = found.offsets[2, 0]
    powers = []
    for step in merits["s1"].steps:
        bench = train.with_changes({"plate.fast": step, "plate.retardance": 80 * deg + row})
        powers.append(bench.power("meter"))
        # Twice the plate: sin^2(2 fast) sin^2(retardance).
        assert powers[-1] == pytest.approx(math.sin(2 * step) ** 2 * math.sin(80 * deg + row) ** 2, abs=1e-12)
    stokes = np.zeros((len(powers), 4))
    stokes[:, 0] = powers
    assert found.values[2, 0] == pytest.approx(float(merits["s1"].values(stokes)), abs=1e-10)
