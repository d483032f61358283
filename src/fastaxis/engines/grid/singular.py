"""Samples about the singular axis of a plate."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.lattice_sums import factors

__all__ = ["Singular", "Turns"]

Turns: TypeAlias = dict[int, NDArray[np.complex128]]
"""Matrices by m: the components behind a part are sum_m matrix_m exp(i m phi) times those before it."""


ON_AXIS = 1e-6  # pitches: more than rounding of a place, less than any light shows


@dataclass(frozen=True, eq=False)
class Singular:
    """What parts with one singular axis, in one plane, did to the samples about it.

    In that plane point values are right: the light keeps its modulus, and plates in contact undo each other. On its
    way on, samples stand for waves, and point values about the axis for the wrong ones.

    Parameters
    ----------
    centre : (x, y) of the axis [m].
    middle : (column, row) of the sample next to it, which may lie outside the window.
    half : samples of the block on either side of that one.
    offset : of that sample from the axis [pitches].
    before : (components, rows, columns) samples of the block, as far as it lies in the window, before the first part.
    turns : of all the parts together.
    """

    centre: tuple[float, float]
    middle: tuple[int, int]
    half: int
    offset: tuple[float, float]
    before: NDArray[Any]
    turns: Turns

    def then(self, turns: Turns) -> Singular:
        """With another part behind."""
        both: Turns = {}
        for late, after in turns.items():
            for early, matrix in self.turns.items():
                both[late + early] = both.get(late + early, 0) + after @ matrix
        return replace(self, turns=both)

    def places(self, count: int) -> tuple[slice, slice]:
        """(rows, columns) of the block in a plane of so many samples along a side."""
        return self._within(count, (0.0, 0.0))

    def around(self, count: int) -> tuple[slice, slice]:
        """(rows, columns) of the block, and those beside it by which they lie evenly about an axis between samples.

        Mirrored, they are those about the mirrored axis.
        """
        return self._within(count, self.offset)

    def _within(self, count: int, offset: tuple[float, float]) -> tuple[slice, slice]:
        column, row = (
            slice(
                min(max(middle - self.half - (off > ON_AXIS), 0), count),
                min(max(middle + self.half + 1 + (off < -ON_AXIS), 0), count),
            )
            for middle, off in zip(self.middle, offset, strict=True)
        )
        return row, column

    def values(self, count: int) -> NDArray[np.complex128]:
        """(components, rows, columns) samples of the block that stand for the light behind the parts."""
        within = tuple(
            slice(part.start - middle + self.half, part.stop - middle + self.half)
            for part, middle in zip(self.places(count), self.middle[::-1], strict=True)
        )
        total: Any = 0
        for charge, matrix in self.turns.items():
            total = total + self._factors(charge, within) * np.einsum("ij,jyx->iyx", matrix, self.before)
        return np.asarray(total)

    def _factors(self, charge: int, within: tuple[slice, ...]) -> Any:
        if charge == 0:
            return 1.0
        known = factors(abs(charge), *self.offset, self.half)[within]
        return known if charge > 0 else known.conj()
