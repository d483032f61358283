"""Exact derivatives of polynomials of the ring, and symbols set to zero in them."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.angles import linear
from fastaxis.engines.symbolic.ring.reading import read
from fastaxis.engines.symbolic.ring.ring import ANGLE, UNIT

__all__ = ["derivative", "set_to_zero"]


def derivative(poly: Poly, symbol: Any) -> Poly:
    """d(poly)/d(symbol), exact."""
    ring = poly.ring
    i = ring.root_of_unity(Fraction(1, 4))
    result = ring.zero
    for place, generator in enumerate(list(ring.generators)):
        if not generator.expression.has(symbol):
            continue
        weighted = {key: value * ring.exponents(key)[1].get(place, 0) for key, value in poly.terms.items()}
        part = ring.poly({key: value for key, value in weighted.items() if value}, poly.den * UNIT)
        if not part:
            continue
        slope = read(ring, sp.diff(generator.expression, symbol))
        if generator.kind == ANGLE:
            result = result + part * slope * i
        else:
            result = result + part * slope * read(ring, 1 / generator.expression)
    return result


def set_to_zero(poly: Poly, symbols: Sequence[Any]) -> Poly:
    """The polynomial with some symbols zero."""
    ring, zeros = poly.ring, dict.fromkeys(symbols, 0)

    def at_zero(key: int) -> Poly:
        root, exponents = ring.exponents(key)
        product = ring.rational(1)
        for place, exponent in list(exponents.items()):
            generator = ring.generators[place]
            if not generator.expression.has(*symbols):
                continue
            del exponents[place]
            left = generator.expression.subs(zeros)
            share = Fraction(exponent, UNIT)
            if generator.kind == ANGLE:
                turns, rest = linear(left * sp.Rational(share.numerator, share.denominator))
                product = product * ring.phasor(dict(rest), turns)
            else:
                product = product * read(ring, left ** sp.Rational(share.numerator, share.denominator))
        return product * ring.poly({ring.pack(root, exponents): 1})

    return poly.map_keys(at_zero)
