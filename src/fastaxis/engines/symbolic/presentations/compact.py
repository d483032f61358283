"""The short way: products of cosines, with half-angle squares where they exist.

The polynomial is factored; a factor of two equal terms is a cosine of half their difference in phase. What comes out is
multiplied up again in the ring and used only if it is exactly the polynomial asked for.
"""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.expressions import centred, real_sum, split_key, written
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["compact"]


def compact(poly: Poly) -> Any:
    """A polynomial as a short product; falls back on a sum of cosines or exponentials."""
    if not poly:
        return sp.S.Zero
    plain = written(poly)
    product = _product(poly)
    if product is not None and sp.count_ops(product) <= sp.count_ops(plain):
        return product
    return plain


def _product(poly: Poly) -> Any | None:
    factors = factored(poly)
    if factors is None:
        return None
    total, result = poly.ring.rational(1), sp.S.One
    for factor, power in factors:
        real = _real(factor)
        if real is None:
            return None
        total = total * real.power(power)
        result *= real_sum(real) ** power
    left = _quotient(poly, total)
    return None if left is None else written(left) * result


def _real(factor: Poly) -> Poly | None:
    """The factor times a phasor that makes it real."""
    _, turned = centred(factor)
    roots = {split_key(turned.ring, key)[2] for key in turned.terms}
    for root in {0, TURN // 4} | {-r for r in roots}:
        for extra in (0, TURN // 8, -TURN // 8):
            real = Poly.made(turned.ring, {k + root + extra: v for k, v in turned.terms.items()}, turned.den)
            if real.terms == real.conj().terms:
                return real
    return _binomial(turned)


def _binomial(turned: Poly) -> Poly | None:
    """Two terms of equal size: turned back by the mean of their phases."""
    if len(turned) != 2:
        return None
    roots = [split_key(turned.ring, key)[2] for key in turned.terms]
    flip = sum(TURN // 2 for value in turned.terms.values() if value < 0)
    mean = Fraction(sum(roots) + flip, 2 * TURN)
    real = turned * turned.ring.root_of_unity(-mean)
    return real if real.terms == real.conj().terms else None


def _quotient(poly: Poly, product: Poly) -> Poly | None:
    """poly/product if that is a monomial with a number, else None."""
    ring = poly.ring
    bottom = max(product.terms)
    for key in sorted(poly.terms, reverse=True)[:4]:
        monomial = ring.poly({key - bottom: poly.terms[key] * product.den}, poly.den * product.terms[bottom])
        if monomial * product == poly:
            return monomial
    return None
