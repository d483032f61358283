"""Pixels of a picture with edges: each is cut into cells, and a short filter takes values at their middles to means."""

from __future__ import annotations

import math

import numpy as np

from fastaxis.engines.azimuthal.averaging import LONGEST, averaged, taps
from fastaxis.engines.azimuthal.panels import Reals
from fastaxis.engines.azimuthal.rendering import Orders, circular_field, stokes_of, strips
from fastaxis.engines.azimuthal.table import Table
from fastaxis.light import Raster
from fastaxis.light.gauss import gauss_legendre

__all__ = ["cell_images"]

SETTLED = 1e-11
"""Error of the mean over a pixel, as a share of the peak, that chooses filter and cells."""
MOST = 1 << 24  # samples of a picture, however coarse its pixels


def cell_images(table: Table, orders: Orders, raster: Raster) -> Reals:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx)."""
    reach, parts = _cells(table, orders, raster)
    ny, nx = raster.shape
    cells = Raster(raster.pitch / parts, (ny * parts + 2 * reach, nx * parts + 2 * reach), raster.centre)
    samples = np.empty((4, *cells.shape))
    for rows in strips(*cells.shape):
        samples[:, rows] = stokes_of(circular_field(table, orders, cells.x, cells.y[rows]))
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
    nodes, weights = gauss_legendre(2 * LONGEST)
    fine = _line(table, orders, (middles[:, np.newaxis] + nodes * pitch / 2).ravel())
    exact = fine.reshape(4, -1, len(nodes)) @ weights / 2
    wide = np.arange(-2.0 - reach, count + reach, dtype=float) * pitch
    samples = _line(table, orders, wide)
    means = np.stack([np.convolve(line, taps(reach), mode="valid") for line in samples])
    return float(abs(means - exact).max() / max(samples[0].max(), 1e-300))


def _line(table: Table, orders: Orders, x: Reals) -> Reals:
    return stokes_of(circular_field(table, orders, x, np.zeros(1)))[:, 0]
