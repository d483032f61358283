"""Factors of a polynomial of the ring over the rational numbers (or those with i)."""

from __future__ import annotations

from functools import reduce
from math import gcd

import sympy as sp

from fastaxis.engines.symbolic.ring import Poly, Ring
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["factored"]

MOST_TERMS, MOST_GENERATORS = 120, 9  # beyond these, factoring costs more than a short form is worth


def factored(poly: Poly) -> list[tuple[Poly, int]] | None:
    """[(factor, power), ...] without factors of one term, or None where nothing is found.

    Exponents of each generator are counted from their lowest value in steps of their common divisor.
    """
    if len(poly) < 2:
        return []
    ring = poly.ring
    rows = [(ring.exponents(key), value) for key, value in poly.terms.items()]
    places = sorted({place for (_, exponents), _ in rows for place in exponents})
    lowest = {p: min(e.get(p, 0) for (_, e), _ in rows) for p in places}
    steps = {p: reduce(gcd, (e.get(p, 0) - lowest[p] for (_, e), _ in rows)) for p in places}
    moving = [p for p in places if steps[p]]
    if len(poly) > MOST_TERMS or len(moving) > MOST_GENERATORS or not moving:
        return None
    first_root = rows[0][0][0]
    terms: dict[tuple[int, ...], object] = {}
    for (root, exponents), value in rows:
        unit = _fourth_root(root - first_root)
        if unit is None:
            return None
        power = tuple((exponents.get(p, 0) - lowest[p]) // steps[p] for p in moving)
        terms[power] = terms.get(power, 0) + value * unit  # type: ignore[operator]
    letters = sp.symbols(f"x0:{len(moving)}")
    plain = all(sp.im(value) == 0 for value in terms.values())
    domain = sp.ZZ if plain else sp.ZZ_I
    _, factors = sp.Poly(terms, *letters, domain=domain).factor_list()
    return [(_back(ring, factor, moving, steps), power) for factor, power in factors if len(factor.terms()) > 1]


def _fourth_root(root: int) -> object | None:
    """The root of unity as 1, i, -1 or -i, or None."""
    quarter, rest = divmod(root % TURN, TURN // 4)
    return None if rest else sp.I**quarter


def _back(ring: Ring, factor: sp.Poly, moving: list[int], steps: dict[int, int]) -> Poly:
    result = ring.zero
    for powers, coefficient in factor.terms():
        key = ring.pack(0, {p: n * steps[p] for p, n in zip(moving, powers, strict=True)})
        for part, root in ((sp.re(coefficient), 0), (sp.im(coefficient), TURN // 4)):
            if part:
                result = result + ring.poly({key + root: int(part)})
    return result
