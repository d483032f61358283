"""Errors of several parameters as numbers between -1 and 1."""

from __future__ import annotations

from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

__all__ = ["Box"]

Reals: TypeAlias = NDArray[np.float64]
FLAT = 1e-9  # of the largest error: parameters that move together to a rounding


class Box:
    """The smallest box that all draws lie in; parameters that move together have one number.

    Parameters
    ----------
    offsets : (draws, parameters), at least one of them not zero.

    Examples
    --------
    >>> box = Box(np.array([[2.0, 4.0], [-1.0, -2.0]]))
    >>> box.numbers, box.offsets(box.places(np.array([[1.0, 2.0]]))[0]).round(12).tolist()
    (1, [1.0, 2.0])
    """

    def __init__(self, offsets: Reals) -> None:
        largest = np.abs(offsets).max(axis=0)
        self._scale = np.where(largest > 0, largest, 1.0)
        _, sizes, axes = np.linalg.svd(offsets / self._scale, full_matrices=False)
        kept = sizes > FLAT * max(float(sizes.max(initial=0.0)), 1e-300)
        # Parameters that move for themselves keep their own numbers: mixed ones would need more points.
        free = int(kept.sum()) == offsets.shape[1]
        self._axes = np.eye(offsets.shape[1]) if free else axes[kept]
        along = (offsets / self._scale) @ self._axes.T
        self._reach = np.abs(along).max(axis=0)

    @property
    def numbers(self) -> int:
        """How many."""
        return len(self._axes)

    def places(self, offsets: Reals) -> Reals:
        """(draws, numbers) of offsets (draws, parameters)."""
        return np.asarray((offsets / self._scale) @ self._axes.T / self._reach)

    def offsets(self, place: Reals) -> Reals:
        """Offsets of the parameters at one place."""
        return np.asarray((place * self._reach) @ self._axes * self._scale)
