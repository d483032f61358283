"""Pictures of joined light that are polynomials on blocks of pixels."""

from __future__ import annotations

import math
from collections.abc import Sequence
from importlib import import_module
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.joined.sight import Sight
from fastaxis.light import Raster
from fastaxis.plan.spread import Spread

__all__ = ["blockwise"]

Reals = NDArray[np.float64]

FIELD = 5e-13  # of its peak that the field of an arm is right to, twice what its table is settled to
AT_ONCE = 1 << 22  # nodes: 128 MB of four pictures
EVERYWHERE = 24  # lines
BESIDE = 0.02  # of a pixel: how close the axis is passed, where directly behind a plate there may be a jump of phase


def blockwise(seen: Sight, raster: Raster, spreads: Sequence[Spread], *, anywhere: bool = False) -> Reals | None:
    """What each pixel collects, shape (images, ny, nx); None where even one pixel is no polynomial of a few degrees.

    How many nodes each block needs is tried on lines: from the axis to the corner, about which the light with
    singularities and rims lies, and through each beam, which may be a narrow one beside the axis.

    Parameters
    ----------
    seen : the light, out to the corners of the raster.
    raster : the camera.
    spreads : of the beams that meet.
    anywhere : whether there may be detail off these lines, as behind a mask; then lines all over the camera are tried.
    """
    blocks: Any = import_module("fastaxis.engines.azimuthal.blocks")
    images, x, y = seen.images, raster.x, raster.y
    every = np.linspace(0, 1, EVERYWHERE if anywhere else 0)
    few_x, few_y = (
        _lines([*blocks.lines_across(p), *(p[0] + every * (p[-1] - p[0]))], spreads, side, raster)
        for side, p in enumerate((x, y))
    )
    bright = images(x, few_y)
    peak = _peak(float(bright[0].max()), float(seen.apart(x, few_y).max()), blocks.SETTLED)
    columns = blocks.blocks_along(lambda places: _both(images(places, few_y), places), x, raster.pitch, peak)
    if columns is None:
        return None
    rows = blocks.blocks_along(
        lambda places: _both(images(few_x, places).swapaxes(1, 2), places), y, raster.pitch, peak
    )
    if rows is None:
        return None
    out, half = np.empty((len(bright), *raster.shape)), len(y) // 2
    turned = seen.even and raster.centre == (0.0, 0.0) and len(y) % 2 == 0
    for some in _groups([b for b in rows if not turned or b.pixels.start >= half], columns):
        blocks.collected(images, some, columns, raster.pitch**2, out)
    if turned:
        out[:, :half] = out[:, : half - 1 : -1, ::-1]
    return out


def _groups(rows: list[Any], columns: list[Any]) -> list[list[Any]]:
    """Blocks of rows to be read at a time: all, unless fringes are so fine that their nodes would fill the memory."""
    across = sum(len(block.nodes) for block in columns)
    ends = np.cumsum([len(block.nodes) * across for block in rows]) // AT_ONCE
    return [[block for block, end in zip(rows, ends, strict=True) if end == group] for group in np.unique(ends)]


def _peak(bright: float, apart: float, settled: float) -> float:
    """Irradiance that errors are shares of, where arms of irradiance ``apart`` leave little or nothing by interference.

    Fields e off by a share d of E leave |e|^2 off by 2 d |E e| + d^2 |E|^2, which is no polynomial.
    """
    return max(bright, (2 * FIELD * math.sqrt(bright * apart) + FIELD**2 * apart) / settled)


def _both(lines: Reals, places: Reals) -> Reals:
    """Lines and their mirror images, where places have them: nodes symmetric about the axis share their radii."""
    return np.stack([lines, lines[..., ::-1]]) if np.array_equal(places, -places[::-1]) else lines


def _lines(across: Sequence[float], spreads: Sequence[Spread], side: int, raster: Raster) -> Reals:
    """Lines to be tried, those through the middle and the flanks of each beam and past the axis among them."""
    beams = [spread.offset[side] + flank * spread.size for spread in spreads for flank in (-1, 0, 1)]
    low, high = ((raster.y if side else raster.x)[[0, -1]] + np.array([-0.5, 0.5]) * raster.pitch).tolist()
    inside = [place for place in (*beams, BESIDE * raster.pitch) if low <= place <= high]
    return np.unique([*across, *inside])
