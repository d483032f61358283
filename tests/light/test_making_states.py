import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.errors import SymbolError
from fastaxis.light import L, R, State, elliptical, from_jones, from_stokes, helicity, linear
from fastaxis.units import deg

FEW_ROUNDINGS = 4e-15  # a dozen roundings of numbers up to 1


@settings(max_examples=40)
@given(st.complex_numbers(max_magnitude=1e3), st.complex_numbers(max_magnitude=1e3))
def test_a_jones_vector_comes_back_with_its_phase(ex, ey):
    length = math.hypot(abs(ex), abs(ey))
    if length < 1e-3:
        return
    expected = np.array([ex, ey]) / length
    # Near a circle the azimuth is the argument of a small number and loses digits; the phase moves along with it,
    # and the field does not feel it.
    np.testing.assert_allclose(from_jones(ex, ey).jones, expected, rtol=0, atol=FEW_ROUNDINGS)


@settings(max_examples=40)
@given(st.floats(-math.pi / 2, math.pi / 2), st.floats(-math.pi / 4, math.pi / 4))
def test_a_point_on_the_sphere_comes_back(azimuth, ellipticity):
    point = State(azimuth, ellipticity).stokes[1:]
    np.testing.assert_allclose(from_stokes(*point).stokes[1:], point, rtol=0, atol=FEW_ROUNDINGS)


def test_six_typed_digits_are_a_point_on_the_sphere():
    assert from_stokes(0.577350, 0.577350, 0.577350).azimuth == pytest.approx(22.5 * deg)


def test_positive_helicity_is_l():
    assert helicity(+1) is L
    assert helicity(-1) is R


def test_labels_say_the_angles():
    assert linear(-22.5 * deg).label == "-22.5°"
    assert elliptical(25 * deg, -12 * deg).label == "25°, -12°"
    assert linear(sympy.Symbol("a")).label == "a"
    assert linear(0, label="horizon").label == "horizon"


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("linear(45)", "linear: angle = 45.0; angle is in radians"),
        ("elliptical(0, 45)", "elliptical: ellipticity = 45.0; ellipticity is in radians"),
        ("helicity(2)", "helicity: sign = 2; the helicity of circular light is +1 or -1 (fix: fa.helicity(+1))"),
        ("helicity(True)", "the helicity of circular light is +1 or -1"),
        ("from_jones(0, 0)", "from_jones: (0j, 0j); a state needs a finite field that is not zero"),
        ("from_jones(float('nan'), 1)", "a state needs a finite field that is not zero"),
        ("from_stokes(0, 0, 0)", "zero Stokes parameters have no state: unpolarized light is a mixture (fix: fa.UNPOLARIZED)"),
        ("from_stokes(1, 1, 0)", "make partly polarized light with partially_polarized (fix: fa.from_stokes(0.707106781, 0.7"),
        ("from_stokes(0.3, 0, 0.4)", "polarized to 0.5: it is a mixture (fix: fa.partially_polarized(fa.from_stokes(0.6, 0, 0.8), 0.5))"),
        ("from_stokes('S', 0, 0)", "s1 must be one real, finite number or a symbol"),
    ],
)  # fmt: skip
def test_refusals(refuses, code, text):
    refuses(code, text)


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("from_jones(sympy.Symbol('a'), 1)", "from_jones: ex = a; a Jones vector is taken in numbers"),
        ("from_stokes(sympy.Symbol('a'), 0, 0)", "a point on the sphere is taken in numbers"),
    ],
)
def test_symbols_are_refused_where_numbers_are_asked(refuses, code, text):
    refuses(code, text, SymbolError)
