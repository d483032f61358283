"""Whether a polynomial is zero, when square roots and denominators hide it."""

from __future__ import annotations

import math

import sympy as sp

from fastaxis.engines.symbolic.ring.poly import Poly
from fastaxis.engines.symbolic.ring.ring import UNIT
from fastaxis.engines.symbolic.ring.roots import TURN, gauss_root

__all__ = ["vanishes"]


def vanishes(poly: Poly) -> bool:
    """Decides whether a canonical polynomial with terms is zero after all.

    Two relations are left out of the canonical form because they lengthen it: 1/(sum) times (sum) is 1, and the
    square root of a prime above 5 is a sum of that prime's roots of unity.
    """
    return not _surds_written_out(_denominators_cleared(poly)).terms


def _denominators_cleared(poly: Poly) -> Poly:
    ring = poly.ring
    sums = {place for place, _ in ring.sums()}
    lowest: dict[int, int] = {}
    for key in poly.terms:
        for place, exponent in ring.exponents(key)[1].items():
            if place in sums:
                lowest[place] = min(lowest.get(place, 0), exponent)
    factor = ring.pack(0, {place: -(exponent // UNIT) * UNIT for place, exponent in lowest.items() if exponent < 0})
    return Poly.made(ring, {key + factor: value for key, value in poly.terms.items()}, poly.den) if factor else poly


def _surds_written_out(poly: Poly) -> Poly:
    ring = poly.ring
    orders = {TURN // math.gcd(ring.exponents(key)[0], TURN) for key in poly.terms}
    primes = {
        place: int(generator.expression)
        for place, generator in enumerate(ring.generators)
        if isinstance(generator.expression, sp.Integer)
        and generator.kind == "real"
        and any(order % generator.expression == 0 for order in orders)
    }

    def written(key: int) -> Poly:
        root, exponents = ring.exponents(key)
        product = ring.rational(1)
        for place, prime in primes.items():
            if exponents.pop(place, 0):
                product = product * Poly.made(ring, {e: s for s, e in gauss_root(prime)}, 1)
        return product * Poly.made(ring, {ring.pack(root, exponents): 1}, 1)

    return poly.map_keys(written) if primes else poly
