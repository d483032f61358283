"""Polynomials in several numbers through points that are added one by one."""

from __future__ import annotations

from functools import cache
from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

__all__ = ["Polynomials", "nodes"]

Reals: TypeAlias = NDArray[np.float64]
Index: TypeAlias = tuple[int, ...]

# The first node is not zero: there a bench may be more symmetric than anywhere about it, and computed in another way.
FIRST = 1 / 16


@cache
def nodes(count: int) -> tuple[float, ...]:
    """Places in -1 .. 1, each as far as can be from all before it: polynomials through them never swing widely.

    F. Leja, Ann. Polon. Math. 4, 8 (1957).

    >>> nodes(3)
    (0.0625, -1.0, 1.0)
    """
    fine = np.linspace(-1, 1, 4001)
    found = [FIRST]
    while len(found) < count:
        # The products of two places often are the same but for a rounding: the lower one is taken.
        products = np.round(np.prod([np.abs(fine - node) for node in found], axis=0), 12)
        found.append(float(fine[int(np.argmax(products))]))
    return tuple(found)


class Polynomials:
    """A polynomial known by what each point added to it: sum of surplus * H over the points.

    The point of an index (a, b, ...) has node a of the first number, node b of the second; H is the product of
    prod_(j<a) (z - z_j)/(z_a - z_j) over the numbers. Where an index is taken after all that are smaller, H is zero at
    every point taken before its own, so that a point more changes no surplus. A. Chkifa, A. Cohen, C. Schwab,
    Found. Comput. Math. 14, 601 (2014).

    Parameters
    ----------
    numbers : how many; with none at all it is the light at its one point.
    """

    def __init__(self, numbers: int) -> None:
        self.numbers = numbers
        self.sizes: dict[Index, float] = {}

    def __len__(self) -> int:
        return len(self.sizes)

    @property
    def start(self) -> list[Index]:
        """Indices to begin with: the middle, and two more nodes of each number by itself."""
        ones = [
            tuple(order * (k == place) for k in range(self.numbers))
            for order in (1, 2)
            for place in range(self.numbers)
        ]
        return [(0,) * self.numbers, *ones]

    def point(self, index: Index) -> Reals:
        """Where an index stands, each number in -1 .. 1."""
        return np.array([nodes(max(index, default=0) + 1)[order] for order in index])

    def take(self, index: Index, size: float) -> None:
        """Add an index, with the size of its surplus."""
        self.sizes[index] = size

    def next(self) -> list[Index]:
        """The indices that most likely add most: a mixed effect is about as large as its causes one upon the other.

        From the third order of a number on they come in pairs: a node more at one end alone makes the other end worse.
        """
        if not self.numbers:
            return []
        best = self._likeliest()
        place = int(np.argmax(best))
        paired = _raised(best, place, 1)
        return [best, paired] if best[place] > 2 and best[place] % 2 and self._admits(paired, best) else [best]

    def _admits(self, index: Index, *taken: Index) -> bool:
        below = [_raised(index, k, -1) for k in range(self.numbers) if index[k]]
        return index not in self.sizes and all(one in self.sizes or one in taken for one in below)

    def _likeliest(self) -> Index:
        whole = self.sizes[(0,) * self.numbers] or 1.0
        found: dict[Index, float] = {}
        for index in self.sizes:
            for place in range(self.numbers):
                tried = _raised(index, place, 1)
                if self._admits(tried):
                    below = [(k, _raised(tried, k, -1)) for k in range(self.numbers) if tried[k]]
                    alone = [self.sizes[_raised((0,) * self.numbers, k, 1)] for k, _ in below]
                    found[tried] = min(self.sizes[one] * a / whole for (_, one), a in zip(below, alone, strict=True))
        return max(found, key=lambda index: (found[index], tuple(-order for order in index)))

    def values(self, places: Reals) -> Reals:
        """H of every index taken, (rows, indices), at places (rows, numbers)."""
        most = max((max(index, default=0) for index in self.sizes), default=0)
        one = np.ones((most + 1, *places.shape))
        known = nodes(most + 1)
        for order in range(1, most + 1):
            for earlier in range(order):
                one[order] *= (places - known[earlier]) / (known[order] - known[earlier])
        out = np.ones((len(places), len(self.sizes)))
        for column, index in enumerate(self.sizes):
            for place, order in enumerate(index):
                if order:
                    out[:, column] *= one[order, :, place]
        return out


def _raised(index: Index, place: int, by: int) -> Index:
    return (*index[:place], index[place] + by, *index[place + 1 :])
