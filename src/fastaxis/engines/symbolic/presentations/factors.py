"""Factors of a polynomial of the ring over the rational numbers."""

from __future__ import annotations

from dataclasses import dataclass
from functools import reduce
from math import gcd

import sympy as sp

from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["factored"]

# Beyond these, factoring costs more than a short form is worth.
MOST_TERMS, MOST_GENERATORS, MOST_DEGREE = 48, 8, 24
SIXTEENTHS, HALF = 16, 8


@dataclass(frozen=True)
class _Layout:
    """How exponents of the ring become whole powers: counted from the lowest, in steps of their common divisor."""

    places: tuple[int, ...]
    lowest: tuple[int, ...]
    steps: tuple[int, ...]

    def powers(self, exponents: dict[int, int]) -> tuple[int, ...]:
        columns = zip(self.places, self.lowest, self.steps, strict=True)
        return tuple((exponents.get(place, 0) - low) // step for place, low, step in columns)


def factored(poly: Poly) -> list[tuple[Poly, int]] | None:
    """[(factor, power), ...] without factors of one term, or None where none are looked for.

    Coefficients are made real by giving each phasor a constant phase; where that can't be done with sixteenths of a
    turn nothing is factored: over the complex numbers it takes far too long.
    """
    if len(poly) < 2:
        return []
    if len(poly) > MOST_TERMS:
        return None
    ring = poly.ring
    rows = [(*ring.exponents(key), value) for key, value in poly.terms.items()]
    layout = _layout([exponents for _, exponents, _ in rows])
    powers = [layout.powers(exponents) for _, exponents, _ in rows]
    if len(layout.places) > MOST_GENERATORS or sum(map(max, zip(*powers, strict=True))) > MOST_DEGREE:
        return None
    twists = _twists(powers, [root - rows[0][0] for root, _, _ in rows])
    if twists is None:
        return None
    terms: dict[tuple[int, ...], int] = {}
    for power, (root, _, value) in zip(powers, rows, strict=True):
        turned = (root - rows[0][0]) * SIXTEENTHS // TURN
        turned -= sum(t * (n - first) for t, n, first in zip(twists, power, powers[0], strict=True))
        terms[power] = terms.get(power, 0) + (value if turned % SIXTEENTHS == 0 else -value)
    letters = sp.symbols(f"x0:{len(layout.places)}")
    _, factors = sp.Poly(terms, *letters, domain=sp.ZZ).factor_list()
    return [(_back(poly, factor, layout, twists), power) for factor, power in factors if len(factor.terms()) > 1]


def _layout(rows: list[dict[int, int]]) -> _Layout:
    places = sorted({place for exponents in rows for place in exponents})
    lowest = {p: min(e.get(p, 0) for e in rows) for p in places}
    steps = {p: reduce(gcd, (e.get(p, 0) - lowest[p] for e in rows)) for p in places}
    moving = tuple(p for p in places if steps[p])
    return _Layout(moving, tuple(lowest[p] for p in moving), tuple(steps[p] for p in moving))


def _twists(powers: list[tuple[int, ...]], roots: list[int]) -> list[int] | None:
    """Constant phases [1/16 turn] of the phasors that make all coefficients real, up to a common phase."""
    if any(root * SIXTEENTHS % TURN for root in roots):
        return None
    width = len(powers[0])
    # Differences to the first term: sum n t = root, modulo half a turn.
    rows = [
        ([n - first for n, first in zip(power, powers[0], strict=True)], root * SIXTEENTHS // TURN % HALF)
        for power, root in zip(powers[1:], roots[1:], strict=True)
    ]
    solved: list[tuple[int, list[int], int]] = []
    while rows:
        pivot = next(((i, j) for i, (row, _) in enumerate(rows) for j in range(width) if row[j] % 2), None)
        if pivot is None:
            break
        row, value = rows.pop(pivot[0])
        inverse = pow(row[pivot[1]], -1, HALF)
        row, value = [n * inverse % HALF for n in row], value * inverse % HALF
        solved.append((pivot[1], row, value))
        rows = [
            (
                [(n - other[pivot[1]] * m) % HALF for n, m in zip(other, row, strict=True)],
                (v - other[pivot[1]] * value) % HALF,
            )
            for other, v in rows
        ]
    if any(value for _, value in rows):
        return None
    twists = [0] * width
    for place, row, value in reversed(solved):
        twists[place] = (
            value - sum(n * t for n, t in zip(row, twists, strict=True)) + row[place] * twists[place]
        ) % HALF
    return twists


def _back(poly: Poly, factor: sp.Poly, layout: _Layout, twists: list[int]) -> Poly:
    ring, terms = poly.ring, {}
    for powers, coefficient in factor.terms():
        columns = zip(layout.places, powers, layout.steps, strict=True)
        root = sum(t * n for t, n in zip(twists, powers, strict=True)) * (TURN // SIXTEENTHS)
        terms[ring.pack(root % TURN, {place: n * step for place, n, step in columns})] = int(coefficient)
    return ring.poly(terms)
