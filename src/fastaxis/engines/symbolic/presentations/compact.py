"""The short way: products of cosines, with half-angle squares where they exist.

The polynomial is factored; a factor of two equal terms is a cosine of half their difference in phase. A factor with
more terms is split by the angle that makes the rest shortest, cos^2(d/2) ... + sin^2(d/2) ... + sin(d) ..., and so on.
A product is multiplied up again in the ring and used only if it is exactly the polynomial asked for.
"""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.expressions import amplitude_of, centred, split_key, written
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.presentations.splitting import best_split, by_amplitude
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.ring import ANGLE
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["compact"]

MOST_TERMS = 600  # beyond, a form is not short whatever one does


def compact(poly: Poly) -> Any:
    """A polynomial as a short product or sum of products."""
    if not poly:
        return sp.S.Zero
    if len(poly) > MOST_TERMS:
        return written(poly)
    surd, bare = _without_surd(poly)
    content, rest = _without_content(bare)
    product = _product(rest)
    return surd * content * (_sum(rest) if product is None else product)


def _without_surd(poly: Poly) -> tuple[Any, Poly]:
    """Without a common sqrt 2 or sqrt 3, which takes two terms of the ring for one."""
    for n in (2, 3, 6):
        divided = poly * poly.ring.surd(Fraction(1, n))
        if len(divided) < len(poly):
            return sp.sqrt(n), divided
    return sp.S.One, poly


def _without_content(poly: Poly) -> tuple[Any, Poly]:
    """Without the amplitudes that all terms share."""
    ring = poly.ring
    rows = [ring.exponents(key)[1] for key in poly.terms]
    real = {place for row in rows for place in row if ring.generators[place].kind != ANGLE}
    lowest = {place: min(row.get(place, 0) for row in rows) for place in real}
    content = ring.pack(0, {place: power for place, power in lowest.items() if power})
    if not content:
        return sp.S.One, poly
    rest = ring.poly({key - content: value for key, value in poly.terms.items()}, poly.den)
    return amplitude_of(ring, content), rest


def _product(poly: Poly) -> Any | None:
    """Number times monomial times factors, or None if that is no shorter."""
    factors = factored(poly)
    if factors is None:
        return written(poly) if len(poly) < 3 else None
    if factors and factors[0][1] == 1 and len(factors) == 1 and len(poly) > 2:
        return None
    total, number, result = poly.ring.rational(1), sp.S.One, sp.S.One
    for factor, power in factors:
        real = _real(factor)
        if real is None:
            return None
        total = total * real.power(power)
        content, wave = _primitive(_sum(real))
        number, result = number * content**power, result * wave**power
    left = _quotient(poly, total)
    return None if left is None else number * written(left) * result


def _primitive(expression: Any) -> tuple[Any, Any]:
    """A number and a sum without common number or leading minus."""
    content, rest = expression.as_content_primitive()
    return (-content, -rest) if rest.could_extract_minus_sign() else (content, rest)


def _sum(poly: Poly) -> Any:
    """A polynomial with no factors: split by one angle if that is shorter."""
    if len(poly) < 3:
        return written(poly)
    split = best_split(poly) or by_amplitude(poly)
    if split is None:
        return written(poly)
    return sp.Add(*(compact(part) * factor for factor, part in split if part))


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
