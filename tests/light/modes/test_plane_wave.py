import math

import numpy as np
import pytest
import sympy

from fastaxis.errors import SymbolError
from fastaxis.light import Mode, PlaneWave
from fastaxis.units import mm


def test_its_power_is_counted_on_its_area(wavelength):
    wave = PlaneWave(area=4 * mm**2)
    field = wave.amplitude(np.zeros((3, 1)), np.zeros(2), wavelength)
    assert field.shape == (3, 2)
    np.testing.assert_allclose(abs(field) ** 2 * 4 * mm**2, 1, rtol=1e-15)
    np.testing.assert_array_equal(wave.radial(np.zeros(2), wavelength), field[0])


def test_it_has_no_end_and_no_spread(wavelength):
    wave = PlaneWave(area=1 * mm**2)
    assert isinstance(wave, Mode)
    assert wave.infinite
    assert wave.charge == 0
    assert not wave.hard
    assert wave.moments(wavelength).x2 == math.inf
    assert wave.moments(wavelength).t2 == wave.curvature(wavelength) == 0
    assert wave.moved(1.0) == wave
    assert wave.overlap(PlaneWave(area=1 * mm**2), wavelength) == 1


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("PlaneWave(area=0)", "PlaneWave: area = 0.0; area must be positive"),
        ("PlaneWave(area=4)", "its unit is probably missing (fix: area=1*mm**2)"),
        ("PlaneWave(4*mm**2).overlap(Gaussian(1*mm), 633*nm)", "area = 4e-06 m^2 beside Gaussian; a plane wave has no end"),
        ("Gaussian(1*mm).overlap(PlaneWave(4*mm**2), 633*nm)", "a plane wave has no end"),
        ("FlatTop(1*mm).overlap(PlaneWave(4*mm**2), 633*nm)", "a plane wave has no end"),
        ("PlaneWave(4*mm**2).overlap(PlaneWave(1*mm**2), 633*nm)", "area = 4e-06 m^2 beside PlaneWave"),
    ],
)  # fmt: skip
def test_refusals(refuses, code, text):
    refuses(code, text)


def test_symbols_wait_for_numbers(refuses):
    assert PlaneWave(sympy.Symbol("A")).symbols == {sympy.Symbol("A")}
    refuses("PlaneWave(sympy.Symbol('A')).amplitude(0, 0, 633*nm)", "PlaneWave: symbol A in area = A", SymbolError)
