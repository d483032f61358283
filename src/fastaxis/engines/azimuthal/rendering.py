"""Harmonics on pixels: a table along the radius, the turns around, Stokes parameters, and the mean over each pixel."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import partial

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.blocks import SETTLED, Block, Images, blocks_along, collected, lines_across
from fastaxis.engines.azimuthal.core import FREE, core_means, near_axis
from fastaxis.engines.azimuthal.panels import Complexes, Profile, Reals
from fastaxis.engines.azimuthal.table import Table
from fastaxis.light import Raster

__all__ = ["Orders", "circular_field", "corner", "smooth_images", "stokes_of", "strips"]

Orders = tuple[tuple[int, int], ...]


@dataclass(frozen=True)
class _Side:
    """Places along an axis that are those of the positive side, as they are or mirrored: out[into] = sign * x[of]."""

    sign: int
    into: slice
    of: slice


WHOLE = slice(None)
PLACES = 1 << 15  # at a time: half a megabyte a component
NONE = slice(0, 0)
CORE = 1 / 64  # of a pixel, where harmonics are asked how they go to the axis
LEFT_OVER = 1e-11  # of the peak of the field: what pixels of a hundredth of the beam leave of a harmonic without a core


def _sides(x: Reals) -> tuple[Reals, list[_Side]]:
    """Distinct |x| and who has them: a picture about the axis needs a quarter of the radii."""
    half, odd = divmod(len(x), 2)
    if not half or not np.array_equal(x, -x[::-1]):
        return x, [_Side(1, WHOLE, WHOLE)]
    return x[half:], [_Side(1, slice(half, None), WHOLE), _Side(-1, slice(half - 1, None, -1), slice(odd, None))]


def circular_field(table: Table, orders: Orders, x: Reals, y: Reals) -> Complexes:
    """(E_L, E_R) at columns x and rows y [m], relative to the reference front; shape (2, ny, nx).

    Where x changes its sign exp(i l phi) becomes (-1)^l exp(-i l phi), and exp(-i l phi) where y does: two sums, one
    with each sense of phi, and one more of each for odd l, make all four quarters.
    """
    (xs, across), (ys, down) = _sides(x), _sides(y)
    senses = (1,) if len(across) == len(down) == 1 else (1, -1)
    sums = _sums(table, orders, xs + 1j * ys[:, np.newaxis], senses)
    out = (np.empty if sums else np.zeros)((2, len(y), len(x)), dtype=complex)
    for column in across:
        for row in down:
            place, quarter = out[:, row.into, column.into], (WHOLE, row.of, column.of)
            for count, (parity, fields) in enumerate(sums.items()):
                field, sign = fields[senses.index(column.sign * row.sign)][quarter], column.sign**parity
                np.add(place, sign * field, out=place) if count else np.multiply(sign, field, out=place)
    return out


def _sums(table: Table, orders: Orders, places: Complexes, senses: tuple[int, ...]) -> dict[int, Complexes]:
    """For each parity of l: (E_L, E_R) of these harmonics at places x + i y, phi counted in each sense.

    Shapes times turns are made once, and one matrix product adds them up, shape (senses, 2, ny, nx).
    """
    r: Reals = np.abs(places)
    shapes, turns = table.shapes(r), _turns(places / np.where(r == 0, 1, r), {l * s for _, l in orders for s in senses})
    parts = [
        (hand, l, j, row[j]) for (hand, l), row in zip(orders, table.parts(), strict=True) for j in row.nonzero()[0]
    ]
    sums = {}
    for parity in sorted({l % 2 for _, l, _, _ in parts}):
        some = [part for part in parts if part[1] % 2 == parity]
        column = {key: i for i, key in enumerate(sorted({(j, l * s) for _, l, j, _ in some for s in senses}))}
        waves = np.stack([shapes[j] * turns[l] if l else shapes[j] for j, l in column])
        matrix = np.zeros((len(senses), 2, len(column)), dtype=complex)
        for hand, l, j, number in some:
            for i, sense in enumerate(senses):
                matrix[i, hand, column[j, l * sense]] += number
        sums[parity] = np.tensordot(matrix, waves, axes=1)
    return sums


def _turns(unit: Complexes, charges: set[int]) -> dict[int, Complexes]:
    """exp(i l phi) by products, each |l| from the one before."""
    out, power = {}, np.ones_like(unit)
    for l in range(1, max((abs(l) for l in charges), default=0) + 1):
        power = power * unit
        if l in charges:
            out[l] = power
        if -l in charges:
            out[-l] = power.conj()
    return out


def strips(rows: int, columns: int) -> list[NDArray[np.intp]]:
    """Rows to be done at a time, so few that they stay in the cache; with each its mirror image, which shares radii."""
    order = np.arange(rows)
    pairs = max(1, PLACES // (2 * columns))
    upper = [order[i : min(i + pairs, rows // 2)] for i in range(0, rows // 2, pairs)]
    strips = [np.concatenate([some, rows - 1 - some[::-1]]) for some in upper]
    return [*strips, order[rows // 2 : rows // 2 + 1]] if rows % 2 else strips


def stokes_of(circular: Complexes) -> Reals:
    """S0 .. S3 from (E_L, E_R): S1 + i S2 = 2 E_L* E_R and S3 = I_R - I_L."""
    left, right = circular
    i_left, i_right = (part.real**2 + part.imag**2 for part in circular)
    cross = left.conj() * right
    return np.stack([i_left + i_right, 2 * cross.real, 2 * cross.imag, i_right - i_left])


def corner(raster: Raster, margin: float = 0.0) -> float:
    """Radius [m] of the corner furthest from the axis, so many pixels beyond the raster."""
    sides = zip(raster.centre, raster.shape[::-1], strict=True)
    return math.hypot(*(abs(c) + (n / 2 + margin) * raster.pitch for c, n in sides))


def smooth_images(table: Table, profile: Profile, orders: Orders, raster: Raster) -> Reals | None:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx); None where pictures are not smooth, as at a hard rim.

    Where the light has a core, the pixels about it are none of the polynomials of the rest and are made apart.
    """

    def images(x: Reals, y: Reals) -> Reals:
        return stokes_of(circular_field(table, orders, x, y))

    x, y = raster.x, raster.y
    peak = float((abs(profile.flat()) ** 2).sum(axis=0).max(initial=0.0))
    down, across = (near_axis(raster) if _has_core(table, orders, raster.pitch, peak) else None) or (NONE, NONE)
    columns = _blocks(images, (x, y), (across, down), raster.pitch, peak)
    rows = _blocks(
        lambda places, lines: images(lines, places).swapaxes(1, 2), (y, x), (down, across), raster.pitch, peak
    )
    if columns is None or rows is None:
        return None
    out = np.empty((4, *raster.shape))
    # Half a turn changes no irradiance if it changes all harmonics alike.
    half = len(y) // 2
    if raster.centre != (0.0, 0.0) or len({l % 2 for _, l in orders}) > 1 or len(y) % 2:
        collected(images, rows, columns, raster.pitch**2, out)
    else:
        collected(images, [b for b in rows if b.pixels.start >= half], columns, raster.pitch**2, out)
        out[:, :half] = out[:, : half - 1 : -1, ::-1]
    if across != NONE:
        means = core_means(lambda r: _stokes_at(table, orders, r), x[across], y[down], raster.pitch, SETTLED * peak)
        if means is None:
            return None
        out[:, down, across] = means * raster.pitch**2
    return out


def _stokes_at(table: Table, orders: Orders, places: Complexes) -> Reals:
    """S0 .. S3 at places x + i y [m], shape (4, places)."""
    dark = np.zeros((2, 1), dtype=complex)
    return stokes_of(sum((both[0] for both in _sums(table, orders, places, (1,)).values()), dark))


def _has_core(table: Table, orders: Orders, pitch: float, peak: float) -> bool:
    """Whether a harmonic with a charge l goes to the axis otherwise than as r^|l|, as directly behind a q-plate.

    Travel makes every harmonic go like that; what is left of it at a small fraction of a pixel is of third order. Where
    all charges are one, no irradiance depends on the side of the axis.
    """
    charges = np.array([abs(l) for _, l in orders])
    if len({l for _, l in orders}) < 2:
        return False
    whole, half = table(np.array([1.0, 0.5]) * (CORE * pitch)).T
    jump = abs(whole / 2.0**charges - half)[charges > 0]
    return bool((jump > LEFT_OVER * math.sqrt(peak)).any())


def _blocks(
    look: Images, sides: tuple[Reals, Reals], near: tuple[slice, slice], pitch: float, peak: float
) -> list[Block] | None:
    """Blocks along one side; pixels near a core, on this and the other side, are looked at far from it on the other."""
    (places, others), (here, there) = sides, near
    all_over, far = lines_across(others), np.delete(others, there)
    beside = lines_across(far) if len(far) else far
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
