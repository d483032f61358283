"""Exact division in the ring."""

import pytest
import sympy as sp

from fastaxis.engines.symbolic.presentations import compact
from fastaxis.engines.symbolic.ring import ExactMaths, Ring, division
from fastaxis.engines.symbolic.ring.division import divided, in_lowest_terms
from fastaxis.engines.symbolic.ring.reading import read

R = sp.Symbol("R", positive=True)
a, b = sp.symbols("alpha beta", real=True)
TERMS = [
    1 - R, 1 + sp.sqrt(R) * sp.exp(2 * sp.I * a), sp.cos(a) + sp.sqrt(3) * sp.sin(b), R - 2 * sp.sqrt(R) * sp.cos(a) + 1,
    sp.exp(sp.I * a) * (2 - sp.I), sp.sqrt(1 - R) + sp.cos(b),
]  # fmt: skip


@pytest.mark.parametrize("one", range(len(TERMS)))
@pytest.mark.parametrize("other", range(len(TERMS)))
def test_a_product_is_divided_by_either_factor(one, other):
    ring = Ring()
    first, second = read(ring, TERMS[one]), read(ring, TERMS[other])
    product = first * second
    # sqrt(2), sqrt(3) and the like are sums of roots of unity: a divisor that leads with one may be left alone.
    for wanted, factor in ((second, first), (first, second)):
        found = divided(product, factor)
        assert found is None or found == wanted
    if {one, other} <= {0, 1, 3}:
        assert divided(product, first) == second


def test_what_does_not_divide_is_left_alone():
    ring = Ring()
    assert divided(read(ring, 2 + R), read(ring, 1 + R)) is None
    assert divided(read(ring, 1 + sp.cos(a)), read(ring, 1 + R)) is None
    assert divided(ring.zero, read(ring, 1 + R)) == ring.zero


def test_long_quotients_are_given_up():
    ring = Ring()
    # (1 - R^n)/(1 - R) has n terms.
    assert divided(read(ring, 1 - R**40), read(ring, 1 - R)) is not None
    assert divided(read(ring, 1 - R**4000), read(ring, 1 - R)) is None


def test_a_remainder_is_seen_before_the_quotient_runs_on(monkeypatch):
    ring = Ring()
    # The largest monomial of the divisor comes before beta in the order, so that beta never falls below it.
    divisor, poly = read(ring, sp.exp(sp.I * a) - sp.Rational(1, 3)), read(ring, sp.exp(sp.I * b) + 1)
    rounds, number = [], division._coefficient
    monkeypatch.setattr(division, "_coefficient", lambda *args: rounds.append(1) or number(*args))
    assert divided(poly, divisor) is None
    # One for the divisor, and one for each power of exp(i alpha) from the divisor's down to none.
    assert len(rounds) <= 3


def test_quotients_are_brought_to_lowest_terms_before_they_are_written():
    below = 1 + R**2 + 2 * R * sp.cos(a)
    poly = ExactMaths(Ring()).number((3 + R) * sp.expand(below**2) / below**3)
    assert len(in_lowest_terms(poly)) == 2
    assert compact(poly) == (3 + R) / below
