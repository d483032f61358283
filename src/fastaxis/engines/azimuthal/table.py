"""Radial functions tabled finely, so that a million radii cost a million short polynomials."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Profile, Reals
from fastaxis.engines.azimuthal.products import transformed, weighted

__all__ = ["Table", "table_of"]

POINTS = 8  # a cell: polynomials of degree 7, so halving a cell gains a factor 256
CHEBYSHEV: Reals = np.cos(np.pi * (np.arange(POINTS) + 0.5) / POINTS)
TO_POWERS: Reals = np.asarray(np.linalg.inv(np.vander(CHEBYSHEV, increasing=True)).T, dtype=float)
WORST = -0.049  # in a cell: between its middle points, where a Chebyshev interpolant is worst
FEWEST, FINEST = 8, 256  # cells a panel: its own polynomial has no more than 50 times the phase of a cell
PHASE = 0.36
"""Phase [rad] of the highest frequency that a cell carries: (PHASE/2)^8 / (2^7 8!) is SETTLED (DLMF 3.3.4)."""
SETTLED = 2e-13  # of the peak: twice what the panels themselves are settled to

Counts = NDArray[np.int_]


@dataclass(frozen=True, eq=False)
class Table:
    """Polynomials on equal cells of each panel, and functions that are combinations of them.

    Parameters
    ----------
    edges : borders of the panels [m].
    counts : cells of each panel.
    reach : outermost radius [m].
    powers : coefficients of 1, t, t^2 ... with t in [-1, 1] on each cell, shape (shapes, cells, POINTS).
    numbers : what each function takes of each shape, (functions, shapes); None if the shapes are the functions.
    """

    edges: Reals
    counts: Counts
    reach: float
    powers: Complexes
    numbers: Complexes | None = None

    @property
    def nbytes(self) -> int:
        """Size of the polynomials."""
        return self.powers.nbytes

    def shapes(self, r: Reals) -> Complexes:
        """Shapes at radii [m], shape (shapes, *r.shape); zero inside of the panels and outside ``reach``."""
        density = self.counts / np.diff(self.edges)
        offset = np.cumsum(self.counts) - self.counts - self.edges[:-1] * density
        panel = np.searchsorted(self.edges[1:-1], r, side="right")
        # A place that is rounded across the border of a panel is read from the next one, which begins with its value.
        place = r * density.take(panel) + offset.take(panel)
        cell = np.clip(place.astype(np.intp), 0, self.powers.shape[1] - 1)
        t = (2 * (place - cell) - 1).ravel()
        values = np.stack([_horner(rows.take(cell.ravel(), axis=0), t).reshape(r.shape) for rows in self.powers])
        dark = (r < self.edges[0]) | (r > self.reach)
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


@lru_cache(maxsize=64)
def _on_cells(count: int) -> Reals:
    """From Legendre coefficients on a panel to powers on each of so many equal cells, shape (ORDER, count * POINTS)."""
    nodes = (2 * np.arange(count)[:, np.newaxis] + 1 + CHEBYSHEV) / count - 1
    values = np.polynomial.legendre.legvander(nodes, ORDER - 1)
    return np.ascontiguousarray(np.einsum("cpj,pk->jck", values, TO_POWERS).reshape(ORDER, -1))


@lru_cache(maxsize=64)
def _off_cells(count: int) -> Reals:
    """From Legendre coefficients to what is wrong with these powers where they are worst, shape (ORDER, count)."""
    nodes = (2 * np.arange(count) + 1 + WORST) / count - 1
    read = _on_cells(count).reshape(ORDER, count, POINTS) @ WORST ** np.arange(POINTS)
    return np.asarray(read - np.polynomial.legendre.legvander(nodes, ORDER - 1).T, dtype=float)


def table_of(profile: Profile, reach: float) -> Table:
    """A table of a profile, refined until it agrees with it off its own points."""
    if reach <= profile.start:
        dark = np.zeros((len(profile.values), 1, POINTS), dtype=complex)
        return Table(np.array([0.0, max(reach, 1e-300)]), np.ones(1, dtype=int), reach, dark)
    last = int(np.searchsorted(profile.edges[1:-1], reach)) + 1
    edges, coefficients = profile.edges[: last + 1], profile.coefficients[:, :last]
    needed = np.diff(edges) * profile.frequencies[:last] / PHASE
    counts = (np.ceil(needed / FEWEST) * FEWEST).clip(FEWEST, FINEST).astype(int)
    while True:
        coarse = [_error(coefficients[:, some], count) > SETTLED * profile.peak for some, count in _alike(counts)]
        again = [some for (some, count), more in zip(_alike(counts), coarse, strict=True) if more and count < FINEST]
        if not again:
            break
        for some in again:
            counts[some] *= 2
    powers = [transformed(coefficients[:, some], _on_cells(count)) for some, count in _alike(counts)]
    whole = np.concatenate([rows.reshape(len(coefficients), -1, POINTS) for rows in powers], axis=1)
    return Table(edges, counts, min(reach, profile.end), whole)


def _alike(counts: Counts) -> list[tuple[Counts, int]]:
    """Neighbouring panels with as many cells, which are done together; and how many those are."""
    groups = np.split(np.arange(len(counts)), np.flatnonzero(np.diff(counts)) + 1)
    return [(some, int(counts[some[0]])) for some in groups]


def _error(coefficients: Complexes, count: int) -> float:
    return float(abs(transformed(coefficients, _off_cells(count))).max())
