"""Means over pixels of pictures without edges: polynomials on blocks of pixels, and a core about the axis apart."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace
from functools import partial

import numpy as np

from fastaxis.engines.azimuthal.blocks import SETTLED, Block, Images, blocks_along, collected, lines_across
from fastaxis.engines.azimuthal.core import FREE, core_means, near_axis
from fastaxis.engines.azimuthal.panels import Profile, Reals
from fastaxis.engines.azimuthal.rendering import Orders, circular_field, stokes_at, stokes_of
from fastaxis.engines.azimuthal.table import Table
from fastaxis.light import Raster
from fastaxis.recycled import empty

__all__ = ["NONE", "blocks_of", "has_core", "hides", "smooth_images"]

NONE = slice(0, 0)
CORE = 1 / 64  # of a pixel, where harmonics are asked how they go to the axis
WIDE = 16  # panels a pixel: 48 nodes are three a panel, and a panel that is lit has a lit third
CLOSE = 1e-9  # of half a pixel: a border on the axis is rounded
LEFT_OVER = 1e-11  # of the peak of the field: several roundings of the table


def smooth_images(table: Table, profile: Profile, orders: Orders, raster: Raster) -> Reals | None:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx); None where pictures are not smooth, as at a hard rim.

    Where the light has a core, the pixels about it are none of the polynomials of the rest and are made apart.
    """
    if hides(table, raster):
        return None

    def images(x: Reals, y: Reals) -> Reals:
        return stokes_of(circular_field(table, orders, x, y))

    x, y = raster.x, raster.y
    peak = float((abs(profile.flat()) ** 2).sum(axis=0).max(initial=0.0))
    # Where all charges are one, no irradiance depends on the side of the axis.
    charges = [l for _, l in orders]
    cored = len(set(charges)) > 1 and has_core(table, charges, raster.pitch, math.sqrt(peak))
    down, across = (near_axis(raster) if cored else None) or (NONE, NONE)
    columns = blocks_of(images, (x, y), (across, down), raster.pitch, peak)
    rows = blocks_of(
        lambda places, lines: images(lines, places).swapaxes(1, 2), (y, x), (down, across), raster.pitch, peak
    )
    if columns is None or rows is None:
        return None
    out = empty((4, *raster.shape))
    # Half a turn changes no irradiance if it changes all harmonics alike.
    half = len(y) // 2
    if raster.centre != (0.0, 0.0) or len({l % 2 for _, l in orders}) > 1 or len(y) % 2:
        collected(images, rows, columns, raster.pitch**2, out)
    else:
        collected(images, [b for b in rows if b.pixels.start >= half], columns, raster.pitch**2, out)
        out[:, :half] = out[:, : half - 1 : -1, ::-1]
    if across != NONE:
        means = core_means(lambda r: stokes_at(table, orders, r), x[across], y[down], raster.pitch, SETTLED * peak)
        if means is None:
            return None
        out[:, down, across] = means * raster.pitch**2
    return out


def hides(table: Table, raster: Raster) -> bool:
    """Whether pixels are so wide that the nodes a block is looked at with may miss all the light on a panel.

    Nodes are close together at the borders of pixels, so that an axis in between hides nothing.
    """
    inside = any(abs(places).min() < raster.pitch / 2 * (1 - CLOSE) for places in (raster.x, raster.y))
    return bool(inside and raster.pitch > WIDE * np.diff(table.edges).min())


def has_core(table: Table, charges: Sequence[int], pitch: float, peak: float) -> bool:
    """Whether a function with a charge l goes to the axis otherwise than as r^|l|, as directly behind a q-plate.

    Travel makes every harmonic go as r^|l| (a + b r^2 ...). Of its values at three small fractions of a pixel a sum is
    taken in which both of these terms cancel.

    Parameters
    ----------
    charges : l of each function of the table.
    peak : of the functions.
    """
    order = np.abs(np.array(charges))
    whole, half, quarter = table(np.array([1.0, 0.5, 0.25]) * (CORE * pitch)).T
    left = whole / 4.0**order - 5 * half / 2.0**order + 4 * quarter
    return bool((abs(left)[order > 0] > LEFT_OVER * peak).any())


def blocks_of(
    look: Images, sides: tuple[Reals, Reals], near: tuple[slice, slice], pitch: float, peak: float
) -> list[Block] | None:
    """Blocks along one side; pixels near a core, on this and the other side, are looked at far from it on the other."""
    (places, others), (here, there) = sides, near
    all_over, far = lines_across(others, pitch), np.delete(others, there)
    beside = lines_across(far, pitch) if len(far) else far
    beside = beside[abs(beside) > FREE * pitch]
    found: list[Block] = []
    for first, last, lines in ((0, here.start, all_over), (here.start, here.stop, beside), (here.stop, None, all_over)):
        some = places[first:last]
        if not len(some):
            continue
        blocks = blocks_along(partial(_along, look, lines), some, pitch, peak)
        if blocks is None:
            return None
        found += [replace(b, pixels=slice(b.pixels.start + first, b.pixels.stop + first)) for b in blocks]
    return found


def _along(look: Images, lines: Reals, places: Reals) -> Reals:
    """Pictures on lines; without any line nothing has to be seen."""
    return look(places, lines) if len(lines) else np.zeros((1, len(places)))
