"""What a form says: Jones vector, Stokes parameters, frames, power, text."""

from math import pi

import numpy as np
import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.errors import SymbolError


def test_a_retarder(form, letters):
    a, _, d, *_ = letters
    made = form(fa.Retarder(fast=a, retardance=d))
    ex, ey = made.jones()
    assert ex == sp.cos(d / 2) - sp.I * sp.sin(d / 2) * sp.cos(2 * a)
    assert ey == -sp.I * sp.sin(d / 2) * sp.sin(2 * a)


def test_a_q_plate_swaps_hands_and_adds_charge(form, letters):
    a, *_, q = letters
    left, right = form(fa.QPlate(q=q, offset=a), state=fa.L).jones("circular", global_phase=True)
    assert left == 0
    assert sp.expand(right + sp.I * sp.exp(2 * sp.I * (q * PHI + a))) == 0


def test_the_frame_of_a_tuned_q_plate_is_one_square(form, letters):
    a, b, _, _, t, q = letters
    assert (
        form(fa.HalfWavePlate(fast=b), fa.QPlate(q=q, offset=a)).frame(t)
        == sp.cos(2 * q * PHI + 2 * a - 2 * b - t) ** 2
    )


def test_the_frame_of_a_detuned_q_plate(form, letters):
    a, _, d, _, t, q = letters
    lit = sp.sin(d / 2) ** 2 * sp.cos(2 * q * PHI + 2 * a - t) ** 2 + sp.cos(d / 2) ** 2 * sp.cos(t) ** 2
    assert form(fa.QPlate(q=q, offset=a, retardance=d)).frame(t) == lit


def test_two_q_plates_with_relative_roll_and_an_analyzer_that_turns_along(form, letters):
    a, b, _, _, t, _ = letters
    made = form(fa.QPlate(q=0.5, offset=a), fa.QPlate(q=1.5, offset=b))
    # 2q phi of the second minus that of the first; linear light at 0 goes to 2(phi/2 + a), then mirrors at the next axis.
    assert made.frame(t + 2 * b) == sp.cos(2 * PHI - 2 * a - t) ** 2


def test_state_settings_and_plate_settings(form, letters):
    a, *_ = letters
    made = form(fa.Retarder(fast=a, retardance=pi / 2))
    by_state = made.frame(fa.R)
    by_plate = made.frame(fa.plate_then_polarizer(fast=-pi / 4, axis=0.0))
    assert sp.expand(by_state - by_plate) == 0
    # A quarter-wave plate with its fast axis at +45 degrees makes H into R, at -45 degrees into L.
    assert by_state == sp.cos(a - sp.pi / 4) ** 2


def test_plate_then_polarizer_with_letters(form, letters):
    a, b, *_ = letters
    assert form().frame(fa.plate_then_polarizer(fast=a, axis=b, retardance=pi)) == sp.cos(2 * a - b) ** 2


def test_global_phase_is_kept_on_request(form, letters):
    a, *_ = letters
    made = form(fa.PhaseShift(phase=a))
    assert made.jones(global_phase=True)[0] == sp.exp(sp.I * a)
    assert made.jones()[0] == 1


def test_a_mixture_has_no_jones_vector(form):
    made = form(fa.Polarizer(axis=0.0), state=fa.UNPOLARIZED)
    assert list(made.stokes) == [sp.Rational(1, 2), sp.Rational(1, 2), 0, 0]
    with pytest.raises(SymbolError, match="a mixture has no Jones vector"):
        made.jones()


def test_power_of_a_chain_of_polarizers(form, letters):
    a, b, *_ = letters
    made = form(fa.Polarizer(axis=a), fa.Polarizer(axis=b))
    assert made.power == sp.cos(a) ** 2 * sp.cos(a - b) ** 2


def test_power_of_a_leaky_polarizer(form):
    x = sp.Symbol("x", positive=True)
    assert form(fa.Polarizer(axis=pi / 2, extinction=x)).power == 1 / x


def test_power_does_not_depend_on_travel(form, letters):
    *_, d, _, _, _ = letters
    parts = (fa.QPlate(q=0.5, retardance=d), fa.FreeSpace(0.5), fa.Polarizer(axis=0.0))
    assert sp.simplify(form(*parts).power - form(parts[0], parts[2]).power) == 0


def test_harmonics_of_a_rotating_plate(form, letters):
    a, _, d, *_ = letters
    found = form(fa.Retarder(fast=a, retardance=d), state=fa.linear(0.0)).harmonics(0.0, a)
    assert set(found) == {0, 4}
    assert sp.simplify(found[4][0] - sp.sin(d / 2) ** 2 / 2) == 0
    assert found[4][1] == 0


def test_harmonics_need_an_angle_that_enters_in_proportion(form, letters):
    a, *_ = letters
    with pytest.raises(SymbolError, match="enters in proportion"):
        form(fa.HalfWavePlate(fast=a**2)).harmonics(0.0, a)


def test_series_is_the_taylor_sum(form, letters):
    a, _, _, e, t, _ = letters
    made = form(fa.HalfWavePlate(fast=a + e))
    wanted = sp.series(sp.cos(2 * a + 2 * e - t) ** 2, e, 0, 4).removeO()
    assert sp.simplify(sp.expand_trig(sp.expand(made.series(t, [e], order=3) - wanted))) == 0


def test_text_reads_back(form, letters):
    a, _, d, _, t, _ = letters
    made = form(fa.Retarder(fast=a, retardance=d))
    names = {str(s): s for s in (*letters, PHI, R)}
    assert sp.sympify(made.to_text("frame", t), locals=names) == made.frame(t)


def test_latex_uses_the_users_letters_and_explains_its_own(form):
    w, z, lam = sp.symbols("w_0 z lambda", positive=True)
    made = form(fa.FreeSpace(z), laser=fa.Laser(waist=w, power=1.0), wavelength=lam)
    text = made.latex("irradiance")
    assert r"\text{with }" in text
    assert "w_{0}" in text
    assert r"\lambda" in text
    assert made._repr_latex_().startswith("$")


def test_numeric_function_broadcasts_and_asks_for_missing_letters(form, letters):
    a, _, _, _, t, _ = letters
    function = form(fa.QPlate(q=0.5, offset=a)).to_function("frame", t)
    phi = np.linspace(0, 6, 7)
    assert function(alpha=0.2, theta=0.1, phi=phi) == pytest.approx(np.cos(phi + 0.3) ** 2, abs=1e-15)
    with pytest.raises(SymbolError, match="no value for alpha, theta") as caught:
        function(phi=phi)
    assert caught.value.fix == "function(alpha=0.1, theta=0.1)"


def test_the_form_lists_what_it_assumes(form, letters):
    a, *_ = letters
    lines = "\n".join(form(fa.HalfWavePlate(fast=a)).assumptions)
    assert "alpha" in lines
    assert "paraxial" in lines


@pytest.mark.parametrize("name", ["r", "phi"])
def test_letters_of_the_plane_are_refused(form, name):
    with pytest.raises(SymbolError, match=f"the letter {name} in the train"):
        form(fa.HalfWavePlate(fast=sp.Symbol(name, real=True)))


def test_two_letters_of_one_name_are_refused(form):
    with pytest.raises(SymbolError, match="two letters of one name"):
        form(fa.HalfWavePlate(fast=sp.Symbol("a")), fa.HalfWavePlate(fast=sp.Symbol("a", real=True)))


def test_a_letter_that_is_not_real_is_refused(form):
    with pytest.raises((SymbolError, fa.ParameterError), match="real"):
        form(fa.HalfWavePlate(fast=sp.Symbol("a", imaginary=True)))


def test_a_complex_expression_of_letters_is_refused(form):
    with pytest.raises((SymbolError, fa.ParameterError), match="real"):
        form(fa.HalfWavePlate(fast=sp.I * sp.Symbol("a")))


def test_a_pattern_has_no_closed_form(form):
    mask = fa.PatternedRetarder(fast=lambda x, y: 0 * x, retardance=pi)
    with pytest.raises(SymbolError, match="no closed form"):
        form(mask)


def test_an_unknown_way_or_basis_or_setting(form):
    made = form()
    with pytest.raises(SymbolError, match="forms are written"):
        made.frame(0.0, way="short")
    with pytest.raises(SymbolError, match="one of two bases"):
        made.jones("diagonal")
    with pytest.raises(SymbolError, match="a setting is an angle"):
        made.frame("H")


def test_a_form_is_printed_in_a_line(form, letters):
    """A method printed without its brackets shows the form it belongs to."""
    made = form(fa.Retarder(fast=letters[0], retardance=letters[2]))
    assert repr(made).startswith("<Form: light at ")
    assert str(letters[0]) in repr(made)
    assert len(str(made.jones)) < 200
    assert "\n" not in repr(made)
