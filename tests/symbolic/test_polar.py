"""Exact numbers as one size and one phase."""

import math

import pytest
import sympy as sp
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.engines.symbolic.ring.polar import Polar, canonical_sum, polar
from fastaxis.engines.symbolic.ring.roots import TURN
from fastaxis.units import deg


@given(st.integers(1, 60), st.sampled_from([1, 2, 3, 5, 6, 10]), st.integers(0, 359), st.integers(1, 89))
@settings(max_examples=40, deadline=None)
def test_what_was_multiplied_out_is_found_again(factor, square, turned, opening):
    made = Polar(factor, square, turned * TURN // 360, opening * TURN // 360)
    found = polar(canonical_sum(made.terms.items()))
    # There may be a simpler one, such as a square root alone; it must be the same number.
    assert found is not None
    assert float(found.size) == pytest.approx(float(made.size), rel=1e-14)
    assert canonical_sum(found.terms.items()) == canonical_sum(made.terms.items())


def test_a_sum_without_one_size_is_left():
    assert polar({0: 2, TURN // 5: 1}) is None


def test_nested_roots_are_read_as_cosines():
    maths = ExactMaths(Ring())
    for turn in (8, 12, 5, 10, 24):
        value = sp.cos(sp.pi / turn)
        assert maths.number(value) == maths.cos(math.pi / turn)


def test_whole_degrees_stay_one_cosine(form, letters):
    *_, t, _ = letters
    made = form(fa.HalfWavePlate(fast=17 * deg), fa.QPlate(q=0.5))
    assert made.stokes[1] == sp.cos(2 * sp.Symbol("phi", real=True) - 17 * sp.pi / 45)
    assert sp.count_ops(made.frame(t)) < 10


def test_an_extinction_that_is_no_square_stays_short(form, letters):
    a, *_, t, _ = letters
    # (cos cos + sin sin/sqrt 1000)^2, not twelve cosines.
    frame = form(fa.Polarizer(axis=a, extinction=1000.0)).frame(t)
    leak = sp.sin(a) * sp.sin(a - t) * sp.sqrt(10) / 100
    assert sp.expand(frame - (sp.cos(a) * sp.cos(a - t) + leak) ** 2) == 0
    assert sp.count_ops(frame) < 20
