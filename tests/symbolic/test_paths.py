"""Forms of light that comes by several paths."""

import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic import derive
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.errors import SymbolError

w, lam, R = sp.symbols("w lambda R", positive=True)
a, b, p = sp.symbols("alpha beta psi", real=True)


def vanishes(expression):
    return ExactMaths(Ring()).number(expression).is_zero()


def interferometer(arm, *, ratio=0.5, lengths=None):
    """Two splitters and two mirrors; ``arm`` stands in the transmitted arm."""
    train = fa.Train(wavelength=lam)
    spaces = [fa.FreeSpace(length) for length in lengths] if lengths else [fa.PhaseShift(phase=0.0)] * 2
    train.along(fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0), fa.BeamSplitter(reflectance=ratio, name="first"))
    train.along("first.transmitted", spaces[0], *arm, fa.Mirror(), fa.BeamSplitter(reflectance=ratio, name="second"))
    train.along("first.reflected", spaces[1], fa.Mirror(), "second.side")
    return train


def test_the_two_ports_of_an_interferometer_share_all_power():
    """L. Zehnder (1891), L. Mach (1892): cos^2 and sin^2 of half the phase."""
    train = interferometer([fa.PhaseShift(phase=p)])
    first, second = derive(train, "second.transmitted").power, derive(train, "second.reflected").power
    assert vanishes(first + second - 1)
    assert {sp.simplify(first), sp.simplify(second)} == {sp.cos(p / 2) ** 2, sp.sin(p / 2) ** 2}


def test_a_letter_for_the_splitting_ratio():
    train = interferometer([fa.PhaseShift(phase=p)], ratio=R)
    power = derive(train, "second.transmitted").power
    # One way is transmitted twice, the other reflected twice: t^2 exp(i psi) + (i r)^2.
    assert vanishes(power - ((1 - R) ** 2 + R**2 - 2 * R * (1 - R) * sp.cos(p)))
    assert vanishes(power + derive(train, "second.reflected").power - 1)


def test_a_half_wave_plate_in_one_arm_marks_the_path():
    """Fresnel and Arago: light of crossed polarizations does not interfere; visibility |cos 2 alpha|."""
    train = interferometer([fa.PhaseShift(phase=p), fa.HalfWavePlate(fast=a)])
    total = derive(train, "second.transmitted").power
    # 1/2 + v/2 cos(psi - psi_0): the squares of the first two slopes add up to v^2/4.
    assert vanishes(sp.diff(total, p) ** 2 + sp.diff(total, p, 2) ** 2 - sp.cos(2 * a) ** 2 / 4)


def test_path_lengths_enter_as_an_exact_phase():
    one, two = sp.symbols("L_1 L_2", positive=True)
    power = derive(interferometer([], lengths=(one, two)), "second.transmitted").power
    assert vanishes(power - sp.sin(sp.pi * (one - two) / lam) ** 2)


def test_forms_of_several_paths_agree_with_numbers():
    train = interferometer([fa.QPlate(q=0.5, retardance=a), fa.SpiralPlate(charge=1)], ratio=0.45)
    # Two paths of eight parts each.
    assert derive(train, "second.transmitted").check(points=4).roundings < 200


def test_light_of_two_lasers_adds_up_in_power():
    train = fa.Train(wavelength=lam)
    train.along(fa.Laser(waist=w, power=0.2, state=fa.H), fa.BeamSplitter(reflectance=0.5, name="bs"))
    train.along(fa.Laser(waist=w, power=0.1, state=fa.V), "bs.side")
    found = derive(train, "bs.transmitted")
    assert found.power == sp.Rational(3, 20)
    assert list(found.stokes) == [sp.Rational(1, 2), sp.Rational(1, 6), 0, 0]


def test_a_loop_has_no_closed_form():
    train = fa.Train(wavelength=lam)
    train.along(fa.Laser(waist=w), fa.BeamSplitter(name="bs"))
    train.along("bs.reflected", fa.Mirror(), fa.Rotator(angle=b), fa.Mirror(), fa.Mirror(), "bs.side")
    with pytest.raises(SymbolError, match="a loop on the way"):
        derive(train, "bs.reflected")
