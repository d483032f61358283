"""Harmonics on pixels: a table along the radius, the turns around, and Stokes parameters."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.engines.azimuthal.products import weighted
from fastaxis.engines.azimuthal.table import Table
from fastaxis.light import Raster

__all__ = ["Orders", "circular_field", "corner", "stokes_at", "stokes_of", "strips"]

Orders = tuple[tuple[int, int], ...]


@dataclass(frozen=True)
class _Side:
    """Places along an axis that are those of the positive side, as they are or mirrored: out[into] = sign * x[of]."""

    sign: int
    into: slice
    of: slice


WHOLE = slice(None)
PLACES = 1 << 15  # at a time: half a megabyte a component


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
        matrix = np.zeros((len(senses) * 2, len(column)), dtype=complex)
        for hand, l, j, number in some:
            for i, sense in enumerate(senses):
                matrix[2 * i + hand, column[j, l * sense]] += number
        sums[parity] = weighted(matrix, waves).reshape(len(senses), 2, *r.shape)
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


def stokes_at(table: Table, orders: Orders, places: Complexes) -> Reals:
    """S0 .. S3 at places x + i y [m], shape (4, places)."""
    dark = np.zeros((2, 1), dtype=complex)
    return stokes_of(sum((both[0] for both in _sums(table, orders, places, (1,)).values()), dark))


def corner(raster: Raster, margin: float = 0.0) -> float:
    """Radius [m] of the corner furthest from the axis, so many pixels beyond the raster."""
    sides = zip(raster.centre, raster.shape[::-1], strict=True)
    return math.hypot(*(abs(c) + (n / 2 + margin) * raster.pitch for c, n in sides))
