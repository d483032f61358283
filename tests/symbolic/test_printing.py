"""How expressions are printed, and the sentences for questions that cannot be answered."""

import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.printing import as_latex, as_text
from fastaxis.errors import SymbolError

a, b, q, t = sp.symbols("alpha beta q theta", real=True)


@pytest.mark.parametrize(
    ("expression", "text"),
    [
        (sp.cos(-2 * a + b + t) ** 2, "cos(2*alpha - beta - theta)**2"),
        (sp.cos(2 * a + 2 * q * PHI), "cos(2*alpha + 2*q*phi)"),
        (sp.cos(a) / 2 + sp.Rational(1, 2), "(cos(alpha) + 1)/2"),
        (-sp.I * sp.sin(a) + sp.cos(a), "cos(alpha) - I*sin(alpha)"),
        (sp.Rational(133, 250000000) * a, "5.32e-7*alpha"),
        (sp.hyper((sp.Rational(3, 2),), (2,), -(R**2)), "1F1(3/2; 2; -r**2)"),
    ],
)
def test_text(expression, text):
    assert as_text(expression) == text
    plain = text.replace("1F1(3/2; 2; -r**2)", "0")
    names = {str(s): s for s in (a, b, q, t, PHI, R)}
    difference = sp.sympify(plain, locals=names) - expression if plain == text else sp.S.Zero
    # Six digits are printed.
    assert abs(complex(difference.subs({a: 0.3, b: 0.7, q: 1.5, t: 0.2, PHI: 1.1}))) < 1e-6


def test_latex_of_a_kummer_function():
    assert as_latex(sp.hyper((2,), (3,), a) ** 2) == r"{}_1F_1\left(2;\, 3;\, \alpha\right)^{2}"


def test_a_form_shows_its_envelope(form):
    made = form(fa.SpiralPlate(charge=1), fa.FreeSpace(sp.Symbol("z", positive=True)))
    assert "envelope = " in str(made)
    assert "1F1(" in str(made)


def test_dark_angles_are_sentences(form):
    d = sp.Symbol("delta", real=True)
    found = str(form(fa.Retarder(fast=a, retardance=d)).dark_when(t, t))
    assert "if sin(delta/2) = 0" in found


@pytest.mark.parametrize(
    ("question", "rule"),
    [
        (lambda made: made.latex("colour"), "a form has jones"),
        (lambda made: made.to_function("frame"), "belongs to an analyzer setting"),
        (lambda made: made.frame(t, way="harmonics"), "takes angle"),
        (lambda made: made.frame(t, way="compact", angle=a), "takes no letters"),
        (lambda made: made.frame(sp.Symbol("alpha")), "two letters of one name"),
        (lambda made: made.derivative(t, sp.Symbol("alpha")), "two letters of one name"),
        (lambda made: made.dark_when(sp.Symbol("phi"), t), "two letters of one name"),
    ],
)
def test_questions_that_cannot_be_answered(form, question, rule):
    with pytest.raises(SymbolError, match=rule):
        question(form(fa.HalfWavePlate(fast=a)))


def test_light_cut_by_a_stop_has_no_power_and_no_function(form):
    f, z = sp.symbols("f z", positive=True)
    made = form(fa.Aperture(radius=f), fa.FreeSpace(z))
    with pytest.raises(SymbolError, match="cut by a stop"):
        _ = made.power
    with pytest.raises(SymbolError, match="an integral left in it"):
        made.to_function("irradiance")(f=1e-3, z=1.0, r=1e-4)
