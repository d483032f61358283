"""Radial functions apart from their numbers: what differs by a number alone travels once, and is remembered.

Turning a plate changes how much light each harmonic has, seldom how it is spread along the radius.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Hashable
from dataclasses import dataclass
from typing import Protocol, TypeVar

import numpy as np

from fastaxis.engines.azimuthal.panels import Complexes, Profile
from fastaxis.engines.memory import LIGHT

__all__ = ["Shapes", "remembered"]

ALIKE = 32 * np.finfo(float).eps
"""Of the peak: some dozen products and sums of numbers of order one have gone into each function."""


@dataclass(frozen=True, eq=False)
class Shapes:
    """Functions f_i = sum of numbers_ij g_j.

    Parameters
    ----------
    profile : the shapes g_j, with peaks of 1; a weak one peaks at a power of ten, so that its rounding stays small.
    charges : |l| of each; exp(i l phi) and exp(-i l phi) travel alike.
    numbers : shape (functions, shapes).
    """

    profile: Profile
    charges: tuple[int, ...]
    numbers: Complexes

    @classmethod
    def of(cls, profile: Profile, charges: tuple[int, ...]) -> Shapes:
        """The shapes of some functions with these l, the strongest ones first."""
        rows = profile.flat()
        peaks = abs(rows).max(axis=1)
        shapes: list[Complexes] = []
        orders: list[int] = []
        numbers = np.zeros((len(rows), len(rows)), dtype=complex)
        for i in np.argsort(-peaks, kind="stable"):
            l, row = abs(charges[i]), rows[i]
            for j, (order, shape) in enumerate(zip(orders, shapes, strict=True)):
                number = (shape.conj() * row).sum() / (abs(shape) ** 2).sum() if order == l and shape.any() else 0
                if abs(row - number * shape).max() <= ALIKE * peaks[i]:
                    numbers[i, j] = number
                    break
            else:
                number = _number(row, peaks[i], peaks.max())
                numbers[i, len(shapes)] = number
                shapes.append(row / number)
                orders.append(l)
        values = np.array(shapes).reshape(len(shapes), *profile.values.shape[1:])
        return cls(Profile(profile.edges, values), tuple(orders), numbers[:, : len(shapes)])


def _number(row: Complexes, peak: float, highest: float) -> complex:
    """What to divide by: the value at the peak, less a power of ten by which the row is weaker than the others."""
    if peak == 0:
        return 1.0
    level = 10.0 ** math.ceil(math.log10(peak / highest))
    return complex(row[abs(row).argmax()]) / level


class _Sized(Protocol):
    @property
    def nbytes(self) -> int: ...


Answer = TypeVar("Answer", bound=_Sized)
ROWS = 4  # answers to questions that differ by the shapes alone


def remembered(key: tuple[Hashable, ...], shapes: Shapes, make: Callable[[], Answer]) -> Answer:
    """What is made of shapes that differ from earlier ones by rounding alone is what was made of those.

    Parameters
    ----------
    key : all that the answer depends on beside the shapes.
    """
    key, values = (*key, shapes.charges, shapes.profile.edges.tobytes()), shapes.profile.values
    known: tuple[tuple[Complexes, Answer], ...] = LIGHT.get(key) or ()
    for earlier, answer in known:
        if abs(earlier - values).max() <= ALIKE:
            return answer
    answer = make()
    rows = ((values, answer), *known)[:ROWS]
    LIGHT.put(key, rows, sum(earlier.nbytes + one.nbytes for earlier, one in rows))
    return answer
