"""Answers read off forms."""

from math import pi

import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic.answers.darkness import TURN_COUNT, dark_when
from fastaxis.engines.symbolic.coordinates import PHI
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.errors import SymbolError


def test_bright_and_dark_analyzer_angles(form, letters):
    a, b, *_, q = letters
    found = form(fa.HalfWavePlate(fast=b), fa.QPlate(q=q, offset=a)).analyzer_angles()
    assert sp.expand(found.bright - (2 * q * PHI + 2 * a - 2 * b)) == 0
    assert sp.expand(found.dark - found.bright) == sp.pi / 2
    assert (found.brightest, found.darkest) == (1, 0)


def test_an_ellipse_leaves_some_light_in_the_dark(form):
    chi = sp.Symbol("chi", real=True)
    found = form(state=fa.elliptical(0.0, chi)).analyzer_angles()
    assert found.darkest.subs(chi, 0.3).evalf() == pytest.approx(float(sp.sin(0.3) ** 2), abs=1e-15)


def test_circular_light_has_no_dark_angle(form):
    with pytest.raises(SymbolError, match="the same through every linear analyzer"):
        form(state=fa.R).analyzer_angles()


def test_lobes_of_a_radial_beam_turn_with_the_analyzer(form, letters):
    *_, t, _ = letters
    found = form(fa.QPlate(q=0.5)).lobes(t)
    assert (found.count, found.first, found.turning, found.contrast) == (2, t, 1, 1)


def test_a_half_wave_plate_behind_the_q_plate_turns_them_back(form, letters):
    a, *_, t, _ = letters
    assert form(fa.QPlate(q=0.5), fa.HalfWavePlate(fast=a)).lobes(t).turning == -1


def test_lobes_need_one_harmonic(form, letters):
    *_, t, _ = letters
    with pytest.raises(SymbolError, match="one harmonic of phi"):
        form(fa.HalfWavePlate(fast=0.1)).lobes(t)


def test_all_branches_of_a_dark_port(form, letters):
    a, _, d, *_ = letters
    made = form(fa.Retarder(fast=a, retardance=d), fa.Polarizer(axis=sp.pi / 2))
    found = made.dark_when(a)
    assert found.branches == (sp.pi * TURN_COUNT / 2,)
    assert found.others == (sp.sin(d / 2),)
    assert made.dark_when(d).branches == (2 * sp.pi * TURN_COUNT,)


def test_a_dark_analyzer_follows_the_plate(form, letters):
    a, _, _, _, t, _ = letters
    (branch,) = form(fa.HalfWavePlate(fast=a)).dark_when(t, t).branches
    assert sp.expand(branch - (2 * a + sp.pi / 2 + sp.pi * TURN_COUNT)) == 0


def test_no_solution_is_said(form, letters):
    a, _, _, _, t, _ = letters
    assert str(form(fa.HalfWavePlate(fast=a)).dark_when(a)) == "no solution"
    assert not form(state=fa.R).dark_when(t, t)


def test_elliptical_light_is_dark_under_two_conditions_only(form, letters):
    a, _, d, _, t, _ = letters
    # cos(d/2) cos t - i sin(d/2) cos(2a - t).
    found = form(fa.Retarder(fast=a, retardance=d)).dark_when(t, t)
    assert {
        sp.expand(branch): condition for branch, condition in zip(found.branches, found.conditions, strict=True)
    } == {
        sp.pi / 2 + sp.pi * TURN_COUNT: sp.Eq(sp.sin(d / 2), 0),
        2 * a + sp.pi / 2 + sp.pi * TURN_COUNT: sp.Eq(sp.cos(d / 2), 0),
    }


def test_a_branch_inside_another_is_shared(form, letters):
    a, b, d, *_ = letters
    # sin^2(d/2) sin(2a - 2b) and sin(d) sin(a + b) cos(a - b) vanish together.
    found = form(fa.Retarder(fast=a, retardance=d), fa.Retarder(fast=b, retardance=d)).dark_when(d, sp.pi / 2)
    assert dict(zip(found.branches, found.conditions, strict=True)) == {
        2 * sp.pi * TURN_COUNT: sp.true,
        sp.pi * TURN_COUNT: sp.Eq(sp.sin(2 * a - 2 * b), 0),
    }


def _solved(expression, letter):
    return dark_when((ExactMaths(Ring()).number(expression),), letter)


def test_both_signs_of_an_opening_are_branches(letters):
    a, b, d, *_ = letters
    found = _solved(sp.cos(d - a) - sp.Rational(1, 2), d)
    assert len(found.branches) == 2
    for branch in found.branches:
        assert sp.simplify(sp.cos(branch.subs(TURN_COUNT, 3) - a)) == sp.Rational(1, 2)
    assert found.conditions == (sp.true, sp.true)
    assert [c.subs({a: 0.2, b: 0.1}) for c in _solved(sp.cos(d) * sp.cos(a) - sp.cos(b), d).conditions] == [
        sp.false
    ] * 2


def test_a_constant_too_large_has_no_solution(letters):
    _, _, d, *_ = letters
    assert str(_solved(sp.cos(d) - 2, d)) == "no solution"


def test_two_harmonics_that_do_not_factor_are_refused(letters):
    a, _, d, *_ = letters
    with pytest.raises(SymbolError, match="in one harmonic"):
        _solved(3 * sp.cos(2 * d) + sp.cos(d - a), d)


def test_always_dark_is_said(form, letters):
    a, *_ = letters
    found = form(fa.Polarizer(axis=0.0), fa.Polarizer(axis=sp.pi / 2), fa.HalfWavePlate(fast=a)).dark_when(a)
    assert str(found) == "dark at every alpha"


def test_the_slope_is_the_derivative(form, letters):
    a, _, d, _, t, _ = letters
    made = form(fa.Retarder(fast=a, retardance=d))
    for letter in (a, d):
        slope = made.derivative(t, letter) - sp.diff(made.frame(t), letter)
        values = {a: 0.3, d: 0.7, t: 1.1}
        assert abs(slope.subs(values).evalf()) < 1e-14


def test_the_slope_with_a_transmission(form):
    share = sp.Symbol("T", positive=True)
    assert form(fa.HalfWavePlate(fast=0.0, transmission=share**2)).derivative(0.0, share) == 2 * share


def test_mistakes_are_ranked_by_the_order_they_show_in(form, letters):
    _, _, d, e, _, _ = letters
    made = form(fa.HalfWavePlate(fast=e), fa.QPlate(q=0.5, retardance=sp.pi + d))
    first, second = made.mistakes(sp.pi / 2, [d, e])
    assert (first.error, first.order) == (e, 1)
    assert (second.error, second.order) == (d, 2)
    # sin^2 phi (1 - d^2/4): the detuning takes most where the frame is brightest.
    assert second.change == -(d**2) * sp.sin(PHI) ** 2 / 4
    assert second.azimuth == pytest.approx(pi / 2, abs=2 * pi / 3600)


def test_a_mistake_that_never_shows(form, letters):
    _, _, _, e, _, _ = letters
    (found,) = form(fa.Retarder(fast=0.0, retardance=e)).mistakes(0.0, [e])
    assert (found.order, found.change) == (0, 0)
