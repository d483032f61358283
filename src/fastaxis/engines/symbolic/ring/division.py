"""Exact division of polynomials of the ring, and quotients brought to lowest terms."""

from __future__ import annotations

from dataclasses import dataclass

from fastaxis.engines.symbolic.ring.poly import Poly
from fastaxis.engines.symbolic.ring.ring import UNIT, Ring

__all__ = ["divided", "in_lowest_terms"]

MOST_WORK = 10_000  # terms written, some tenths of a second; a quotient that takes more is no short one


def divided(poly: Poly, divisor: Poly) -> Poly | None:
    """poly/divisor if that is a polynomial, else None; multiplied out again, so that it is never wrong.

    Packed monomials are whole numbers that add where monomials multiply, so their order is kept by multiplication and
    long division may run from the largest down.

    >>> import sympy as sp
    >>> from fastaxis.engines.symbolic.ring import ExactMaths, Ring
    >>> maths, x = ExactMaths(Ring()), sp.Symbol("x", real=True)
    >>> one = maths.number(1)
    >>> divided(one - maths.phasor(2 * x), one - maths.phasor(x)) == one + maths.phasor(x)
    True
    """
    if not poly:
        return poly
    ring, leading, top = poly.ring, _inverse_of_leading(divisor), _top(divisor)
    lowest, room = _bottom(poly) - _bottom(divisor), _Room.of(poly, divisor)
    found, rest, work = ring.zero, poly, 0
    while rest and leading is not None:
        first, work = _top(rest), work + len(rest) + len(divisor)
        if first - top < lowest or not room.holds(first - top) or work > MOST_WORK:
            return None
        part = _coefficient(rest, first) * leading * ring.poly({first - top: 1})
        found, rest = found + part, rest - part * divisor
        if rest and _top(rest) >= first:  # a relation of the ring put something in its place
            return None
    return found if leading is not None and found * divisor == poly else None


@dataclass(frozen=True)
class _Room:
    """Exponents that a quotient may have in each generator by itself.

    A division that leaves a remainder runs on for ever in a generator that comes late in the order, with numbers of
    ever more digits.

    Parameters
    ----------
    ring : of both.
    least, most : by the place of the generator; those not in them have none, those tied to others are not looked at.
    tied : places of generators whose powers are something else.
    """

    ring: Ring
    least: dict[int, int]
    most: dict[int, int]
    tied: frozenset[int]

    @classmethod
    def of(cls, poly: Poly, divisor: Poly) -> _Room:
        (low, high), (small, large) = _extent(poly), _extent(divisor)
        places = low.keys() | small.keys()
        return cls(
            poly.ring,
            {place: low.get(place, 0) - large.get(place, 0) for place in places},
            {place: high.get(place, 0) - small.get(place, 0) for place in places},
            poly.ring.tied,
        )

    def holds(self, key: int) -> bool:
        exponents = self.ring.exponents(key)[1]
        return all(
            place in self.tied or self.least.get(place, 0) <= exponent <= self.most.get(place, 0)
            for place, exponent in exponents.items()
        )


def _extent(poly: Poly) -> tuple[dict[int, int], dict[int, int]]:
    """Lowest and highest exponent of each generator, and 0."""
    low, high = dict[int, int](), dict[int, int]()
    for key in poly.terms:
        for place, exponent in poly.ring.exponents(key)[1].items():
            low[place], high[place] = min(low.get(place, 0), exponent), max(high.get(place, 0), exponent)
    return low, high


def _bare(poly: Poly, key: int) -> int:
    """A monomial without its root of unity."""
    return key - poly.ring.exponents(key)[0]


def _top(poly: Poly) -> int:
    return max(_bare(poly, key) for key in poly.terms)


def _bottom(poly: Poly) -> int:
    return min(_bare(poly, key) for key in poly.terms)


def _coefficient(poly: Poly, bare: int) -> Poly:
    """The number in front of a monomial."""
    terms = {key - bare: value for key, value in poly.terms.items() if _bare(poly, key) == bare}
    return poly.ring.poly(terms, poly.den)


def _inverse_of_leading(poly: Poly) -> Poly | None:
    number = _coefficient(poly, _top(poly))
    norm = number.abs2()
    return number.conj() * poly.ring.rational(1 / norm.value) if norm.is_rational else None


def in_lowest_terms(poly: Poly) -> Poly:
    """A polynomial over powers of sums, with every such sum cancelled that divides what is above it."""
    for place, whole in poly.ring.sums():
        poly = _cancelled(poly, place, whole)
    return poly


def _cancelled(poly: Poly, place: int, whole: Poly) -> Poly:
    ring = poly.ring
    step = ring.pack(0, {place: UNIT})
    while poly:
        power = max(ring.exponents(key)[1].get(place, 0) for key in poly.terms)
        if power > -UNIT:
            return poly
        above = ring.poly({key - ring.pack(0, {place: power}): value for key, value in poly.terms.items()}, poly.den)
        shorter = divided(above, whole)
        if shorter is None:
            return poly
        poly = shorter * ring.poly({ring.pack(0, {place: power}) + step: 1})
    return poly
