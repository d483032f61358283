"""Plates that follow their temperature: the whole path difference drifts, its whole waves included."""

import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.elements import HalfWavePlate, PatternedRetarder, QPlate, QuarterWavePlate, Retarder
from fastaxis.elements.warming import warming
from fastaxis.errors import ParameterError
from fastaxis.units import deg, mm, nm, um

QUARTZ = -1e-4  # [1/K], order of magnitude
quick = settings(max_examples=30, deadline=None)


def plate(order, temperature, **more):
    return QuarterWavePlate(fast=0, order=order, design=532 * nm, drift=QUARTZ, temperature=temperature, **more)


def test_at_its_design_temperature_a_plate_is_what_it_was():
    assert plate(10, 293.15).retardance_at(532 * nm) == plate(10, 293.15).changed(drift=0.0).retardance_at(532 * nm)
    assert QPlate(q=0.5, drift=-1e-3).retardance_at(532 * nm) == math.pi


@pytest.mark.parametrize("order", [0, 3, 10])
def test_a_plate_of_order_n_drifts_4n_plus_1_times_as_fast_as_a_quarter_wave(order):
    def change(order):
        return plate(order, 303.15).retardance_at(532 * nm) - plate(order, 293.15).retardance_at(532 * nm)

    # Differences of 64 rad lose four digits of sixteen.
    assert change(order) == pytest.approx((4 * order + 1) * change(0), rel=1e-10)
    assert change(order) == pytest.approx((order + 0.25) * 2 * math.pi * QUARTZ * 10, rel=1e-10)


@quick
@given(st.floats(250, 350), st.floats(250, 350))
def test_only_the_difference_of_temperatures_counts(jones, temperature, design):
    moved = plate(5, temperature, design_temperature=design)
    other = plate(5, temperature + 17.0, design_temperature=design + 17.0)
    # 33 rad times a factor that is right to 1e-4 * 5e-14 K and its own rounding.
    assert jones(moved) == pytest.approx(jones(other), abs=1e-13)


def test_warmer_by_t_is_the_plate_of_another_wavelength(jones):
    """Path difference over wavelength is all that counts: 1 + drift dT in one is 1/(1 + drift dT) in the other."""
    warm = plate(7, 323.15)
    cold = plate(7, 293.15)
    factor = 1 + QUARTZ * 30
    assert jones(warm) == pytest.approx(jones(cold, wavelength=532 * nm / factor), abs=1e-13)


def test_two_crossed_plates_of_one_material_drift_as_their_difference(jones):
    """The usual zero-order plate: 10.25 waves and 10 waves crossed are a quarter wave and drift as one."""
    warm = {"design": 532 * nm, "drift": QUARTZ, "temperature": 343.15}
    pair = jones(Retarder(fast=90 * deg, retardance=0, order=10, **warm)) @ jones(
        Retarder(fast=0, retardance=90 * deg, order=10, **warm)
    )
    assert pair == pytest.approx(jones(plate(0, 343.15)), abs=1e-13)
    assert pair != pytest.approx(jones(plate(10, 343.15)), abs=0.1)


def test_q_plates_and_patterned_plates_follow_too(jones):
    warm = {"drift": -2e-3, "temperature": 303.15}
    assert QPlate(q=0.5, **warm).unconverted(532 * nm) == pytest.approx(math.sin(0.01 * math.pi) ** 2, rel=1e-12)
    drawn = PatternedRetarder(fast=lambda x, y: 0.5 * np.arctan2(y, x), retardance=lambda x, y: 3 + 0 * x * y, **warm)
    spot = {"x": np.array(0.2), "y": np.array(0.3)}
    same = QPlate(q=0.5, retardance=3.0, **warm)
    assert jones(drawn, **spot) == pytest.approx(jones(same, phi=math.atan2(0.3, 0.2)), abs=1e-14)


def test_numbers_agree_with_letters(agrees):
    values = {"temperature": 301.0, "design_temperature": 295.0, "drift": -1.5e-4}
    agrees(lambda **v: Retarder(fast=0.3, retardance=1.2, order=4, design=600 * nm, **v), values)
    agrees(lambda **v: QPlate(q=1, retardance=3.0, **v), values)


def test_a_plate_without_drift_keeps_its_letters_exact():
    delta = sympy.Symbol("delta", real=True)
    assert Retarder(fast=0, retardance=delta).retardance_at(532 * nm) == delta
    assert QPlate(q=1, retardance=delta).retardance_at(532 * nm) == delta
    assert warming(0.0, sympy.Symbol("T"), 293.15) == 1


def bench(**values):
    return fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=0.8 * mm, power=1e-3, state=fa.D, name="laser"),
        fa.HalfWavePlate(fast=0, order=12, design=532 * nm, name="hwp", **values),
        fa.Camera(pixel=100 * um, shape=(64, 64), name="cam"),
    )


def test_temperature_is_swept_and_derived():
    temperatures = [288.15, 293.15, 300.0]
    shots = bench(drift=QUARTZ).sweep({"hwp.temperature": temperatures}, "cam", fa.A)
    T = sympy.Symbol("T", real=True)
    form = bench(drift=QUARTZ, temperature=T).derive("cam")
    for k, temperature in enumerate(temperatures):
        # D behind a plate along x and an analyzer at -45 deg: sin^2(d/2).
        passed = math.sin((25 * math.pi) * (1 + QUARTZ * (temperature - 293.15)) / 2) ** 2
        assert shots.frame(k, fa.A).sum() / shots.stokes(k)[0].sum() == pytest.approx(passed, rel=1e-9)
        assert float(form.frame(-45 * deg).subs(T, temperature)) == pytest.approx(passed, rel=1e-9)


@pytest.mark.parametrize(
    ("given", "said", "fix"),
    [
        ({"temperature": 25}, "temperature = 25; temperature is in kelvin, 150 to 1000", "temperature=273.15 + 25"),
        ({"design_temperature": -5}, "design_temperature = -5; ", "design_temperature=273.15 + -5"),
        ({"temperature": 120}, "temperature = 120; ", "temperature=293.15"),
        ({"drift": -100}, "drift = -100; drift is the share of its retardance that a plate gains", "drift=-0.0001"),
        ({"drift": 1e9}, "drift = 1e+09; ", "drift=-0.0001"),
    ],
)
@pytest.mark.parametrize("kind", [HalfWavePlate, PatternedRetarder])
def test_degrees_celsius_and_parts_per_million_are_refused(kind, given, said, fix):
    with pytest.raises(ParameterError) as refusal:
        kind(fast=0.1, name="it", **given)
    assert str(refusal.value).startswith(f"it: {said}")
    assert refusal.value.fix == fix
    kind(fast=0.1, **eval(f"dict({fix})"))
