"""A sum written in two pieces: a constant and the rest, one square root and the rest, real and imaginary part."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.presentations.reality import is_real
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["by_reality", "by_surd", "off_constant"]

Split = list[tuple[Any, Poly]]


def off_constant(poly: Poly) -> Split | None:
    """1/2 + ... where a plain number is among the terms."""
    value = poly.terms.get(0)
    if value is None or len(poly) < 3:
        return None
    number = Poly.made(poly.ring, {0: value}, poly.den)
    return [(sp.S.One, number), (sp.S.One, poly - number)]


def by_reality(poly: Poly) -> Split | None:
    """Real and imaginary part, of a polynomial that has both."""
    twin, ring = poly.conj(), poly.ring
    half, i = ring.rational(Fraction(1, 2)), ring.root_of_unity(Fraction(1, 4))
    real, imag = (poly + twin) * half, (twin - poly) * half * i
    return [(sp.S.One, real), (sp.I, imag)] if real and imag else None


def by_surd(poly: Poly) -> Split | None:
    """The pieces of a + b sqrt(n), with a and b free of the root, for n = 5 or 2; of a real polynomial."""
    if not is_real(poly):
        return None
    for prime, split in ((5, _off_five), (2, _off_two)):
        pieces = split(poly)
        if pieces is not None and all(pieces) and all(is_real(piece) for piece in pieces):
            return [(sp.S.One, pieces[0]), (sp.sqrt(prime), pieces[1])]
    return None


def _off_five(poly: Poly) -> tuple[Poly, Poly] | None:
    """The root of 5 is -1 - 2 z^2 - 2 z^3 with z the fifth of a turn, in the basis 1, z, z^2, z^3."""
    ring, fifth = poly.ring, TURN // 5
    digits: dict[int, dict[int, int]] = {}
    for key, value in poly.terms.items():
        root = ring.exponents(key)[0] % TURN
        digit = next((n for n in range(4) if (root - n * fifth) % TURN % 5**5 == 0), None)
        if digit is None:
            return None
        digits.setdefault(key - ring.exponents(key)[0] + (root - digit * fifth) % TURN, {})[digit] = value
    plain, root_five = {}, {}
    for key, found in digits.items():
        if found.get(1, 0) or found.get(2, 0) != found.get(3, 0):
            return None
        plain[key], root_five[key] = 2 * found.get(0, 0) - found.get(2, 0), -found.get(2, 0)
    return Poly.made(ring, plain, 2 * poly.den), Poly.made(ring, root_five, 2 * poly.den)


def _off_two(poly: Poly) -> tuple[Poly, Poly] | None:
    """Terms at odd eighths of a turn are those with sqrt 2."""
    odd = {key: value for key, value in poly.terms.items() if poly.ring.exponents(key)[0] % (TURN // 4)}
    if any(poly.ring.exponents(key)[0] % (TURN // 8) for key in odd):
        return None
    rest = Poly.made(poly.ring, odd, poly.den)
    return poly - rest, rest * poly.ring.surd(Fraction(1, 2))
