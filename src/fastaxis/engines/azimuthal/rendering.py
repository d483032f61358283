"""Harmonics on pixels: a table along the radius, the turns around, Stokes parameters, and the mean over each pixel."""

from __future__ import annotations

import math

import numpy as np

from fastaxis.engines.azimuthal.blocks import blocks_along, collected, lines_across
from fastaxis.engines.azimuthal.panels import Complexes, Profile, Reals
from fastaxis.engines.azimuthal.table import Table
from fastaxis.light import Raster

__all__ = ["Orders", "circular_field", "corner", "smooth_images", "stokes_of"]

Orders = tuple[tuple[int, int], ...]


def _halves(x: Reals) -> tuple[Reals, np.ndarray[tuple[int], np.dtype[np.intp]]]:
    """Distinct |x| and where each x finds its own: a picture about the axis needs a quarter of the radii."""
    if len(x) > 1 and np.array_equal(x, -x[::-1]):
        half = x[len(x) // 2 :]
        place = np.arange(len(x)) - len(x) // 2
        return half, np.where(place < 0, -place - 1 + len(x) % 2, place)
    return x, np.arange(len(x))


def circular_field(table: Table, orders: Orders, x: Reals, y: Reals) -> Complexes:
    """(E_L, E_R) at columns x and rows y [m], relative to the reference front; shape (2, ny, nx)."""
    (xs, column), (ys, row) = _halves(x), _halves(y)
    r = np.hypot(xs, ys[:, np.newaxis])
    values = table(r)
    unit = x + 1j * y[:, np.newaxis]
    unit /= np.where(unit == 0, 1, abs(unit))
    turns = _powers(unit, {l for _, l in orders})
    field = np.zeros((2, len(y), len(x)), dtype=complex)
    for value, (hand, l) in zip(values, orders, strict=True):
        full = value.take(column, axis=1).take(row, axis=0) if value.shape != field.shape[1:] else value
        field[hand] += full if l == 0 else full * turns[l]
    return field


def _powers(unit: Complexes, charges: set[int]) -> dict[int, Complexes]:
    """exp(i l phi) by products, each |l| from the one before."""
    out, power = {}, np.ones_like(unit)
    for l in range(1, max((abs(l) for l in charges), default=0) + 1):
        power = power * unit
        if l in charges:
            out[l] = power
        if -l in charges:
            out[-l] = power.conj()
    return out


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
    """Watts per pixel of S0 .. S3, shape (4, ny, nx); None where pictures are not smooth, as at a hard rim."""

    def images(x: Reals, y: Reals) -> Reals:
        return stokes_of(circular_field(table, orders, x, y))

    x, y = raster.x, raster.y
    peak = float((abs(profile.flat()) ** 2).sum(axis=0).max(initial=0.0))
    columns = blocks_along(lambda places: images(places, lines_across(y)), x, raster.pitch, peak)
    rows = blocks_along(lambda places: images(lines_across(x), places).swapaxes(1, 2), y, raster.pitch, peak)
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
    return out
