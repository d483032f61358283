"""Samples as dense as irradiance asks for, where a camera looks and nowhere else."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

from numpy.typing import NDArray

from fastaxis.engines.grid.kernel import Block, blocks
from fastaxis.engines.grid.waves import Places, Waves
from fastaxis.light import Raster

__all__ = ["Landed", "landed"]

# Dense samples over those of the window, at most: beyond, moving the samples of the window by parts of one is as fast
# and holds less at a time.
MOST = 2


@dataclass(frozen=True, eq=False)
class Landed:
    """The field near a camera, and how its pixels collect irradiance from there.

    Parameters
    ----------
    samples : (components, rows, columns).
    rows, columns : blocks of pixels.
    """

    samples: NDArray[Any]
    rows: tuple[Block, ...]
    columns: tuple[Block, ...]


def landed(waves: Waves, pitch: float, raster: Raster, parts: int, reach: int) -> Landed | None:
    """The field where a raster looks; None if that is beyond the window or too much to hold at once.

    Parameters
    ----------
    pitch : of the samples of the window [m].
    parts : samples from one of these to the next.
    reach : half width of the kernel that pixels collect with, in the dense samples.
    """
    step, last = pitch / parts, parts * (waves.count - 1)
    lines = [
        _Line(pixels, raster.pitch / step, middle / step + last / 2, reach)
        for pixels, middle in zip(raster.shape, reversed(raster.centre), strict=True)
    ]
    rows, columns = (line.places for line in lines)
    if any(places.first < 0 or places.first + places.count > last + 1 for places in (rows, columns)):
        return None
    if rows.count * columns.count > MOST * waves.count**2:
        return None
    down, across = (line.blocks(step) for line in lines)
    return Landed(waves.at(rows, columns, parts), down, across)


@dataclass(frozen=True)
class _Line:
    """The pixels along one side of a raster, in dense samples.

    Parameters
    ----------
    pixels, side, middle : number of pixels, their side, the place of their middle counted from the first sample.
    reach : half width of the kernel.
    """

    pixels: int
    side: float
    middle: float
    reach: int

    @property
    def places(self) -> Places:
        """What the pixels collect from, and one place more at either end for what is rounded."""
        half = self.pixels * self.side / 2
        first = math.floor(self.middle - half) - self.reach - 1
        return Places(first, math.ceil(self.middle + half) + self.reach + 2 - first)

    def blocks(self, step: float) -> tuple[Block, ...]:
        """How the pixels collect from these places."""
        count = self.places.count
        return blocks(
            count=count, pitch=step, parts=1, reach=self.reach, pixels=self.pixels, pixel=self.side * step,
            middle=(self.middle - self.places.first - (count - 1) / 2) * step,
        )  # fmt: skip
