"""Harmonics on pixels: a table along the radius, the turns around, Stokes parameters, and the mean over each pixel."""

from __future__ import annotations

import math

import numpy as np

from fastaxis.engines.azimuthal.averaging import LONGEST, averaged, taps
from fastaxis.engines.azimuthal.panels import Complexes, Profile, Reals
from fastaxis.engines.azimuthal.table import Table, table_of
from fastaxis.light import Raster

__all__ = ["circular_field", "corner", "stokes_images", "stokes_of"]

Orders = tuple[tuple[int, int], ...]

SETTLED = 1e-11
"""Error of the mean over a pixel, as a share of the peak, that chooses filter and cells."""
MOST = 1 << 24  # samples of a picture, however coarse its pixels


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


def corner(raster: Raster) -> float:
    """Radius [m] of the corner furthest from the axis, the margin for the filter included."""
    sides = zip(raster.centre, raster.shape[::-1], strict=True)
    return math.hypot(*(abs(c) + (n / 2 + LONGEST) * raster.pitch for c, n in sides))


def stokes_images(profile: Profile, orders: Orders, raster: Raster) -> Reals:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx)."""
    table = table_of(profile, corner(raster))
    reach, parts = _cells(table, orders, raster)
    ny, nx = raster.shape
    cells = Raster(raster.pitch / parts, (ny * parts + 2 * reach, nx * parts + 2 * reach), raster.centre)
    samples = stokes_of(circular_field(table, orders, cells.x, cells.y))
    return averaged(samples, reach, parts) * raster.pitch**2


def _cells(table: Table, orders: Orders, raster: Raster) -> tuple[int, int]:
    """(filter reach, cells a pixel and axis), the cheapest that gives the mean along a line through the axis."""
    most = max(1, math.isqrt(MOST // (raster.shape[0] * raster.shape[1])))
    parts = 1
    while True:
        for reach in (0, 1, 2, 3, 4, 6):
            if _line_error(table, orders, raster.pitch / parts, reach) <= SETTLED:
                return reach, parts
        if 2 * parts > most:
            return reach, parts
        parts *= 2


def _line_error(table: Table, orders: Orders, pitch: float, reach: int) -> float:
    """Worst error of the filtered mean on cells along x, as a share of the peak irradiance."""
    count = min(int(table.reach / pitch) + 1, 256)
    middles = np.arange(-2.0, count, dtype=float) * pitch
    nodes, weights = np.polynomial.legendre.leggauss(2 * LONGEST)
    fine = _line(table, orders, (middles[:, np.newaxis] + nodes * pitch / 2).ravel())
    exact = fine.reshape(4, -1, len(nodes)) @ weights / 2
    wide = np.arange(-2.0 - reach, count + reach, dtype=float) * pitch
    samples = _line(table, orders, wide)
    means = np.stack([np.convolve(line, taps(reach), mode="valid") for line in samples])
    return float(abs(means - exact).max() / max(samples[0].max(), 1e-300))


def _line(table: Table, orders: Orders, x: Reals) -> Reals:
    return stokes_of(circular_field(table, orders, x, np.zeros(1)))[:, 0]
