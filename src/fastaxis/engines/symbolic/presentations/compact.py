"""The short way: products of cosines, with half-angle squares where they exist.

The polynomial is factored; a factor of two equal terms is a cosine of half their difference in phase. A factor with
more terms is split by the angle that makes the rest shortest, cos^2(d/2) ... + sin^2(d/2) ... + sin(d) ..., and so on.
A product is multiplied up again in the ring and used only if it is exactly the polynomial asked for.
"""

from __future__ import annotations

from fractions import Fraction
from typing import Any
from weakref import WeakKeyDictionary

import sympy as sp

from fastaxis.engines.symbolic.expressions import amplitude_of, by_root, written
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.presentations.pieces import by_reality, by_surd, off_constant
from fastaxis.engines.symbolic.presentations.reality import is_real, made_real, quotient
from fastaxis.engines.symbolic.presentations.shortness import content_out, doubled, length, one_number
from fastaxis.engines.symbolic.presentations.splitting import best_split, by_amplitude
from fastaxis.engines.symbolic.ring import Poly, Ring
from fastaxis.engines.symbolic.ring.division import in_lowest_terms
from fastaxis.engines.symbolic.ring.ring import ANGLE

__all__ = ["compact"]

MOST_TERMS = 600  # beyond, a form is not short whatever one does
MOST_WAYS = 24  # beyond, only one way of splitting is tried


# Ways of splitting meet in the same pieces again and again.
_KNOWN: WeakKeyDictionary[Ring, dict[Any, Any]] = WeakKeyDictionary()


def compact(poly: Poly) -> Any:
    """A polynomial as a short product or sum of products."""
    known, name = _KNOWN.setdefault(poly.ring, {}), (frozenset(poly.terms.items()), poly.den)
    if name not in known:
        known[name] = _shortest(in_lowest_terms(poly)) if poly else sp.S.Zero
    return known[name]


def _shortest(poly: Poly) -> Any:
    if len(poly) > MOST_TERMS:
        return written(poly)
    surd, bare = _without_surd(poly)
    if surd == 1:
        return one_number(_without_roots(poly))
    rooted = one_number(surd * content_out(_without_roots(bare)))
    return rooted if len(by_root(poly)) > MOST_WAYS else min(rooted, one_number(_without_roots(poly)), key=length)


def _without_roots(poly: Poly) -> Any:
    content, rest = _without_content(poly)
    product = _product(rest)
    return content * (_sum(rest) if product is None else product)


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
    if not factors:
        return written(poly)
    if len(factors) == 1 and factors[0][1] == 1 and len(by_root(poly)) > 2:
        return None
    total, number, result = poly.ring.rational(1), sp.S.One, sp.S.One
    for factor, power in factors:
        real = made_real(factor)
        if real is None:
            return None
        total = total * real.power(power)
        content, wave = _primitive(_sum(real))
        number, result = number * content**power, result * wave**power
    left = quotient(poly, total)
    return None if left is None else number * written(left) * doubled(result)


def _primitive(expression: Any) -> tuple[Any, Any]:
    """A number and a sum without common number or leading minus."""
    content, rest = expression.as_content_primitive()
    return (-content, -rest) if rest.could_extract_minus_sign() else (content, rest)


def _sum(poly: Poly) -> Any:
    """A polynomial with no factors: split in the way that makes it shortest."""
    if len(by_root(poly)) < 2 or (len(by_root(poly)) < 3 and is_real(poly)):
        return written(poly)
    best = best_split(poly) or by_amplitude(poly)
    ways = [best] if best else []
    if len(by_root(poly)) <= MOST_WAYS:
        ways += [split for split in (off_constant(poly), by_surd(poly), by_reality(poly)) if split]
    found = [sp.Add(*(compact(part) * factor for factor, part in way if part)) for way in ways]
    return min([*found, written(poly)], key=length)
