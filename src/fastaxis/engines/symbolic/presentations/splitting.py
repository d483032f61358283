"""A sum written around one angle: A + B cos + C sin, or with the squares of its half."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.expressions import amplitude_of, split_key
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.ring import ANGLE, UNIT

__all__ = ["best_split", "by_amplitude"]

Split = list[tuple[Any, Poly]]


def best_split(poly: Poly) -> Split | None:
    """[(factor, rest), ...] with the fewest terms in the rests, or None if no split has fewer than the sum itself."""
    candidates = [split for place in _angles(poly) for split in _splits(poly, place)]
    best = min(candidates, key=lambda split: (_complex_parts(split), _size(split)), default=None)
    # A sum of n cosines has 2 n terms.
    return best if best is not None and _size(best) < len(poly) else None


def by_amplitude(poly: Poly) -> Split | None:
    """[(amplitude, rest), ...] of a sum with several amplitudes, or None."""
    ring = poly.ring

    def amplitude(key: int) -> tuple[int, int]:
        _, size, _ = split_key(ring, key)
        return size, key - size

    parts = poly.parts(amplitude)
    return None if len(parts) < 2 else [(amplitude_of(ring, size), part) for size, part in parts.items()]


def _size(split: Split) -> int:
    return sum(len(part) for _, part in split)


def _complex_parts(split: Split) -> int:
    """How many rests are neither real nor i times real: those would be written with exponentials."""
    return sum(not any(real.terms == real.conj().terms for real in _quarters(part)) for _, part in split)


def _quarters(part: Poly) -> tuple[Poly, Poly]:
    return part, part * part.ring.root_of_unity(Fraction(1, 4))


def _angles(poly: Poly) -> list[int]:
    ring = poly.ring
    places = {place for key in poly.terms for place in ring.exponents(key)[1]}
    return sorted(place for place in places if ring.generators[place].kind == ANGLE)


def _splits(poly: Poly, place: int) -> list[Split]:
    ring = poly.ring

    def order(key: int) -> tuple[int, int]:
        root, exponents = ring.exponents(key)
        turns = exponents.pop(place, 0)
        return turns, ring.pack(root, exponents)

    parts = poly.parts(order)
    step = max(parts)
    if step <= 0 or set(parts) - {-step, 0, step}:
        return []
    zero, i = ring.zero, ring.root_of_unity(Fraction(1, 4))
    plus, mean, minus = (parts.get(n, zero) for n in (step, 0, -step))
    even, odd = plus + minus, (plus - minus) * i
    angle = sp.Rational(step, UNIT) * ring.generators[place].expression
    plain = [(sp.S.One, mean), (sp.cos(angle), even), (sp.sin(angle), odd)]
    if not mean:
        return [plain]
    half = [(sp.cos(angle / 2) ** 2, mean + even), (sp.sin(angle / 2) ** 2, mean - even), (sp.sin(angle), odd)]
    return [half, plain]
