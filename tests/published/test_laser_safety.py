"""Emission limits, exposure limits and distances, against the tables and formulas of the standards.

Values from memory of the tables, compared with the public tables of Directive 2006/25/EC and ICNIRP (2013).
"""

import math

import pytest

import fastaxis as fa
from fastaxis.errors import ParameterError
from fastaxis.inspect.laser_safety import (
    correction,
    exceeded,
    hazard_distance,
    limit,
    maximum_exposure,
    optical_density,
    readings,
)
from fastaxis.units import mm, mW, nm

FOUR = (532 * nm, 633 * nm, 780 * nm, 1064 * nm)


# IEC 60825-1:2014 table 9 (edition 2: table 10); ICNIRP, Health Phys. 105, 271 (2013), C_A and C_B.
# Given to eight decimals: half of the last is 5e-9.
@pytest.mark.parametrize(
    ("factor", "wavelength", "value"),
    [
        ("C4", 780 * nm, 1.44543977),
        ("C4", 850 * nm, 1.99526231),
        ("C4", 1064 * nm, 5),
        ("C4", 650 * nm, 1),
        ("C6", 532 * nm, 1),
        ("C7", 1064 * nm, 1),
    ],
)
def test_correction_factors(factor, wavelength, value):
    assert correction(factor, wavelength) == pytest.approx(value, abs=5e-9)


def test_the_photochemical_factor():
    # Given to six decimals.
    assert correction("C3", 532 * nm) == pytest.approx(43.651583, abs=5e-7)
    assert correction("C3", 405 * nm) == 1


# IEC 60825-1:2014 table 3, small source, continuous light.
@pytest.mark.parametrize(
    ("wavelength", "watts"),
    [
        (405 * nm, 0.039e-3),
        (450 * nm, 0.039e-3),
        (532 * nm, 0.39e-3),
        (633 * nm, 0.39e-3),
        (650 * nm, 0.39e-3),
        (780 * nm, 0.5637215105909117e-3),
        (850 * nm, 0.778152302837863e-3),
        (1064 * nm, 1.95e-3),
    ],
)
def test_class_1(wavelength, watts):
    # A power of ten, whose exponent carries the rounding of a wavelength in nm (1e-13), and three products.
    assert limit("1", wavelength) == pytest.approx(watts, rel=1e-12)


def test_at_532_nm_the_thermal_limit_of_class_1_governs():
    assert sorted(readings("1", 532 * nm)) == pytest.approx([0.39e-3, 1.7024e-3], rel=3e-5)  # five digits given


# IEC 60825-1:2014 table 5: visible light only.
@pytest.mark.parametrize(("wavelength", "watts"), list(zip(FOUR, (1e-3, 1e-3, None, None), strict=True)))
def test_class_2(wavelength, watts):
    assert limit("2", wavelength) == watts


# IEC 60825-1:2014 table 6; beyond 700 nm tabulated with a coefficient rounded from five times Class 1. Both readings
# are held, and the smaller counts. Given to five digits.
@pytest.mark.parametrize(
    ("wavelength", "both"),
    list(zip(FOUR, ([5e-3], [5e-3], [2.8186e-3, 2.8909e-3], [9.75e-3, 10.0e-3]), strict=True)),
)
def test_class_3r(wavelength, both):
    assert sorted(readings("3R", wavelength)) == pytest.approx(both, rel=2e-5)
    assert limit("3R", wavelength) == pytest.approx(both[0], rel=2e-5)
    assert max(both) / min(both) <= 1.026


# IEC 60825-1:2014 table 8: 0.5 W from 400 to 1400 nm for 0.25 s and longer.
@pytest.mark.parametrize("wavelength", FOUR)
def test_class_3b(wavelength):
    assert limit("3B", wavelength) == 0.5


# ICNIRP (2013) table 5; Directive 2006/25/EC, annex II, tables 2.2 and 2.3; a pupil of 7 mm.
def test_classes_1_and_2_follow_from_exposure_limits_and_the_pupil():
    pupil = math.pi / 4 * (7 * mm) ** 2
    assert pupil * 1e6 == pytest.approx(38.4845, abs=5e-5)
    assert maximum_exposure(10) * pupil == pytest.approx(0.384845e-3, abs=5e-10)
    assert maximum_exposure(0.25) == pytest.approx(25.455844, abs=5e-7)
    assert maximum_exposure(0.25) * pupil == pytest.approx(0.979656e-3, abs=5e-10)
    # The tables round these up to 0.39 mW and 1 mW.
    assert limit("1", 633 * nm) == pytest.approx(maximum_exposure(10) * pupil, rel=0.02)
    assert limit("2", 633 * nm) == pytest.approx(maximum_exposure(0.25) * pupil, rel=0.03)


# IEC TR 60825-14:2022, nominal ocular hazard distance; 1/e diameters.
def test_hazard_distance():
    given = {"power": 5 * mW, "divergence": 1e-3, "diameter": 1 * mm}
    assert hazard_distance(**given, exposure=maximum_exposure(0.25)) == pytest.approx(14.814167, abs=5e-7)
    assert hazard_distance(**given, exposure=10.0) == pytest.approx(24.231325, abs=5e-7)


# Definition, as in ISO/EN 207.
def test_optical_density():
    assert optical_density(50 * mW, limit("1", 532 * nm)) == pytest.approx(2.107905, abs=5e-7)
    assert optical_density(50 * mW, limit("2", 532 * nm)) == pytest.approx(1.698970, abs=5e-7)


@pytest.mark.parametrize(
    ("power", "wavelength", "name"),
    [
        (0.3 * mW, 532 * nm, None),
        (0.5 * mW, 532 * nm, "1"),
        (4 * mW, 532 * nm, "2"),
        (6 * mW, 633 * nm, "3R"),
        (0.6, 633 * nm, "3B"),
        (2 * mW, 780 * nm, "1"),
        (3 * mW, 780 * nm, "3R"),
        (9.8 * mW, 1064 * nm, "3R"),
    ],
)
def test_the_highest_limit_exceeded(power, wavelength, name):
    assert exceeded(power, wavelength) == name


@pytest.mark.parametrize("wavelength", [399 * nm, 1401 * nm])
def test_beyond_the_table_nothing_is_said(wavelength):
    with pytest.raises(ParameterError, match="400 to 1400 nm"):
        limit("1", wavelength)


def test_refusals():
    with pytest.raises(ParameterError, match="the classes with a limit"):
        limit("1M", 532 * nm)
    with pytest.raises(ParameterError, match="18 us"):
        maximum_exposure(1e-6)


def caution(power, wavelength, *, closed=False):
    train = fa.Train(wavelength=wavelength, name="bench").along(
        fa.Laser(waist=0.5 * mm, power=power, name="laser"), fa.HalfWavePlate(fast=0, name="hwp")
    )
    if closed:
        train.along("hwp", fa.Detector(name="meter"))
    (found,) = [f for f in train.inspect() if f.check == "laser caution"]
    return found


def test_a_caution_names_power_diameters_wavelength_limit_and_source():
    found = caution(6 * mW, 532 * nm)
    for words in ("hwp.back: 6 mW at 532 nm leaves the bench", "1 mm (1/e²)", "0.7071 mm (1/e)",
                  "above the Class 3R limit of 5 mW (IEC 60825-1:2014, table 6, continuous light)"):  # fmt: skip
        assert words in found.got
    assert found.severity.value == "high"


def test_no_caution_is_a_clearance():
    for power in (1e-5, 6e-3, 0.6):
        for wavelength in (*FOUR, 1550 * nm):
            found = caution(power, wavelength)
            assert "does not mean safe" in found.rule
            assert "laser safety officer" in found.rule
            assert "current edition of IEC 60825-1" in found.rule
    assert "none of the limits listed here, which does not mean safe" in caution(1e-5, 532 * nm).got
    assert "not covered here" in caution(6e-3, 1550 * nm).got
    assert "Class 4" in caution(0.6, 1064 * nm).got


@pytest.mark.parametrize(("power", "severity"), [(0.1e-3, "note"), (4e-3, "note"), (6e-3, "low"), (0.6, "medium")])
def test_light_that_ends_in_a_detector_weighs_less(power, severity):
    assert caution(power, 532 * nm, closed=True).severity.value == severity
