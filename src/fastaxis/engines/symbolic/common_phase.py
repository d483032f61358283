"""The phase that both components share all over the plane, and that no frame shows."""

from __future__ import annotations

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.expressions import middle, split_key
from fastaxis.engines.symbolic.field import Pair
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["made_real", "without_common_phase"]


def without_common_phase(pair: Pair) -> Pair:
    """Both components without the phase they share all over the plane."""
    polys = [poly for poly in pair if poly]
    if not polys:
        return pair
    ring = polys[0].ring
    _, exponents = ring.exponents(middle(polys))
    common = {place: value for place, value in exponents.items() if not ring.generators[place].expression.has(R, PHI)}
    root = split_key(ring, min(polys[0].terms))[2]
    key = ring.pack(root, common)
    left, right = (Poly.made(ring, {k - key: v for k, v in poly.terms.items()}, poly.den) for poly in pair)
    return left, right


def made_real(pair: Pair) -> Pair:
    """Both components turned by one constant phase that makes them real, if there is one."""
    ring = pair[0].ring
    roots = sorted({split_key(ring, key)[2] for poly in pair for key in poly.terms})
    halfway = {(one + other) // 2 for one in roots for other in roots}
    for root in sorted(halfway | {0}):
        for turn in (0, TURN // 4):
            left, right = (_turned(poly, -root - turn) for poly in pair)
            if all(poly.terms == poly.conj().terms for poly in (left, right)):
                return left, right
    return pair


def _turned(poly: Poly, root: int) -> Poly:
    return Poly.made(poly.ring, {key + root: value for key, value in poly.terms.items()}, poly.den)
