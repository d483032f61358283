"""Linear equations of light among places: what comes out at one place, as a fraction of polynomials of the ring."""

from __future__ import annotations

from collections.abc import Hashable, Mapping
from dataclasses import dataclass
from functools import cache, reduce
from itertools import product
from operator import add

from fastaxis.engines.symbolic.field import Pair
from fastaxis.engines.symbolic.ring import Poly

__all__ = ["Loops", "Matrix", "Quotient"]

Matrix = tuple[tuple[Poly, Poly], tuple[Poly, Poly]]
"""On (E_L, E_R)."""

Place = Hashable
Ways = dict[tuple[Place, Place], Matrix]


@dataclass(frozen=True)
class Quotient:
    """(E_L, E_R) above a common denominator, the product of ``below``."""

    above: Pair
    below: tuple[Poly, ...] = ()


def _times(later: Matrix, first: Matrix) -> Matrix:
    """The matrix of light that meets ``first`` and then ``later``."""
    (a, b), (c, d) = later
    (e, f), (g, h) = first
    return (a * e + b * g, a * f + b * h), (c * e + d * g, c * f + d * h)


def _plus(one: Matrix | None, other: Matrix) -> Matrix:
    if one is None:
        return other
    return tuple(tuple(a + b for a, b in zip(*rows, strict=True)) for rows in zip(one, other, strict=True))  # type: ignore[return-value]  # two by two


@dataclass(frozen=True)
class Loops:
    """The light at one place for light sent in at another: the field at each place is the sum of what comes in.

    Parameters
    ----------
    ways : matrices between places.
    start, end : where light is sent in, and where it is asked for.
    places : where light comes back to, two unknowns of the equations each.
    """

    ways: Ways
    start: Place
    end: Place
    places: tuple[Place, ...]

    @classmethod
    def of(cls, ways: Mapping[tuple[Place, Place], Matrix], start: Place, end: Place) -> Loops:
        """Places without loops are taken out one after the other, the ways through them put in their stead.

        S. J. Mason, Proc. IRE 41, 1144 (1953).
        """
        left = dict(ways)
        while True:
            inner = {place for way in left for place in way} - {start, end}
            free = [place for place in inner if (place, place) not in left]
            if not free:
                back = {end} if any(before == end for before, _ in left) else set()
                return cls(left, start, end, tuple(sorted(inner | back, key=repr)))
            left = _without(left, min(free, key=lambda place: (_crossing(left, place), repr(place))))

    def light(self, sent: Pair) -> Quotient:
        """(1 - M) e = s by Cramer's rule, each hand by itself where no way turns one into the other."""
        if not self.places:
            return Quotient(_sent(self.ways.get((self.start, self.end)), sent))
        if any(part for matrix in self.ways.values() for part in (matrix[0][1], matrix[1][0])):
            above, below = self._solved(sent, (0, 1))
            return Quotient((above[0], above[1]), (below,))
        (left,), under_left = self._solved(sent, (0,))
        (right,), under_right = self._solved(sent, (1,))
        if not right or under_left == under_right:
            return Quotient((left, right), (under_left,))
        if not left:
            return Quotient((left, right), (under_right,))
        return Quotient((left * under_right, right * under_left), (under_left, under_right))

    def _solved(self, sent: Pair, hands: tuple[int, ...]) -> tuple[list[Poly], Poly]:
        """(what is above for each hand, what is below), as bordered determinants."""
        inside = [self._row(place, hand, sent, hands) for place in self.places for hand in hands]
        below = _determinant([row[:-1] for row in inside])
        return [_determinant([*inside, self._last(hand, sent, hands)]) for hand in hands], below

    def _row(self, here: Place, hand: int, sent: Pair, hands: tuple[int, ...]) -> list[Poly]:
        """1 - M at a place, and what is sent there."""
        ring, found = sent[0].ring, list[Poly]()
        for there, other in product(self.places, hands):
            matrix = self.ways.get((there, here))
            own = ring.rational(1) if (there, other) == (here, hand) else ring.zero
            found.append(own - matrix[hand][other] if matrix else own)
        return [*found, _sent(self.ways.get((self.start, here)), sent)[hand]]

    def _last(self, hand: int, sent: Pair, hands: tuple[int, ...]) -> list[Poly]:
        if self.end not in self.places:
            return self._row(self.end, hand, sent, hands)
        ring = sent[0].ring
        unknowns = product(self.places, hands)
        return [*(ring.rational(-1) if one == (self.end, hand) else ring.zero for one in unknowns), ring.zero]


def _crossing(ways: Ways, place: Place) -> int:
    return sum(after == place for _, after in ways) * sum(before == place for before, _ in ways)


def _without(ways: Ways, place: Place) -> Ways:
    kept = {way: matrix for way, matrix in ways.items() if place not in way}
    into = [(before, matrix) for (before, after), matrix in ways.items() if after == place]
    out = [(after, matrix) for (before, after), matrix in ways.items() if before == place]
    for (before, first), (after, later) in product(into, out):
        kept[before, after] = _plus(kept.get((before, after)), _times(later, first))
    return kept


def _sent(matrix: Matrix | None, light: Pair) -> Pair:
    zero = light[0].ring.zero
    if matrix is None:
        return zero, zero
    return tuple(row[0] * light[0] + row[1] * light[1] for row in matrix)  # type: ignore[return-value]  # two


def _determinant(rows: list[list[Poly]]) -> Poly:
    """By expansion along rows, each minor worked out once: there is no division in the ring."""
    size, ring = len(rows), rows[0][0].ring

    @cache
    def minor(row: int, columns: tuple[int, ...]) -> Poly:
        if row == size:
            return ring.rational(1)
        parts = (
            (rows[row][column] if place % 2 == 0 else -rows[row][column])
            * minor(row + 1, columns[:place] + columns[place + 1 :])
            for place, column in enumerate(columns)
            if rows[row][column]
        )
        return reduce(add, parts, ring.zero)

    return minor(0, tuple(range(size)))
