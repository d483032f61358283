"""The short way of writing is short, and equal to the long way."""

from math import pi

import pytest
import sympy as sp
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.engines.symbolic.presentations import compact, exponential
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.ring import ExactMaths, Ring

a, b, c = sp.symbols("a b c", real=True)


@pytest.fixture
def maths():
    return ExactMaths(Ring())


@pytest.mark.parametrize(
    "short",
    [
        sp.cos(a + b / 2) ** 2,
        sp.sin(2 * a) ** 2 * sp.sin(b / 2) ** 2,
        sp.cos(a) ** 2 * sp.cos(a - b) ** 2 * sp.cos(b - c) ** 2,
        sp.cos(b / 2) ** 2 * sp.cos(c) ** 2 + sp.sin(b / 2) ** 2 * sp.cos(2 * a - c) ** 2,
        sp.cos(a + sp.pi / 8) ** 2,
        sp.cos(a + sp.pi / 4) ** 2,
        -3 * sp.cos(a) * sp.sin(b) / 2,
    ],
)
def test_products_are_found_again(maths, short):
    found = compact(maths.number(short))
    assert sp.count_ops(found) <= sp.count_ops(short)
    assert maths.number(found) == maths.number(short)


_sums = st.lists(
    st.tuples(st.integers(-2, 2), st.integers(-2, 2), st.integers(-2, 2), st.sampled_from([0, 1, 2, 3])),
    min_size=1, max_size=5,
)  # fmt: skip


@given(_sums, _sums)
@settings(max_examples=30, deadline=None)
def test_compact_and_exponential_are_the_same_value(one, two):
    maths = ExactMaths(Ring())
    poly = maths.number(1)
    for terms in (one, two):
        part = maths.ring.zero
        for size, m, n, eighths in terms:
            part = part + maths.number(size) * maths.phasor(m * a + n * b + eighths * pi / 4)
        poly = poly * part
    values = {a: 0.37, b: 1.9}
    short, long = (complex(sp.sympify(way(poly)).subs(values).evalf()) for way in (compact, exponential))
    # Twenty-five terms of size up to 4, each with a few roundings.
    assert short == pytest.approx(long, abs=1e-12)
    assert maths.number(compact(poly)) == poly


def test_factors_are_found_behind_constant_phases(maths):
    one = maths.phasor(a) + maths.phasor(b + pi / 4)
    two = maths.phasor(2 * a) + maths.phasor(c + pi / 2)
    assert sorted(len(factor) for factor, _ in factored(one * two)) == [2, 2]
