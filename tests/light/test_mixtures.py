import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.light import UNPOLARIZED, D, H, R, State, StateMixture, V, partially_polarized


def test_unpolarized_light_has_no_direction_on_the_sphere():
    np.testing.assert_array_equal(UNPOLARIZED.stokes, [1, 0, 0, 0])
    assert UNPOLARIZED.degree == 0


def test_any_orthogonal_pair_makes_the_same_unpolarized_light():
    np.testing.assert_array_equal(StateMixture(((0.5, R), (0.5, R.orthogonal))).stokes, UNPOLARIZED.stokes)


@settings(max_examples=40)
@given(st.floats(-1.5, 1.5), st.floats(-0.78, 0.78), st.floats(0, 1))
def test_partly_polarized_light_points_along_its_state(azimuth, ellipticity, degree):
    state = State(azimuth, ellipticity)
    mixture = partially_polarized(state, degree)
    np.testing.assert_allclose(mixture.stokes[1:], degree * state.stokes[1:], rtol=0, atol=4e-15)  # a dozen roundings
    assert mixture.degree == pytest.approx(degree, abs=4e-15)


def test_fully_polarized_light_is_one_part():
    assert partially_polarized(D, 1).parts == ((1.0, D),)


def test_three_thirds_add_up_to_one():
    assert math.isclose(StateMixture(((1 / 3, H), (1 / 3, D), (1 / 3, V))).stokes[2], 1 / 3)


def test_symbols_may_be_weights():
    p = sympy.Symbol("P", positive=True)
    assert partially_polarized(H, p).symbols == {p}


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("StateMixture(((0.5, H), (0.4, V)))", "mixture: weights add up to 0.9; weights must add up to 1"),
        ("StateMixture(((0.75, H), (0.75, R)))", "(fix: fa.StateMixture(((0.5, fa.H), (0.5, fa.R))))"),
        ("StateMixture(((0.5, linear(0.3)), (0.4, V)))", "weights must add up to 1"),
        ("StateMixture(((1.5, H), (-0.5, V)))", "mixture: weights (1.5, -0.5); a weight is a share of power"),
        ("StateMixture((('half', H), (0.5, V)))", "weight must be one real, finite number"),
        ("StateMixture(())", "mixture: no parts; a mixture needs at least one part"),
        ("partially_polarized(H, 1.2)", "degree = 1.2; degree is a share of power"),
        ("partially_polarized(H, -0.1)", "partially_polarized: degree = -0.1"),
    ],
)
def test_refusals(refuses, code, text):
    refuses(code, text)


def test_the_fix_of_a_wrong_sum_is_the_scaled_mixture(refuses):
    error = refuses("StateMixture(((0.375, H), (0.125, V)))", "add up to 0.5")
    assert error.fix == "fa.StateMixture(((0.75, fa.H), (0.25, fa.V)))"
    assert refuses("StateMixture(((2, H),))", "add up to 2").fix == "fa.StateMixture(((1.0, fa.H),))"
