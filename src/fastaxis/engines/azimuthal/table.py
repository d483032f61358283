"""Radial functions tabled finely, so that a million radii cost a million short polynomials."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

import numpy as np

from fastaxis.engines.azimuthal.panels import Complexes, Profile, Reals
from fastaxis.engines.azimuthal.products import transformed, weighted

__all__ = ["Table", "table_of"]

POINTS = 8  # a cell: polynomials of degree 7, so halving a cell gains a factor 256
CHEBYSHEV: Reals = np.cos(np.pi * (np.arange(POINTS) + 0.5) / POINTS)
TO_POWERS: Reals = np.asarray(np.linalg.inv(np.vander(CHEBYSHEV, increasing=True)).T, dtype=float)
FINEST = 1 << 15
PHASE = 0.36
"""Phase [rad] of the highest frequency that a cell carries: (PHASE/2)^8 / (2^7 8!) is SETTLED (DLMF 3.3.4)."""
SETTLED = 2e-13  # of the peak: twice what the panels themselves are settled to


@dataclass(frozen=True, eq=False)
class Table:
    """Polynomials on equal cells from ``start`` to ``reach``, and functions that are combinations of them.

    Parameters
    ----------
    start : innermost radius [m].
    reach : outermost radius [m].
    powers : coefficients of 1, t, t^2 ... with t in [-1, 1] on each cell, shape (shapes, cells, POINTS).
    numbers : what each function takes of each shape, (functions, shapes); None if the shapes are the functions.
    """

    start: float
    reach: float
    powers: Complexes
    numbers: Complexes | None = None

    @property
    def nbytes(self) -> int:
        """Size of the polynomials."""
        return self.powers.nbytes

    def shapes(self, r: Reals) -> Complexes:
        """Shapes at radii [m], shape (shapes, *r.shape); zero inside ``start`` and outside ``reach``."""
        cells = self.powers.shape[1]
        place = (r - self.start) * (cells / (self.reach - self.start))
        cell = np.clip(place.astype(np.intp), 0, cells - 1)
        t = (2 * (place - cell) - 1).ravel()
        values = np.stack([_horner(rows.take(cell.ravel(), axis=0), t).reshape(r.shape) for rows in self.powers])
        dark = (r < self.start) | (r > self.reach)
        if dark.any():
            values[:, dark] = 0
        return values

    def __call__(self, r: Reals) -> Complexes:
        """Functions at radii [m], shape (functions, *r.shape)."""
        shapes = self.shapes(r)
        return shapes if self.numbers is None else weighted(self.numbers, shapes)

    def combined(self, matrix: Complexes) -> Table:
        """Linear combinations: row i of the matrix gives new function i."""
        return replace(self, numbers=matrix if self.numbers is None else matrix @ self.numbers)

    def parts(self) -> Complexes:
        """What each function takes of each shape, (functions, shapes)."""
        return np.eye(len(self.powers), dtype=complex) if self.numbers is None else self.numbers


def _horner(rows: Complexes, t: Reals) -> Complexes:
    total = rows[:, -1] * t
    for j in range(POINTS - 2, 0, -1):
        total += rows[:, j]
        total *= t
    total += rows[:, 0]
    return np.asarray(total)


def _at(profile: Profile, start: float, reach: float, cells: int) -> Table:
    r = start + (np.arange(cells)[:, np.newaxis] + (1 + CHEBYSHEV) / 2) * ((reach - start) / cells)
    values = profile(r.ravel()).reshape(-1, cells, POINTS)
    return Table(start, reach, transformed(values, TO_POWERS))


def table_of(profile: Profile, reach: float) -> Table:
    """A table of a profile, refined until it agrees with it off its own points."""
    if reach <= profile.start:
        return Table(0.0, reach, np.zeros((len(profile.values), 1, POINTS), dtype=complex))
    start, reach = profile.start, min(reach, profile.end)
    cells = min(max(16, math.ceil((reach - start) * profile.highest_frequency / PHASE)), FINEST)
    while True:
        table = _at(profile, start, reach, cells)
        # The places where a Chebyshev interpolant is worst, a third of the way off its points.
        r = start + (np.arange(cells, dtype=float) + 0.4755) * ((reach - start) / cells)
        if cells >= FINEST or abs(table(r) - profile(r)).max() <= SETTLED * profile.peak:
            return table
        cells *= 2
