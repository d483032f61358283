import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.laws import Amplitude, CircularLaw
from fastaxis.maths import NUMBERS

angles = st.floats(-6, 6)
amplitudes = st.builds(Amplitude, st.floats(0, 1), angles)
laws = st.builds(CircularLaw, amplitudes, amplitudes, st.booleans())
U = np.array([[1, -1j], [1, 1j]]) / math.sqrt(2)
D = np.diag([-1.0, 1.0])
ROUNDING = 1e-14  # a product of three 2x2 matrices with entries up to 1
quick = settings(max_examples=50, deadline=None)


def linear(law):
    return np.array(law.linear(NUMBERS), dtype=complex)


@quick
@given(laws)
def test_bases_agree(law):
    assert np.array(law.circular(NUMBERS)) == pytest.approx(U @ linear(law) @ U.conj().T, abs=ROUNDING)


@quick
@given(laws)
def test_no_gain(law):
    assert np.linalg.norm(linear(law), 2) <= 1 + ROUNDING


@quick
@given(angles)
def test_opposite_phases_rotate_counter_clockwise(beta):
    c, s = math.cos(beta), math.sin(beta)
    law = CircularLaw(Amplitude(phase=-beta), Amplitude(phase=beta))
    assert linear(law) == pytest.approx(np.array([[c, -s], [s, c]]), abs=ROUNDING)


@quick
@given(amplitudes, amplitudes)
def test_backward_reciprocal_is_d_jt_d(left, right):
    law = CircularLaw(left, right)
    assert linear(law.backward()) == pytest.approx(D @ linear(law).T @ D, abs=ROUNDING)


@quick
@given(amplitudes, amplitudes)
def test_backward_faraday_is_the_same_matrix_on_laboratory_axes(left, right):
    law = CircularLaw(left, right, reciprocal=False)
    assert linear(law.backward()) == pytest.approx(D @ linear(law) @ D, abs=ROUNDING)


@quick
@given(laws, st.sampled_from("xy"))
def test_mirrored_is_d_j_d_and_twice_restores(law, axis):
    assert linear(law.mirrored(axis)) == pytest.approx(D @ linear(law) @ D, abs=ROUNDING)
    assert law.mirrored(axis).mirrored(axis) == law
    assert law.backward().backward() == law


def test_letters_agree_with_numbers(letters):
    beta = sympy.Symbol("beta", real=True)
    symbolic = CircularLaw(Amplitude(phase=-beta), Amplitude(phase=beta))
    number = CircularLaw(Amplitude(phase=-0.7), Amplitude(phase=0.7))
    for basis in ("linear", "circular"):
        value = sympy.Matrix(getattr(symbolic, basis)(letters)).subs(beta, 0.7).evalf()
        assert np.array(value, dtype=complex) == pytest.approx(np.array(getattr(number, basis)(NUMBERS)), abs=ROUNDING)
