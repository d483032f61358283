import pytest
import sympy

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mm, nm


@pytest.fixture(scope="module")
def circular():
    """A quarter-wave plate with its fast axis at +45 deg makes H into R."""
    return fa.Train(wavelength=633 * nm, name="Tern").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"), fa.QuarterWavePlate(fast=45 * deg, name="qwp")
    )


def test_state_holds(line, circular):
    ft.state_at(line, "hwp", azimuth=90 * deg, ellipticity=0 * deg)
    ft.state_at(line, "hwp", azimuth=-90 * deg)  # the same direction
    ft.state_at(circular, "qwp", helicity=-1, ellipticity=45 * deg)


def test_wrong_hand_names_the_swapped_axes(circular, fails):
    error = fails(ft.state_at, circular, "qwp", helicity=+1)
    assert error.expected.startswith("helicity +1")
    assert "helicity -1" in error.got
    assert "qwp: fast and slow axis swapped" in error.cause
    assert "qwp: sign of fast" in error.cause


def test_wrong_azimuth_names_the_turned_plate(line, fails):
    error = fails(ft.state_at, line, "hwp", azimuth=70 * deg)
    assert "azimuth 90 deg" in error.got or "azimuth -90 deg" in error.got
    assert "hwp.fast stands at 35 deg, -10 deg off" in error.cause


def test_the_hand_of_the_source(fails):
    train = fa.Train(wavelength=633 * nm, name="Tern").along(
        fa.Laser(waist=1 * mm, state=fa.elliptical(0 * deg, 10 * deg), name="laser"), fa.Detector(name="meter")
    )
    assert "laser: handedness of its light" in fails(ft.state_at, train, "meter", ellipticity=-10 * deg).cause


def test_linear_light_has_no_hand(line, fails):
    assert "no helicity" in fails(ft.state_at, line, "hwp", helicity=1).got


def test_nothing_expected_is_refused(line):
    with pytest.raises(fa.ParameterError, match="azimuth"):
        ft.state_at(line, "hwp")


def test_circular_light_has_no_azimuth(circular, fails):
    error = fails(ft.state_at, circular, "qwp", azimuth=0 * deg)
    assert error.got.startswith("no azimuth, ellipticity 45 deg")
    with pytest.raises(fa.ParameterError, match="no long axis"):
        ft.state_at(circular, "qwp", azimuth=0 * deg, ellipticity=45 * deg)


@pytest.mark.parametrize(
    ("expected", "words"),
    [
        ({"azimuth": 45}, r"write degrees as 45\*deg"),
        ({"azimuth": 22.5}, "radians"),
        ({"azimuth": float("nan")}, "finite"),
        ({"ellipticity": 45.0}, "radians"),
        ({"ellipticity": 50 * deg}, "between -45 and 45 deg"),
        ({"azimuth": 0 * deg, "within": 30}, "radians"),
        ({"azimuth": 0 * deg, "within": 0.0}, "positive"),
        ({"azimuth": sympy.Symbol("a", real=True)}, "must be a number"),
        ({"helicity": 2}, r"\+1 or -1"),
        ({"helicity": 0}, r"\+1 or -1"),
    ],
)
def test_what_no_light_can_be_is_refused(line, expected, words):
    with pytest.raises(fa.ParameterError, match=words):
        ft.state_at(line, "hwp", **expected)


def test_a_few_whole_radians_are_cautioned(line):
    with pytest.warns(fa.SlipWarning, match="degrees are written"), pytest.raises(ft.BenchError):
        ft.state_at(line, "hwp", azimuth=10)
