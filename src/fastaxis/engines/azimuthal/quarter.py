"""A camera centred on the axis: its pixels are those of one quarter, mirrored, whatever the harmonics are.

The pictures that an irradiance is mixed from stay themselves, but for a sign, where x or y changes its sign. So they
are made on a quarter of the pixels, and kept: turning a plate only mixes them anew.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from functools import partial

import numpy as np

from fastaxis.engines.azimuthal.blocks import SETTLED, collected
from fastaxis.engines.azimuthal.core import core_means, near_places
from fastaxis.engines.azimuthal.panels import Reals
from fastaxis.engines.azimuthal.smooth import NONE, blocks_of, has_core
from fastaxis.engines.azimuthal.shapes import Shapes, remembered
from fastaxis.engines.azimuthal.table import Table
from fastaxis.engines.azimuthal.waves import Part, Wave, parts_of, pictures, waves_of, weights_of
from fastaxis.light import Raster

__all__ = ["centred_images"]

MOST = 16  # pictures of a quarter: as much work as four of all pixels
PLACES = 1 << 13  # nodes or pixels at a time: they stay in the cache


@dataclass(frozen=True, eq=False)
class _Quarter:
    """Means over the pixels with x, y >= 0, shape (waves, rows, columns); None if they are not smooth."""

    means: Reals | None

    @property
    def nbytes(self) -> int:
        return 0 if self.means is None else self.means.nbytes


def centred_images(table: Table, shapes: Shapes, orders: Sequence[tuple[int, int]], raster: Raster) -> Reals | None:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx).

    None where a quarter does not do: many harmonics, or pictures that are not smooth, as at a hard rim.

    Parameters
    ----------
    table : the harmonics, out to the corners.
    shapes : what the table is of.
    orders : (hand, l) of each function.
    raster : pixels, centred on the axis.
    """
    parts = parts_of(table, orders)
    waves = waves_of(parts)
    if not waves or len(waves) > MOST:
        return None
    key = ("quarter", raster.pitch, raster.shape, waves)
    quarter = remembered(key, shapes, lambda: _Quarter(_means(table, parts, waves, raster)))
    if quarter.means is None:
        return None
    return _mixed(weights_of(parts, waves) * raster.pitch**2, waves, quarter.means, raster.shape)


def _means(table: Table, parts: Sequence[Part], waves: tuple[Wave, ...], raster: Raster) -> Reals | None:
    look = partial(_on_lines, table, waves)
    (ny, nx), pitch = raster.shape, raster.pitch
    x, y = raster.x[nx // 2 :], raster.y[ny // 2 :]
    near = _near(table, parts, x, y, pitch)
    columns = blocks_of(look, (x, y), near[::-1], pitch, 1.0)
    rows = columns
    if nx != ny and columns is not None:
        rows = blocks_of(lambda places, lines: look(lines, places).swapaxes(1, 2), (y, x), near, pitch, 1.0)
    if columns is None or rows is None:
        return None
    out = np.empty((len(waves), len(y), len(x)))
    collected(look, rows, columns, 1.0, out)
    if near[0] != NONE:
        down, across = near
        means = core_means(partial(pictures, table, waves), x[across], y[down], pitch, SETTLED)
        if means is None:
            return None
        out[:, down, across] = means
    return out


def _near(table: Table, parts: Sequence[Part], x: Reals, y: Reals, pitch: float) -> tuple[slice, slice]:
    """Rows and columns of pixels about the axis, if the light has a core there that depends on the side of it."""
    charges = {part.shape: part.l for part in parts}
    shapes = replace(table, numbers=np.eye(len(table.powers), dtype=complex)[list(charges)])
    if len({part.l for part in parts}) < 2 or not has_core(shapes, tuple(charges.values()), pitch, 1.0):
        return NONE, NONE
    return near_places(y, pitch) or NONE, near_places(x, pitch) or NONE


def _on_lines(table: Table, waves: Sequence[Wave], x: Reals, y: Reals) -> Reals:
    """Pictures at columns x and rows y [m], a few rows at a time, shape (waves, len(y), len(x))."""
    out = np.empty((len(waves), len(y), len(x)))
    few = max(PLACES // max(len(x), 1), 1)
    for start in range(0, len(y), few):
        rows = slice(start, start + few)
        out[:, rows] = pictures(table, waves, x + 1j * y[rows, np.newaxis])
    return out


def _mixed(weights: Reals, waves: Sequence[Wave], means: Reals, shape: tuple[int, int]) -> Reals:
    """The pictures mixed by (4, waves) numbers in each of the quarters."""
    out = np.empty((4, *shape))
    (ny, nx), (_, height, width) = shape, means.shape
    signs = np.array([wave.mirrored for wave in waves]).T
    # On an odd number of pixels the middle ones belong to both sides, to either of which they are the same.
    right, left = slice(nx // 2, None), slice(width - 1, None, -1)
    few = max(PLACES // width, 1)
    for start in range(0, height, few):
        some = means[:, start : start + few]
        up, down = ny // 2 + start, height - 1 - start
        above, below = slice(up, up + some.shape[1]), _backwards(down, some.shape[1])
        mirrors = {(1, 1): (above, right), (-1, 1): (above, left), (1, -1): (below, right), (-1, -1): (below, left)}
        for (x, y), places in mirrors.items():
            turned = weights * (signs[0] if x < 0 else 1) * (signs[1] if y < 0 else 1)
            out[:, *places] = (turned @ some.reshape(len(some), -1)).reshape(4, -1, width)
    return out


def _backwards(last: int, count: int) -> slice:
    return slice(last, last - count if count <= last else None, -1)
