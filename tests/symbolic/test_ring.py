"""The ring: canonical numbers, decided equality."""

import cmath
import math
from fractions import Fraction

import pytest
import sympy as sp
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.engines.symbolic.ring.angles import linear
from fastaxis.engines.symbolic.ring.numerals import exact, pi_multiple
from fastaxis.engines.symbolic.ring.roots import TURN, canonical, gauss_root, split_square
from fastaxis.errors import SymbolError


@pytest.fixture
def maths():
    return ExactMaths(Ring())


ORDERS = [2, 3, 4, 5, 6, 7, 8, 9, 12, 15, 24, 25, 27, 30, 35, 360, 720]


@given(st.sampled_from(ORDERS), st.integers(0, 719))
@settings(max_examples=50)
def test_a_root_of_unity_is_the_sum_of_its_basis_elements(order, power):
    exponent = power % order * TURN // order
    value = sum(c * cmath.exp(2j * cmath.pi * e / TURN) for c, e in canonical(exponent))
    # At most a few dozen terms of size 1, each rounded once or twice.
    assert abs(value - cmath.exp(2j * cmath.pi * exponent / TURN)) < 1e-13
    assert all(canonical(e) == ((1, e),) for _, e in canonical(exponent))


@pytest.mark.parametrize("order", ORDERS)
def test_all_roots_of_one_order_add_up_to_zero(maths, order):
    total = maths.ring.zero
    for power in range(order):
        total = total + maths.ring.root_of_unity(Fraction(power, order))
    assert not total.terms


@pytest.mark.parametrize("prime", [2, 3, 5, 7, 11, 13])
def test_gauss_sums_are_square_roots(prime):
    value = sum(sign * cmath.exp(2j * cmath.pi * e / TURN) for sign, e in gauss_root(prime))
    assert value == pytest.approx(math.sqrt(prime), abs=1e-14 * prime)


@pytest.mark.parametrize("number", [2, 3, 5, 6, 7, 0.5, 0.97, 1e-5, 0.3])
def test_the_square_of_a_root_is_the_number(maths, number):
    assert maths.root(number) * maths.root(number) == maths.number(number)


def test_sqrt_two_is_two_phasors(maths):
    assert maths.root(2) == maths.phasor(math.pi / 4) + maths.phasor(-math.pi / 4)


def test_cosines_of_the_pentagon(maths):
    assert maths.cos(math.pi / 5) * maths.number(4) == maths.number(1) + maths.root(5)


def test_a_large_prime_root_is_compared_with_its_gauss_sum(maths):
    seven = maths.ring.poly({e: s for s, e in gauss_root(7)})
    assert maths.root(7) == seven
    assert maths.root(7) != maths.root(11)


def test_a_plain_number_of_radians_is_its_own_exact_angle(maths):
    assert maths.phasor(0.3) * maths.phasor(0.3) == maths.phasor(0.6)
    assert maths.cos(0.3) * maths.cos(0.3) + maths.sin(0.3) * maths.sin(0.3) == maths.number(1)
    assert maths.phasor(0.3) != maths.phasor(0.30000001)


def test_transmitted_and_reflected_shares_add_up(maths):
    share = sp.Symbol("T", positive=True)
    assert maths.root(share).abs2() + maths.root(1 - share).abs2() == maths.number(1)


def test_denominators_are_cleared_before_a_comparison(maths):
    share = sp.Symbol("T", positive=True)
    assert maths.number(1 / (1 + share)) + maths.number(share / (1 + share)) == maths.number(1)


@pytest.mark.parametrize(
    ("value", "share"), [(math.pi / 8, (1, 8)), (45 * math.pi / 180, (1, 4)), (-22.5 * math.pi / 180, (-1, 8))]
)
def test_degrees_are_recognised(value, share):
    assert pi_multiple(value) == Fraction(*share)


@pytest.mark.parametrize("value", [0.3, 1.0, 2.718281828, 1e-9])
def test_other_numbers_are_no_multiple_of_pi(value):
    assert pi_multiple(value) is None
    assert float(exact(value)) == value


@given(st.floats(-10, 10))
@settings(max_examples=50)
def test_an_exact_number_is_the_float(value):
    assert float(exact(value)) == pytest.approx(value, rel=2.0**-52, abs=0)


def test_products_of_letters_are_angles_of_their_own():
    q, phi, a = sp.symbols("q phi a")
    turns, generators = linear(2 * (q * phi + a) + sp.pi / 2 + 0.5)
    assert turns == Fraction(1, 4)
    assert dict(generators) == {q * phi: 2, a: 2, sp.Integer(1): Fraction(1, 2)}


def test_a_float_pi_in_front_of_a_letter_is_pi():
    q = sp.Symbol("q")
    assert linear(q * 3.141592653589793) == linear(q * sp.pi)


def test_a_complex_angle_is_refused():
    with pytest.raises(SymbolError, match="an angle is a real quantity"):
        linear(sp.I * sp.Symbol("a"))


@pytest.mark.parametrize("value", [Fraction(3, 8), Fraction(98, 3), Fraction(1)])
def test_squares_are_taken_out(value):
    outside, primes = split_square(value)
    assert outside**2 * math.prod(primes) == value


_ANGLES = st.tuples(st.integers(-4, 4), st.integers(-4, 4), st.sampled_from([0, 1, 2, 3, 5]))


@given(st.lists(st.tuples(st.integers(-3, 3), _ANGLES), min_size=1, max_size=6))
@settings(max_examples=40)
def test_a_polynomial_is_zero_exactly_when_its_values_are(terms):
    maths, (a, b) = ExactMaths(Ring()), sp.symbols("a b", real=True)
    total, value = maths.ring.zero, 0j
    for coefficient, (m, n, twelfths) in terms:
        total = total + maths.number(coefficient) * maths.phasor(m * a + n * b + twelfths * sp.pi / 6)
        value += coefficient * cmath.exp(1j * (m * 0.37 + n * 1.91 + twelfths * math.pi / 6))
    assert total.is_zero() == (abs(value) < 1e-12)


def test_a_polynomial_with_roots_of_sums_moves_to_another_ring():
    share = sp.Symbol("R", positive=True)
    one, two = ExactMaths(Ring()), ExactMaths(Ring())
    there = two.root(1 - share) * two.root(share)
    moved = one.ring.adopted(there)
    assert moved * moved == one.number(share * (1 - share))
