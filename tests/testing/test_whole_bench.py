"""Visibility, closed forms, energy and inspection."""

import pickle

import pytest
import sympy

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mm, mW, nm


@pytest.fixture(scope="module")
def arms():
    """Two arms, a filter of 25 % in one of them."""
    train = fa.Train(wavelength=633 * nm, name="Curlew").along(
        fa.Laser(waist=1 * mm, power=1 * mW, state=fa.H, name="laser"),
        fa.BeamSplitter(reflectance=0.5, name="first"),
        fa.PhaseShift(phase=0 * deg, name="shift"),
        fa.NeutralDensity(transmission=0.25, name="filter"),
        fa.Mirror(name="m1"),
        fa.BeamSplitter(reflectance=0.5, name="second"),
        fa.Detector(name="meter"),
    )
    return train.along("first.reflected", fa.Mirror(name="m2"), "second.side")


def test_visibility(arms, fails):
    # Powers 1/4 and 1 on the two arms: V = 2 sqrt(1/4)/(1 + 1/4) = 0.8.
    ft.visibility(arms, "meter", 0.8, knob="shift.phase")
    error = fails(ft.visibility, arms, "meter", 1.0, knob="shift.phase")
    assert error.got == "visibility 0.8"


def test_visibility_of_a_pair_of_paths_tells_its_factors(arms, fails):
    ft.visibility(arms, "meter", 0.8)
    error = fails(ft.visibility, arms, "meter", 1.0)
    assert error.got.startswith("visibility 0.800 = coherence 1.000 x balance 0.800 x polarization 1.000")
    with pytest.raises(fa.WiringError):
        ft.visibility(arms, "first.transmitted", 0.8)


def test_form(fails):
    theta = sympy.Symbol("theta", real=True)
    train = fa.Train(wavelength=633 * nm, name="Marram").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"), fa.HalfWavePlate(fast=theta, name="hwp")
    )
    ft.form_equal(train, "hwp", sympy.cos(2 * theta - sympy.pi / 4) ** 2, behind=fa.D)
    error = fails(ft.form_equal, train, "hwp", sympy.cos(2 * theta + sympy.pi / 4) ** 2, behind=fa.D)
    assert error.cause == "sign of theta"
    assert "no letter" in fails(ft.form_equal, train, "hwp", sympy.cos(theta) ** 2, behind=fa.D).cause
    number = train.with_values({theta: sympy.pi / 8})
    ft.form_equal(number, "hwp", sympy.Integer(1), behind=fa.D)


def test_energy(fails):
    train = fa.Train(wavelength=633 * nm, name="Kelp").along(
        fa.Laser(waist=1 * mm, power=2 * mW, state=fa.D, name="laser"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.Detector(name="meter"),
    )
    ft.energy_closes(train)
    lossy = train.along("pbs.reflected", fa.NeutralDensity(transmission=0.5, name="filter"), fa.BeamDump(name="dump"))
    error = fails(ft.energy_closes, lossy)
    assert error.expected == "2 mW at all ports together"
    assert error.got.startswith("1.5 mW, 0.25 of all too little: ")
    assert error.cause == "absorbed or clipped by filter"
    ft.energy_closes(lossy, absorbed=0.25)
    assert "gain" in fails(ft.energy_closes, lossy, absorbed=0.5).cause


def test_inspection(fails):
    train = fa.Train(wavelength=532 * nm, name="Gorse").along(
        fa.Laser(waist=1 * mm, power=0.1 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.Detector(name="meter"),
    )
    ft.passes_inspection(train)
    wrong = train.with_changes({"hwp.design": 800 * nm})
    error = fails(ft.passes_inspection, wrong)
    assert "hwp" in error.got
    assert "fix:" in error.cause
    ft.passes_inspection(wrong, allowed=["hwp"])
    assert "or above" in fails(ft.passes_inspection, wrong, severity="low").expected
    with pytest.raises(fa.ParameterError, match="severity"):
        ft.passes_inspection(train, severity="grave")


def test_the_error_survives_a_pickle(line, fails):
    error = fails(ft.port_power, line, "hwp", 5 * mW)
    again = pickle.loads(pickle.dumps(error))
    assert str(again) == str(error)


def test_names_load_late():
    assert set(ft.__all__) >= {"port_dark", "charge", "visibility", "BenchError"}
    with pytest.raises(AttributeError, match="nothing"):
        ft.nothing
