import math
import pickle

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.errors import SymbolError
from fastaxis.light import A, D, H, L, R, State, V, elliptical, linear, stokes
from fastaxis.maths import NUMBERS
from fastaxis.units import deg

SIX = {
    "H": (H, (1, 0), (1, 0, 0)),
    "V": (V, (0, 1), (-1, 0, 0)),
    "D": (D, (math.sqrt(0.5), math.sqrt(0.5)), (0, 1, 0)),
    "A": (A, (math.sqrt(0.5), -math.sqrt(0.5)), (0, -1, 0)),
    "R": (R, (math.sqrt(0.5), -1j * math.sqrt(0.5)), (0, 0, 1)),
    "L": (L, (math.sqrt(0.5), 1j * math.sqrt(0.5)), (0, 0, -1)),
}
azimuths = st.floats(-math.pi / 2, math.pi / 2)
ellipticities = st.floats(-math.pi / 4, math.pi / 4)
# A dozen roundings of numbers up to 1.
FEW_ROUNDINGS = 4e-15


@pytest.mark.parametrize("label", SIX)
def test_the_six_states_stand_for_the_vectors_of_the_sign_set(label):
    state, jones, sphere = SIX[label]
    assert state.label == label
    np.testing.assert_allclose(state.jones, jones, rtol=0, atol=2e-16)
    np.testing.assert_array_equal(state.stokes, (1, *sphere))


def test_circular_states_have_exactly_nothing_of_the_other_hand():
    assert R.circular(NUMBERS)[0] == 0
    assert L.circular(NUMBERS)[1] == 0


@settings(max_examples=40)
@given(azimuths, ellipticities, st.floats(-math.pi, math.pi))
def test_circular_components_are_the_projections_of_the_linear_ones(azimuth, ellipticity, phase):
    state = State(azimuth, ellipticity, phase)
    ex, ey = state.jones
    left, right = state.circular(NUMBERS)
    assert left == pytest.approx((ex - 1j * ey) / math.sqrt(2), abs=FEW_ROUNDINGS)
    assert right == pytest.approx((ex + 1j * ey) / math.sqrt(2), abs=FEW_ROUNDINGS)


@settings(max_examples=40)
@given(azimuths, ellipticities)
def test_the_sphere_agrees_with_the_vector_and_the_power_is_one(azimuth, ellipticity):
    state = State(azimuth, ellipticity)
    np.testing.assert_allclose(stokes(state.jones), state.stokes, rtol=0, atol=FEW_ROUNDINGS)
    assert np.vdot(state.jones, state.jones).real == pytest.approx(1, abs=FEW_ROUNDINGS)


@settings(max_examples=40)
@given(azimuths, ellipticities, st.floats(-math.pi, math.pi))
def test_the_orthogonal_state_lies_opposite_on_the_sphere(azimuth, ellipticity, phase):
    state = State(azimuth, ellipticity, phase)
    other = state.orthogonal
    assert abs(np.vdot(state.jones, other.jones)) < FEW_ROUNDINGS
    np.testing.assert_allclose(other.stokes[1:], -state.stokes[1:], rtol=0, atol=FEW_ROUNDINGS)


def test_orthogonal_pairs_keep_their_names():
    assert [state.orthogonal for state in (H, V, D, A, R, L)] == [V, H, A, D, L, R]
    assert linear(30 * deg).orthogonal.label == "not 30°"


def test_symbols_give_the_same_field_as_numbers(symbols):
    a, e, p = sympy.symbols("a e p", real=True)
    values = {a: 0.3, e: -0.2, p: 0.7}
    for form in ("linear", "circular"):
        letters = getattr(State(a, e, p), form)(symbols)
        numbers = getattr(State(0.3, -0.2, 0.7), form)(NUMBERS)
        for letter, number in zip(letters, numbers, strict=True):
            assert complex(letter.subs(values)) == pytest.approx(number, abs=FEW_ROUNDINGS)


def test_symbolic_circles_stay_exact(symbols):
    e = sympy.Symbol("e", real=True)
    left, right = State(0, e).circular(symbols)
    assert left.subs(e, sympy.pi / 4) == 0
    assert right.subs(e, sympy.pi / 4) == 1


def test_exact_numbers_of_sympy_count_as_numbers():
    np.testing.assert_allclose(State(sympy.pi / 4).jones, D.jones, rtol=0, atol=2e-16)


def test_states_travel_between_processes():
    assert pickle.loads(pickle.dumps(elliptical(25 * deg, -12 * deg))) == elliptical(25 * deg, -12 * deg)


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("State(azimuth=45)", "state: azimuth = 45.0; azimuth is in radians and 45 rad is 7.2 turns"),
        ("State(azimuth='H')", "azimuth must be one real, finite number or a symbol"),
        ("State(azimuth=0, ellipticity=60*deg)", "ellipticity = 1.0472 rad; ellipticity lies between -45 and 45 degrees"),
        ("State(azimuth=0, ellipticity=-60*deg)", "(fix: azimuth=90*deg, ellipticity=-30*deg)"),
    ],
)  # fmt: skip
def test_refusals(refuses, code, text):
    refuses(code, text)


@pytest.mark.parametrize(
    ("code", "text"),
    [
        (
            "linear(sympy.Symbol('a')).jones",
            "a: symbol a in azimuth = a, ellipticity = 0.0, phase = 0.0; numbers can be",
        ),
        ("linear(sympy.Symbol('a')).stokes", "put a number for each symbol"),
    ],
)
def test_symbols_are_refused_where_numbers_are_asked(refuses, code, text):
    refuses(code, text, SymbolError)


def test_a_label_is_only_a_name():
    assert linear(45 * deg) == D
    assert hash(linear(45 * deg)) == hash(D)
    assert linear(0.0).orthogonal.label == "V"
