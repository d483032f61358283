"""Sums of roots of unity written as one size and one phase, such as 2 cos(17 deg) at 34 deg.

The basis that decides equality writes exp(34 deg i) as eight terms. Here the short form is found from its value and
then proved: the candidate is multiplied out and compared in that basis.
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache

import numpy as np
import sympy as sp

from fastaxis.engines.symbolic.ring.roots import TURN, canonical, gauss_root, split_square

__all__ = ["Polar", "canonical_sum", "polar", "square_root"]

Number = dict[int, int]
"""Whole coefficients by root of unity."""

FINEST = 30_000  # parts of a turn among which a phase is looked for
LARGEST = 2**40  # beyond, a double does not tell neighbouring whole numbers apart
CLOSE = 1e-9  # far wider than roundings; what is found is proved afterwards
SQUARES = 100_000


@dataclass(frozen=True)
class Polar:
    """factor sqrt(square) * 2 cos(2 pi opening/TURN) * exp(2 pi i root/TURN); without ``opening`` no cosine.

    Parameters
    ----------
    factor : positive whole number.
    square : product of different primes.
    """

    factor: int
    square: int
    root: int
    opening: int | None = None

    @property
    def terms(self) -> Number:
        """The number in roots of unity; empty if its square root has none."""
        return _multiplied(self)

    @property
    def size(self) -> sp.Expr:
        """The size as a sympy number."""
        size = self.factor * sp.sqrt(self.square)
        return size if self.opening is None else 2 * size * sp.cos(2 * sp.pi * sp.Rational(self.opening, TURN))


def polar(number: Number) -> Polar | None:
    """A sum of roots of unity as size and phase, or None if it has no short one.

    >>> polar({0: 1, TURN // 4: 1}) == Polar(1, 2, TURN // 8)
    True
    """
    return _polar(tuple(sorted(number.items())))


@lru_cache(maxsize=4096)
def _polar(items: tuple[tuple[int, int], ...]) -> Polar | None:
    if len(items) == 1:
        ((root, value),) = items
        return Polar(abs(value), 1, (root if value > 0 else root + TURN // 2) % TURN)
    parts = 4 * math.lcm(*(TURN // math.gcd(root % TURN, TURN) for root, _ in items))
    if parts > FINEST or TURN % parts or sum(abs(value) for _, value in items) > LARGEST:
        return None
    total = sum((v * cmath.exp(2j * math.pi * (root % TURN) / TURN) for root, v in items), 0j)
    if total == 0:
        return None
    place = cmath.phase(total) / (2 * math.pi) * parts
    if abs(place - round(place)) > 1e-6:
        return None
    root = round(place) % parts * (TURN // parts)
    wanted = canonical_sum(items)
    found = (_split(square, root, opening) for square, opening in _sizes(abs(total), parts))
    return next((size for size in found if canonical_sum(_multiplied(size).items()) == wanted), None)


def square_root(number: Number, den: int) -> tuple[Polar, int] | None:
    """(size, d) with number/den the square of size/d, for a positive number; None if that is no short one.

    >>> size, d = square_root({0: 2, TURN // 8: -1, -TURN // 8: -1}, 4)
    >>> size.size / d == sp.sin(sp.pi / 8)
    True
    """
    parts = 8 * math.lcm(*(TURN // math.gcd(root % TURN, TURN) for root in number))
    value = sum((v * cmath.exp(2j * math.pi * (root % TURN) / TURN) for root, v in number.items()), 0j) * den
    if parts > FINEST or TURN % parts or value.real <= 0:
        return None
    wanted = canonical_sum((root, v * den) for root, v in number.items())
    for square, opening in _sizes(math.sqrt(value.real), parts):
        size = _split(square, 0, opening)
        factor = _multiplied(size)
        if canonical_sum(_product(factor, factor).items()) == wanted:
            return size, den
    return None


def _sizes(size: float, parts: int) -> Iterator[tuple[int, int | None]]:
    """(square, opening) of sizes that are a square root, alone or with a cosine; the smallest squares first."""
    square = round(size * size)
    if square and square < SQUARES and abs(size * size - square) < CLOSE * square:
        yield square, None
    steps = np.arange(1, parts // 4)
    squares = (size / (2 * np.cos(2 * math.pi * steps / parts))) ** 2
    whole = np.rint(squares)
    good = (whole > 0) & (whole < SQUARES) & (np.abs(squares - whole) < CLOSE * squares)
    for square, step in sorted(zip(whole[good].astype(int).tolist(), steps[good].tolist(), strict=True))[:3]:
        yield square, step * (TURN // parts)


def _split(square: int, root: int, opening: int | None) -> Polar:
    factor, primes = split_square(Fraction(square))
    return Polar(int(factor), math.prod(primes), root, opening)


def _multiplied(size: Polar) -> Number:
    number = {size.root: size.factor}
    if size.opening is not None:
        number = _product(number, {size.opening: 1, -size.opening: 1})
    for prime in split_square(Fraction(size.square))[1]:
        if TURN % prime:
            return {}
        number = _product(number, {exponent: sign for sign, exponent in gauss_root(prime)})
    return number


def _product(one: Number, other: Number) -> Number:
    found: Number = {}
    for a, x in one.items():
        for b, y in other.items():
            found[a + b] = found.get(a + b, 0) + x * y
    return found


def canonical_sum(terms: Iterable[tuple[int, int]]) -> Number:
    """(root, coefficient) pairs added up in the basis that decides equality."""
    found: Number = {}
    for root, value in terms:
        for sign, exponent in canonical(root % TURN):
            found[exponent] = found.get(exponent, 0) + sign * value
    return {root: value for root, value in found.items() if value}
