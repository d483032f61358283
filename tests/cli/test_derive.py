import numpy as np
import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic.checking import Check

SWITCH = """\
import sympy
alpha = sympy.Symbol("alpha", real=True)
train = fa.Train(wavelength=532*nm, name="switch")
train.along(
    fa.Laser(waist=0.8*mm, power=4*mW, state=fa.H, name="laser"),
    fa.HalfWavePlate(fast=alpha, name="hwp"),
    fa.QPlate(q=0.5, name="qp"),
    fa.Camera(pixel=20*um, name="cam"),
)
"""


def formulas(text):
    pairs = (line.split(" = ", 1) for line in text.splitlines() if " = " in line and not line.startswith("signs"))
    return {name.strip(): value for name, value in pairs}


def parsed(text):
    return sp.sympify(text, locals={name: sp.Symbol(name, real=True) for name in ("alpha", "theta", "phi", "r")})


def test_the_switch_as_a_formula(bench, run):
    ran = run("derive", bench(SWITCH), "--setting", "theta")
    found = formulas(ran.out)
    alpha, theta, phi = (sp.Symbol(name, real=True) for name in ("alpha", "theta", "phi"))
    # Local azimuth phi - 2 alpha: the half-wave plate turns H to 2 alpha, and the q-plate turns that to phi - 2 alpha.
    assert sp.simplify(parsed(found["frame behind theta"]) - sp.cos(phi - 2 * alpha - theta) ** 2) == 0
    assert sp.simplify(parsed(found["S1"]) - sp.cos(2 * phi - 4 * alpha)) == 0
    assert found["S3"] == "0"
    assert fa.stamp() in ran.out


def test_a_numeric_check_stands_beside_the_formula(bench, run):
    assert "checked: largest deviation" in run("derive", bench(SWITCH)).out


def test_a_letter_may_get_a_value(bench, run):
    found = formulas(run("derive", bench(SWITCH), "--symbol", "alpha=0deg").out)
    assert "alpha" not in found["S1"]


@pytest.mark.parametrize("view", ["receiver", "source"])
def test_s3_and_r_follow_the_view_together(bench, run, view):
    found = formulas(run("derive", bench(), "--setting", "R", "--view", view).out)
    # The small bench sends L (helicity +1), which the source's view calls R.
    expected = {"receiver": ("-1", "0"), "source": ("1", "1")}[view]
    assert (found["S3"], found["frame behind R"]) == expected


def test_names_in_a_formula_are_explained(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, name="laser"), fa.FreeSpace(1*m), fa.Camera(pixel=20*um, name="cam"))
    """
    assert "    with w = " in run("derive", bench(text)).out


def test_a_form_that_cannot_be_checked_says_so(bench, run, monkeypatch):
    def refuse(*_, **__):
        raise fa.SamplingError("a window is too small", got="cam: 1 mm", fix="--grid 64,2mm")

    monkeypatch.setattr("fastaxis.engines.symbolic.form.Form.check", refuse)
    ran = run("derive", bench(SWITCH))
    assert ran.code == 0
    assert "not checked: cam: 1 mm; a window is too small" in ran.out


@pytest.mark.parametrize(("roundings", "says"), [(12.0, "  checked: "), (1e14, "  NOT CONFIRMED, do not rely")])
def test_a_form_that_disagrees_with_numbers_is_not_called_checked(bench, run, monkeypatch, roundings, says):
    check = Check(roundings, 24, "numbers")
    monkeypatch.setattr("fastaxis.engines.symbolic.form.Form.check", lambda *_, **__: check)
    assert says in run("derive", bench(SWITCH)).out


def test_latex(bench, run):
    alpha, phi = (sp.Symbol(name, real=True) for name in ("alpha", "phi"))
    found = formulas(run("derive", bench(SWITCH), "--latex").out)
    assert found["S1"] == sp.latex(sp.cos(2 * phi - 4 * alpha))


def test_unpolarized_light_has_stokes_parameters_only(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    train.along(fa.Laser(waist=1*mm, state=fa.UNPOLARIZED, name="laser"), fa.Detector(name="meter"))
    """
    found = formulas(run("derive", bench(text)).out)
    assert "Ex" not in found
    assert [found[f"S{k}"] for k in (1, 2, 3)] == ["0", "0", "0"]


def test_a_part_without_a_formula_is_one_sentence(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm)
    plate = fa.PatternedRetarder(fast=lambda x, y: x*0, name="halves")
    train.along(fa.Laser(waist=1*mm), plate, fa.Detector(name="meter"))
    """
    ran = run("derive", bench(text))
    assert ran.code == 1
    assert ran.err.startswith("fastaxis: halves")


def test_a_form_that_numbers_do_not_confirm_ends_with_a_code_of_its_own(bench, run, monkeypatch):
    wrong = Check(roundings=1e15, points=3, beside="numbers")
    monkeypatch.setattr("fastaxis.engines.symbolic.form.Form.check", lambda *_a, **_k: wrong)
    ran = run("derive", bench(SWITCH))
    assert ran.code == 4
    assert "NOT CONFIRMED" in ran.out


def test_a_letter_for_the_analyzer_is_said_to_be_one(bench, run):
    assert "Q is no state (H, V, D, A, R, L): taken as a letter" in run("derive", bench(SWITCH), "--setting", "Q").err
    clash = run("derive", bench(SWITCH), "--setting", "alpha").err
    assert "caution: alpha is a letter of the bench too: the analyzer turns with it" in clash
    assert run("derive", bench(SWITCH), "--setting", "R").err == ""


METER = """\
train = fa.Train(wavelength=532*nm)
train.along(fa.Laser(waist=1*mm, state=fa.linear(20*deg), name="laser"), fa.QuarterWavePlate(fast=0*deg, name="qwp"),
            fa.FreeSpace(1*m), fa.Detector(name="meter"))
"""


def test_at_a_detector_the_powers_that_arrive_confirm_a_form(bench, run, monkeypatch):
    ran = run("derive", bench(METER))
    assert ran.code == 0
    assert "checked: S1 to S3 over S0 within" in ran.out
    assert "engine=" not in ran.out
    # H is sent and worked out numerically as V: that must be noticed.
    monkeypatch.setattr("fastaxis.engines.uniform.UniformField.total_stokes", np.array([1.0, -1.0, 0.0, 0.0]))
    assert run("derive", bench(METER)).code == 4
