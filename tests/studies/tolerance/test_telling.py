"""The words of a study: lab units, small causes together, nothing told of what could not be read."""

import re

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import correlated, lobe_angle, normal, power_at, ring_radius, together, uniform
from fastaxis.units import deg, mm, mW, nm, um


def number(text, before):
    return float(re.search(rf"{re.escape(before)} (-?[\d.]+)", text)[1])


def test_malus_in_the_units_of_the_bench(malus):
    """P cos^2 of 30 deg falls by sin 60 deg = 0.866 W a radian: 15.11 mW a degree."""
    found = malus.tolerance(
        {"pol.axis": normal(1 * deg), "pol.extinction": uniform(100)}, {"power": power_at("meter")}, draws=400
    )
    text = str(found)
    assert "  pol.axis: normal(1°)" in text
    assert "  pol.extinction: uniform(100)" in text
    assert "power: 750 mW as declared" in text
    assert "slope with pol.axis: -15.11 mW per ° (exact)" in text
    assert re.search(r"100\.0 %  pol\.axis \(alone 15\.1\d mW\)", text)
    assert "below 0.05 % each: pol.extinction" in text
    assert "SI unit" not in text


def test_a_parameter_that_moves_nothing_has_no_slope():
    train = fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=1 * mm, power=2 * mW, state=fa.H, name="laser"), fa.HalfWavePlate(fast=10 * deg, name="hwp")
    )
    found = train.tolerance({"hwp.fast": normal(1 * deg)}, {"power": power_at("hwp")}, draws=20)
    assert "slope with hwp.fast: none" in str(found)


def test_lengths_and_places_by_the_millimetre():
    train = fa.Train(wavelength=532 * nm, name="Cinder").along(
        fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, name="qp"),
        fa.FreeSpace(300 * mm, name="space"),
        fa.Camera(pixel=60 * um, shape=(32, 32), name="cam"),
    )
    found = train.tolerance({"space.distance": normal(5 * mm)}, {"ring": ring_radius("cam")}, draws=20)
    text = str(found)
    assert "space.distance: normal(5 mm)" in text
    assert re.search(r"slope with space\.distance: -?[\d.]+ [µn]m per mm \(\+- ", text)
    assert number(text, "ring:") == pytest.approx(1e6 * found.nominal["ring"], rel=1e-3)


def test_errors_that_come_together_say_by_how_much(many):
    covariance = np.diag([1 * deg, 2 * deg]) ** 2
    errors = {("hwp.fast", "q1.fast"): correlated(covariance), ("h2.fast", "q2.fast"): together(uniform(3 * deg))}
    text = str(many.tolerance(errors, {"power": power_at("cam")}, draws=10))
    assert "normal, together by 1°, 2°" in text
    assert "uniform, together by 3°, 3°" in text


def test_of_what_could_not_be_read_nothing_is_made_up(many):
    text = str(many.tolerance({"qp.retardance": uniform(1 * deg)}, {"lobe": lobe_angle("cam", fa.R, count=7)}, draws=4))
    assert "4 draws could not be read" in text
    assert "lobe: could not be read as declared" in text
    assert "so worst case, causes and slopes are not known" in text
    assert "nan" not in text
