"""A polynomial of the ring: packed monomials with whole coefficients over one common denominator."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction
from math import gcd
from typing import TYPE_CHECKING, Any

from fastaxis.engines.symbolic.ring.roots import canonical

if TYPE_CHECKING:
    from fastaxis.engines.symbolic.ring.ring import Ring

__all__ = ["Poly", "Terms"]

Terms = dict[int, int]


@dataclass(frozen=True, eq=False)
class Poly:
    """sum(terms[key] * monomial(key)) / den, always in canonical form, so equal polynomials have equal data."""

    ring: Ring
    terms: Terms
    den: int

    @classmethod
    def made(cls, ring: Ring, terms: Terms, den: int) -> Poly:
        """Brings raw terms to canonical form."""
        terms = _roots_reduced(terms)
        if ring.has_relations():
            reduced = _wholes_reduced(ring, terms, den)
            if reduced is not None:
                return reduced
        common = gcd(den, *terms.values())
        if common > 1:
            terms, den = {key: value // common for key, value in terms.items()}, den // common
        return cls(ring, terms, den if terms else 1)

    # --- arithmetic -------------------------------------------------------------------------------------------------
    def __add__(self, other: Poly) -> Poly:
        if not self.terms:
            return other
        if not other.terms:
            return self
        common = self.den * other.den // gcd(self.den, other.den)
        mine, theirs = common // self.den, common // other.den
        terms = {key: value * mine for key, value in self.terms.items()}
        for key, value in other.terms.items():
            terms[key] = terms.get(key, 0) + value * theirs
        return Poly.made(self.ring, terms, common)

    def __neg__(self) -> Poly:
        return Poly(self.ring, {key: -value for key, value in self.terms.items()}, self.den)

    def __sub__(self, other: Poly) -> Poly:
        return self + -other

    def __mul__(self, other: Poly) -> Poly:
        terms: Terms = {}
        get = terms.get
        theirs = tuple(other.terms.items())
        for key, value in self.terms.items():
            for their_key, their_value in theirs:
                both = key + their_key
                terms[both] = get(both, 0) + value * their_value
        return Poly.made(self.ring, terms, self.den * other.den)

    def power(self, exponent: int) -> Poly:
        """A whole power; negative only for rational numbers and single monomials."""
        if exponent < 0:
            return self._inverse().power(-exponent)
        result = self.ring.rational(1)
        for _ in range(exponent):
            result = result * self
        return result

    def _inverse(self) -> Poly:
        ((key, value),) = self.terms.items()
        sign = 1 if value > 0 else -1
        return Poly.made(self.ring, {-key: sign * self.den}, abs(value))

    def conj(self) -> Poly:
        """The complex conjugate."""
        return Poly.made(self.ring, {self._conj_key(key): value for key, value in self.terms.items()}, self.den)

    def _conj_key(self, key: int) -> int:
        ring = self.ring
        root, exponents = ring.exponents(key)
        turned = {p: -e if ring.generators[p].kind == "angle" else e for p, e in exponents.items()}
        return ring.pack(-root, turned)

    def abs2(self) -> Poly:
        """|self|^2."""
        return self * self.conj()

    # --- questions --------------------------------------------------------------------------------------------------
    def __bool__(self) -> bool:
        return bool(self.terms)

    def __len__(self) -> int:
        return len(self.terms)

    def __eq__(self, other: object) -> bool:
        return isinstance(other, Poly) and (self - other).is_zero()

    __hash__ = None  # type: ignore[assignment]  # equality may need a reduction that a hash can't see

    def is_zero(self) -> bool:
        """Whether it is the number zero; decided, not sampled."""
        if not self.terms:
            return True
        from fastaxis.engines.symbolic.ring.deciding import vanishes  # noqa: PLC0415  # it builds on this class

        return vanishes(self)

    @property
    def is_rational(self) -> bool:
        return not self.terms or (len(self.terms) == 1 and 0 in self.terms)

    @property
    def value(self) -> Fraction:
        """The number, of a rational polynomial."""
        return Fraction(self.terms.get(0, 0), self.den)

    def map_keys(self, change: Callable[[int], Poly]) -> Poly:
        """Every monomial replaced by a polynomial."""
        result = self.ring.zero
        for key, value in self.terms.items():
            result = result + change(key) * Poly.made(self.ring, {0: value}, self.den)
        return result

    def parts(self, label: Callable[[int], tuple[Any, int]]) -> dict[Any, Poly]:
        """The terms sorted by a label; ``label`` gives it and the packed monomial that remains."""
        found: dict[Any, Terms] = {}
        for key, value in self.terms.items():
            name, rest = label(key)
            terms = found.setdefault(name, {})
            terms[rest] = terms.get(rest, 0) + value
        return {name: Poly.made(self.ring, terms, self.den) for name, terms in found.items()}


def _roots_reduced(terms: Terms) -> Terms:
    reduced: Terms = {}
    for key, value in terms.items():
        if not value:
            continue
        root = ((key + _HALF) & _MASK) - _HALF
        bare = key - root
        for sign, exponent in canonical(root):
            there = bare + exponent
            total = reduced.get(there, 0) + sign * value
            if total:
                reduced[there] = total
            else:
                reduced.pop(there, None)
    return reduced


def _wholes_reduced(ring: Ring, terms: Terms, den: int) -> Poly | None:
    """The polynomial with every whole power of a prime or sum written out, or None if there is none."""
    plain: Terms = {}
    rest: Poly | None = None
    for key, value in terms.items():
        bare, product = ring.whole_part(key)
        if product is None:
            plain[key] = value
        else:
            more = product * Poly.made(ring, {bare: value}, den)
            rest = more if rest is None else rest + more
    return None if rest is None else rest + Poly.made(ring, plain, den)


_WIDTH = 128
_MASK = (1 << _WIDTH) - 1
_HALF = 1 << (_WIDTH - 1)
