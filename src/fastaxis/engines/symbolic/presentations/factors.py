"""Factors of a polynomial of the ring over the rational numbers."""

from __future__ import annotations

from dataclasses import dataclass
from functools import reduce
from math import gcd, lcm

import sympy as sp

from fastaxis.engines.symbolic.expressions import by_root
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.polar import polar
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["factored"]

# Beyond these, factoring costs more than a short form is worth.
MOST_TERMS, MOST_GENERATORS, MOST_DEGREE = 48, 8, 24
SIXTEEN, FINEST = 16, 2**20


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

    Coefficients are made real by giving each phasor a constant phase; where no such phases are found nothing is
    factored: over the complex numbers it takes far too long.
    """
    rows = _rows(poly)
    if rows is None or len(rows) > MOST_TERMS:
        return None
    if len(rows) < 2:
        return []
    layout = _layout([exponents for exponents, _, _ in rows])
    powers = [layout.powers(exponents) for exponents, _, _ in rows]
    if len(layout.places) > MOST_GENERATORS or sum(map(max, zip(*powers, strict=True))) > MOST_DEGREE:
        return None
    turns = [root - rows[0][1] for _, root, _ in rows]
    parts = lcm(SIXTEEN, *(TURN // gcd(turn, TURN) for turn in turns))
    steps = [turn * parts // TURN for turn in turns]
    twists = _twists(powers, steps, parts // 2) if parts < FINEST else None
    if twists is None:
        return None
    terms: dict[tuple[int, ...], int] = {}
    for power, step, (_, _, value) in zip(powers, steps, rows, strict=True):
        turned = step - sum(t * (n - first) for t, n, first in zip(twists, power, powers[0], strict=True))
        terms[power] = value if turned % parts == 0 else -value
    letters = sp.symbols(f"x0:{len(layout.places)}")
    _, factors = sp.Poly(terms, *letters, domain=sp.ZZ).factor_list()
    found = [(factor, power) for factor, power in factors if len(factor.terms()) > 1]
    return [(_back(poly, factor, layout, twists, parts), power) for factor, power in found]


def _rows(poly: Poly) -> list[tuple[dict[int, int], int, int]] | None:
    """(exponents, root, whole coefficient) of each monomial, without a number that all share; None if none is."""
    sizes = {key: polar(number) for key, number in by_root(poly).items()}
    numbers = {(size.square, size.opening) if size else None for size in sizes.values()}
    if None in numbers or len(numbers) > 1:
        return None
    return [(poly.ring.exponents(key)[1], size.root, size.factor) for key, size in sizes.items() if size]


def _layout(rows: list[dict[int, int]]) -> _Layout:
    places = sorted({place for exponents in rows for place in exponents})
    lowest = {p: min(e.get(p, 0) for e in rows) for p in places}
    steps = {p: reduce(gcd, (e.get(p, 0) - lowest[p] for e in rows)) for p in places}
    moving = tuple(p for p in places if steps[p])
    return _Layout(moving, tuple(lowest[p] for p in moving), tuple(steps[p] for p in moving))


def _twists(powers: list[tuple[int, ...]], steps: list[int], half: int) -> list[int] | None:
    """Constant phases of the phasors that make all coefficients real, up to a common phase; ``half`` is half a turn."""
    width = len(powers[0])
    # Differences to the first term: sum n t = step, modulo half a turn.
    rows = [
        ([n - first for n, first in zip(power, powers[0], strict=True)], step % half)
        for power, step in zip(powers[1:], steps[1:], strict=True)
    ]
    solved: list[tuple[int, list[int], int]] = []
    while rows:
        pivot = next(((i, j) for i, (row, _) in enumerate(rows) for j in range(width) if gcd(row[j], half) == 1), None)
        if pivot is None:
            break
        row, value = rows.pop(pivot[0])
        inverse = pow(row[pivot[1]], -1, half)
        row, value = [n * inverse % half for n in row], value * inverse % half
        solved.append((pivot[1], row, value))
        rows = [
            (
                [(n - other[pivot[1]] * m) % half for n, m in zip(other, row, strict=True)],
                (v - other[pivot[1]] * value) % half,
            )
            for other, v in rows
        ]
    if any(value for _, value in rows):
        return None
    twists = [0] * width
    for place, row, value in reversed(solved):
        twists[place] = (
            value - sum(n * t for n, t in zip(row, twists, strict=True)) + row[place] * twists[place]
        ) % half
    return twists


def _back(poly: Poly, factor: sp.Poly, layout: _Layout, twists: list[int], parts: int) -> Poly:
    ring, terms = poly.ring, {}
    for powers, coefficient in factor.terms():
        columns = zip(layout.places, powers, layout.steps, strict=True)
        root = sum(t * n for t, n in zip(twists, powers, strict=True)) * (TURN // parts)
        terms[ring.pack(root % TURN, {place: n * step for place, n, step in columns})] = int(coefficient)
    return ring.poly(terms)
