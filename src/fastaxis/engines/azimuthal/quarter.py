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
from fastaxis.engines.azimuthal.products import PRODUCT
from fastaxis.engines.azimuthal.shapes import Shapes, remembered
from fastaxis.engines.azimuthal.smooth import NONE, blocks_of, has_core, hides
from fastaxis.engines.azimuthal.table import Table
from fastaxis.engines.azimuthal.waves import Part, Wave, parts_of, pictures, waves_of, weights_of
from fastaxis.light import Raster
from fastaxis.recycled import empty

__all__ = ["centred_images"]

MOST = 16  # pictures of a quarter: as much work as four of all pixels
PLACES = 1 << 14  # nodes at a time: they stay in the cache


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
    if not waves or len(waves) > MOST or hides(table, raster):
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
    # Of a square, what is above the diagonal is what is below, with cosines for sines.
    square = np.array_equal(x, y)
    few = max(PLACES // max(len(x), 1) // (2 if square else 1), 1)
    for start in range(0, len(y), few):
        rows, first = slice(start, start + few), start if square else 0
        out[:, rows, first:] = pictures(table, waves, x[first:] + 1j * y[rows, np.newaxis])
        for picture, wave in zip(out, waves, strict=True) if square else ():
            other, sign = wave.swapped
            picture[start + few :, rows] = sign * out[waves.index(other), rows, start + few :].T
    return out


def _mixed(weights: Reals, waves: Sequence[Wave], means: Reals, shape: tuple[int, int]) -> Reals:
    """The pictures mixed by (4, waves) numbers in each of the quarters; those alike are mixed once."""
    out = empty((4, *shape))
    (_, height, width), (ny, nx) = means.shape, shape
    # On an odd number of pixels the middle ones are of both sides, and the same on either.
    right, left = slice(nx // 2, None), slice(width - 1, None, -1)
    alike: dict[bytes, list[tuple[slice, bool]]] = {}
    for (x, y), side in {(0, 0): right, (1, 0): left, (0, 1): right, (1, 1): left}.items():
        signs = np.array([wave.mirrored[0] ** x * wave.mirrored[1] ** y for wave in waves])
        alike.setdefault((weights * signs).tobytes(), []).append((side, y == 0))
    few = max(PRODUCT // (weights.size * width), 1)
    for start in range(0, height, few):
        stop = min(start + few, height)
        above, below = slice(ny // 2 + start, ny // 2 + stop), slice(height - stop, height - start)
        some = means[:, start:stop].reshape(len(means), -1)
        for numbers, places in alike.items():
            mixed = (np.frombuffer(numbers).reshape(weights.shape) @ some).reshape(4, stop - start, width)
            for side, upper in places:
                out[:, above if upper else below, side] = mixed if upper else mixed[:, ::-1]
    return out
