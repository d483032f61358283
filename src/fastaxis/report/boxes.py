"""Rectangles on the drawing, and what lies on what."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

__all__ = ["Box", "clear_of", "covering", "line_boxes"]

Point = tuple[float, float]


@dataclass(frozen=True)
class Box:
    """A rectangle, in steps of the drawing."""

    left: float
    bottom: float
    right: float
    top: float

    @classmethod
    def about(cls, x: float, y: float, width: float, height: float) -> Box:
        """The rectangle of this size with its middle at (x, y)."""
        return cls(x - width / 2, y - height / 2, x + width / 2, y + height / 2)

    @property
    def middle(self) -> Point:
        return (self.left + self.right) / 2, (self.bottom + self.top) / 2

    @property
    def sides(self) -> tuple[float, float, float, float]:
        return self.left, self.bottom, self.right, self.top


def covering(boxes: Iterable[Box]) -> Box:
    """The smallest rectangle around all."""
    left, bottom, right, top = zip(*(box.sides for box in boxes), strict=True)
    return Box(min(left), min(bottom), max(right), max(top))


def line_boxes(points: Sequence[Point], width: float) -> list[Box]:
    """One box of this width for each piece of a line whose pieces run level or upright."""
    found = []
    for (x, y), (u, v) in pairwise(points):
        found.append(Box(min(x, u) - width / 2, min(y, v) - width / 2, max(x, u) + width / 2, max(y, v) + width / 2))
    return found


def clear_of(candidates: NDArray[np.float64], taken: NDArray[np.float64]) -> NDArray[np.bool_]:
    """Which of the candidates (n, 4) share nothing with any of the boxes (m, 4)."""
    if not len(taken):
        return np.ones(len(candidates), dtype=bool)
    a, b = candidates[:, None, :], taken[None, :, :]
    apart = (a[..., 0] >= b[..., 2]) | (a[..., 2] <= b[..., 0]) | (a[..., 1] >= b[..., 3]) | (a[..., 3] <= b[..., 1])
    return np.asarray(apart.all(axis=1))
