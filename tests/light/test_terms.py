import math
import pickle

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.errors import SymbolError
from fastaxis.light import A, Beam, D, FlatTop, Gaussian, H, HermiteGauss, L, LaguerreGauss, R, State, Term, V, stokes
from fastaxis.units import mm, nm

W = 0.5 * mm
LINE = 633 * nm
numbers = st.complex_numbers(max_magnitude=2, allow_subnormal=False)


def plane(reach=4 * mm, count=300):
    line = (np.arange(count) - (count - 1) / 2) * (2 * reach / count)
    return *np.meshgrid(line, line), (2 * reach / count) ** 2


def test_one_term_has_the_power_of_its_amplitude():
    assert Beam((Term(0.6 + 0.8j, Gaussian(W), H),)).power(LINE) == pytest.approx(1, abs=1e-15)
    assert Beam(Term(2, Gaussian(W), H)).power(LINE) == 4


def test_orthogonal_terms_add_in_power_and_equal_ones_in_amplitude():
    one = Term(1, LaguerreGauss(0, 1, W), L)
    assert Beam((one, Term(1, LaguerreGauss(0, 1, W), R))).power(LINE) == pytest.approx(2, abs=1e-15)
    assert Beam((one, Term(1, LaguerreGauss(0, -1, W), L))).power(LINE) == pytest.approx(2, abs=1e-15)
    assert Beam((one, Term(1j, LaguerreGauss(0, 1, W), L))).power(LINE) == pytest.approx(2, abs=1e-15)
    assert Beam((one, one)).power(LINE) == pytest.approx(4, abs=1e-15)


def test_the_phase_of_a_state_counts_between_terms():
    flipped = State(0, math.pi / 4, math.pi)  # -R
    beam = Beam((Term(1, Gaussian(W), R), Term(0.5, Gaussian(W), flipped)))
    assert beam.power(LINE) == pytest.approx(0.25, abs=1e-15)


@settings(max_examples=25)
@given(numbers, numbers, numbers)
def test_power_by_overlaps_is_the_integral_of_the_light(a, b, c):
    terms = (
        Term(a, Gaussian(W, 0.4), H),
        Term(b, LaguerreGauss(1, 1, 0.7 * mm, centre=(0.2 * mm, 0)), D),
        Term(c, HermiteGauss(1, 2, W), State(0.3, 0.2, 0.5)),
    )
    if abs(a) ** 2 + abs(b) ** 2 + abs(c) ** 2 < 1e-2:
        return
    x, y, cell = plane()
    field = sum(np.multiply.outer(t.number * t.state.jones, t.mode.amplitude(x, y, LINE)) for t in terms)
    beam = Beam(terms)
    assert beam.power(LINE) == pytest.approx(np.sum(abs(field) ** 2) * cell, rel=1e-11)
    np.testing.assert_allclose(beam.field(x, y, LINE), field * beam.scale(LINE), rtol=0, atol=1e-12 * abs(field).max())
    assert np.sum(stokes(beam.field(x, y, LINE))[0]) * cell == pytest.approx(1, abs=1e-11)


def test_a_radial_beam_points_outwards_everywhere():
    beam = Beam((Term(1, LaguerreGauss(0, -1, W), L), Term(1, LaguerreGauss(0, 1, W), R)))
    phi = np.linspace(-3, 3, 17)
    ex, ey = beam.field(W * np.cos(phi), W * np.sin(phi), LINE)
    # exp(-i phi) in L and exp(+i phi) in R is (cos phi, sin phi) at every azimuth.
    np.testing.assert_allclose(ex * np.sin(phi), ey * np.cos(phi), atol=1e-12 * abs(ex).max())
    np.testing.assert_allclose(abs(ex) ** 2 + abs(ey) ** 2, abs(ex[8]) ** 2 + abs(ey[8]) ** 2, rtol=1e-13)


def test_terms_of_orthogonal_states_need_no_overlap_of_modes():
    # A disc beside a finely curved beam would be too fine to integrate.
    beam = Beam((Term(1, FlatTop(10 * mm), H), Term(1, Gaussian(5e-6, centre=(5 * mm, 0)), V)))
    assert beam.power(LINE) == pytest.approx(2, abs=1e-15)


def test_a_shared_state_is_found():
    assert Beam((Term(1, Gaussian(W), D), Term(2, HermiteGauss(1, 0, W), D))).state == D
    assert Beam((Term(1, Gaussian(W), D), Term(2, HermiteGauss(1, 0, W), A))).state is None


def test_amplitudes_may_be_symbols():
    a, w, t = sympy.symbols("a w t", positive=True)
    beam = Beam((Term(a, Gaussian(w), State(t)), Term(sympy.sqrt(2) * sympy.I, Gaussian(W), H)))
    assert beam.symbols == {a, w, t}
    assert beam.terms[1].number == pytest.approx(1.4142135623730951j)


def test_beams_travel_between_processes():
    beam = Beam((Term(1j, Gaussian(W), D),))
    assert pickle.loads(pickle.dumps(beam)) == beam


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("Term(1, Gaussian(1*mm), UNPOLARIZED)", "term: state = unpolarized; a term of a coherent sum has a pure state"),
        ("Term(1, Gaussian(1*mm), 'H')", "term: state = str"),
        ("Term('half', Gaussian(1*mm), H)", "term: amplitude = 'half'; an amplitude is one finite complex number"),
        ("Term(float('nan'), Gaussian(1*mm), H)", "term: amplitude = nan"),
        ("Beam(())", "beam: terms = (); a beam is a sum of one or more terms"),
        ("Beam((1, 2))", "a beam is a sum of one or more terms"),
        ("Beam((Term(0, Gaussian(1*mm), H),)).power(633*nm)", "beam: power 0 from 1 terms; the terms of a beam must not"),
        ("Beam((Term(1, Gaussian(1*mm), H), Term(-1, Gaussian(1*mm), H))).scale(633*nm)", "must not cancel"),
    ],
)  # fmt: skip
def test_refusals(refuses, code, text):
    refuses(code, text)


def test_symbols_wait_for_numbers(refuses):
    refuses("Beam(Term(sympy.Symbol('a'), Gaussian(1*mm), H)).power(633*nm)", "term: amplitude = a", SymbolError)
