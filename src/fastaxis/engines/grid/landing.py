"""Samples as dense as irradiance asks for, where a camera looks and nowhere else."""

from __future__ import annotations

import math
from dataclasses import dataclass

from scipy import fft

from fastaxis.engines.grid.kernel import Block, blocks, reach_for
from fastaxis.engines.grid.waves import Places
from fastaxis.light import Raster

__all__ = ["KEPT", "Line", "landing_length", "lines"]

# Places over the waves of irradiance: more of them make the kernel of a pixel shorter and the transforms longer.
SPARE = 1.45
KEPT = 2048  # samples along a side up to which light is read from its waves: beyond, memory counts for more than time


@dataclass(frozen=True)
class Line:
    """The pixels along one side of a raster, and the places in the window that they collect from.

    Parameters
    ----------
    places : as dense as irradiance asks for, from what the first pixel needs to what the last one does.
    blocks : of pixels.
    """

    places: Places
    blocks: tuple[Block, ...]


def landing_length(order: int, waves: int) -> int:
    """Places across a window that hold irradiance of this highest order; 2, 3 and 5 only divide them, for speed.

    No fewer than there are waves: a transform of fewer places would leave some of them out.

    >>> landing_length(500, waves=500), landing_length(20, waves=500)
    (1458, 500)
    """
    return int(fft.next_fast_len(max(math.ceil(SPARE * 2 * order), waves), real=True))


def lines(raster: Raster, window: float, lengths: tuple[int, int], orders: tuple[int, int]) -> tuple[Line, Line]:
    """Rows and columns of a raster.

    Parameters
    ----------
    window : its side [m]; beyond it is dark.
    lengths : places across the window, for rows and columns.
    orders : highest of irradiance, in cycles a window.
    """
    sides = zip(raster.shape, reversed(raster.centre), lengths, orders, strict=True)
    down, across = (
        _line(pixels, raster.pitch, float(middle), window / length, length, reach_for(length / (2 * order)))
        for pixels, middle, length, order in sides
    )
    return down, across


def _line(pixels: int, pixel: float, middle: float, step: float, length: int, reach: int) -> Line:  # noqa: PLR0917 - six numbers of one line
    half, centre = pixels * pixel / 2 / step, middle / step + (length - 1) / 2
    # One place more at either end for what is rounded.
    first, last = math.floor(centre - half) - reach - 1, math.ceil(centre + half) + reach + 2
    if first < 0 or last > length:
        first, last = 0, length  # near the edge of the window its other end counts too, and pixels beyond are dark
    found = blocks(
        count=last - first, pitch=step, parts=1, reach=reach, pixels=pixels, pixel=pixel,
        middle=(centre - first - (last - first - 1) / 2) * step,
    )  # fmt: skip
    return Line(Places(first, last - first, length), found)
