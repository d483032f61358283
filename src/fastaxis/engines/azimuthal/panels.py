"""Functions of the radius as Legendre polynomials on panels: quadrature, interpolation and refinement in one."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property, lru_cache
from itertools import pairwise
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.products import multiplied, transformed, weighted
from fastaxis.light.gauss import gauss_legendre

__all__ = ["ORDER", "Complexes", "Profile", "Reals", "sampled"]

Reals: TypeAlias = NDArray[np.float64]
Complexes: TypeAlias = NDArray[np.complex128]

ORDER = 32
"""Nodes a panel. High orders need fewer nodes a fringe: 32 carry 2.5 fringes to the last digit."""

NODES, WEIGHTS = gauss_legendre(ORDER)
_VANDER = np.polynomial.legendre.legvander(NODES, ORDER - 1)
# c_j = (2j+1)/2 sum_i w_i P_j(x_i) f(x_i): exact for polynomials of the panel, the rule being exact to 2 ORDER - 1.
_TO_COEFFICIENTS = (_VANDER * WEIGHTS[:, np.newaxis] * (np.arange(ORDER) + 0.5)).T

CHUNK = 1 << 12  # places at a time: a megabyte of polynomials stays in the cache


@lru_cache(maxsize=64)
def _split(count: int) -> tuple[Reals, Reals, Reals]:
    """Nodes and weights on ``count`` equal parts of [-1, 1], and the matrix from coefficients to values there."""
    middles = (2 * np.arange(count) + 1) / count - 1
    nodes = (middles[:, np.newaxis] + NODES / count).ravel()
    matrix = np.asarray(np.polynomial.legendre.legvander(nodes, ORDER - 1), dtype=float)
    return nodes, np.tile(WEIGHTS / count, count), matrix


@dataclass(frozen=True, eq=False)
class Profile:
    """Several complex functions of the radius on common panels.

    Parameters
    ----------
    edges : panel borders [m], ascending, shape (panels + 1,). Outside of them every function is zero.
    values : at the Gauss-Legendre nodes of the panels, shape (functions, panels, ORDER).
    """

    edges: Reals
    values: Complexes

    @cached_property
    def coefficients(self) -> Complexes:
        """Legendre coefficients, shape (functions, panels, ORDER)."""
        return transformed(self.values, _TO_COEFFICIENTS.T)

    @property
    def start(self) -> float:
        return float(self.edges[0])

    @property
    def end(self) -> float:
        return float(self.edges[-1])

    @cached_property
    def nodes(self) -> Reals:
        """All nodes [m], ascending, shape (panels * ORDER,)."""
        return nodes_on(self.edges)

    @cached_property
    def weights(self) -> Reals:
        """Weights of the integral over dr [m]."""
        return np.asarray((np.diff(self.edges)[:, np.newaxis] / 2 * WEIGHTS).ravel())

    @cached_property
    def peak(self) -> float:
        """Largest modulus among the nodes."""
        return float(abs(self.values).max(initial=0.0))

    def flat(self) -> Complexes:
        """Values at :attr:`nodes`, shape (functions, nodes)."""
        return self.values.reshape(len(self.values), -1)

    def powers(self) -> Reals:
        """2 pi times the integral of |f|^2 r dr of each function, exact for the panels' polynomials."""
        weight = 2 * np.pi * self.weights * self.nodes
        return np.asarray((abs(self.flat()) ** 2 * weight).sum(axis=1))

    def __call__(self, r: Reals) -> Complexes:
        """Values at any radii [m], shape (functions, len(r)); zero outside the panels."""
        out = np.empty((len(self.values), len(r)), dtype=complex)
        for start in range(0, len(r), CHUNK):
            self._read(r[start : start + CHUNK], out[:, start : start + CHUNK])
        return out

    def _read(self, r: Reals, out: Complexes) -> None:
        panel = np.clip(np.searchsorted(self.edges, r, side="right") - 1, 0, len(self.edges) - 2)
        order = np.argsort(panel, kind="stable") if (np.diff(panel) < 0).any() else None
        places, panel = (r, panel) if order is None else (r[order], panel[order])
        low, high = self.edges[panel], self.edges[panel + 1]
        basis = _legendre(np.clip((2 * places - low - high) / (high - low), -1, 1), self.degree)
        # Real polynomials times real and imaginary parts, the places on one panel together.
        columns = self._columns
        values = np.empty((len(self.values), len(r), 2))
        cuts = [0, *(int(cut) for cut in np.flatnonzero(np.diff(panel)) + 1), len(r)]
        for start, stop in pairwise(cuts):
            if stop > start:
                multiplied(basis[:, start:stop].T, columns[:, panel[start]], values[:, start:stop])
        values[:, (places < self.start) | (places > self.end)] = 0
        out[:, slice(None) if order is None else order] = values.view(complex)[..., 0]

    @cached_property
    def _columns(self) -> Reals:
        """Real and imaginary parts of the coefficients, shape (functions, panels, degrees, 2)."""
        columns = np.ascontiguousarray(self.coefficients[:, :, : self.degree + 1]).view(float)
        return columns.reshape(*columns.shape[:2], -1, 2)

    @cached_property
    def degree(self) -> int:
        """Highest Legendre degree above the rounding of the coefficients, some 30 eps for the last ones."""
        size = abs(self.coefficients).max(axis=(0, 1))
        return int(np.flatnonzero(size > 1e-14 * size.max(initial=0.0)).max(initial=1))

    @cached_property
    def frequencies(self) -> Reals:
        """Highest radial frequency [rad/m] on each panel, from the degree that it needs; 0 on one without width.

        exp(i c x) on [-1, 1] has coefficients J_n(c), which fall to 1e-12 at (e c/2n)^n, so c = (2n/e) 10^(-12/n).
        """
        size, width = abs(self.coefficients).max(axis=0), np.diff(self.edges)
        degree = ((size > 1e-15 * self.peak) * np.arange(ORDER)).max(axis=1).clip(1)
        wide = width > 1e-6 * self.end
        return np.where(wide, 4 * degree / np.e * 10 ** (-12 / degree) / np.where(wide, width, 1), 0.0)

    @property
    def highest_frequency(self) -> float:
        """Radial frequency [rad/m] of the functions."""
        return float(self.frequencies.max())

    def refined(self, counts: NDArray[np.int_]) -> tuple[Reals, Reals, Complexes]:
        """Nodes, weights and values with each panel cut into so many equal parts."""
        nodes, weights, values = [], [], []
        # Neighbours cut alike are done together: there are few different counts.
        borders = np.flatnonzero(np.diff(counts)) + 1
        for some in np.split(np.arange(len(counts)), borders):
            place, weight, matrix = _split(int(counts[some[0]]))
            half = np.diff(self.edges)[some, np.newaxis] / 2
            nodes.append((self.edges[some, np.newaxis] + half * (1 + place)).ravel())
            weights.append((half * weight).ravel())
            values.append(transformed(self.coefficients[:, some], matrix.T).reshape(len(self.values), -1))
        return np.concatenate(nodes), np.concatenate(weights), np.concatenate(values, axis=1)

    def combined(self, matrix: Complexes) -> Profile:
        """Linear combinations: row i of the matrix gives new function i."""
        return Profile(self.edges, weighted(matrix, self.values))

    def clipped(self, start: float, end: float) -> Profile:
        """The part between two radii, the panels cut exactly there."""
        first, last = max(start, self.start), min(end, self.end)
        edges = np.concatenate([[first], self.edges[(self.edges > first) & (self.edges < last)], [last]])
        if edges[-1] <= edges[0]:
            return Profile(np.array([start, end]), np.zeros((len(self.values), 1, ORDER), dtype=complex))
        return sampled(self, edges)

    def stretched(self, factor: float) -> Profile:
        """f(r / factor)."""
        return Profile(self.edges * factor, self.values)


def _legendre(place: Reals, degree: int) -> Reals:
    """P_0 .. P_degree at some places in [-1, 1], shape (degree + 1, places)."""
    values, before = np.empty((degree + 1, len(place))), np.empty(len(place))
    values[0] = 1
    values[1:2] = place
    for j in range(1, degree):
        np.multiply(values[j - 1], j / (2 * j + 1), out=before)
        after = values[j + 1]
        np.multiply(place, values[j], out=after)
        after -= before
        after *= (2 * j + 1) / (j + 1)
    return values


def nodes_on(edges: Reals) -> Reals:
    """Gauss-Legendre nodes of all panels, ascending."""
    low, high = edges[:-1, np.newaxis], edges[1:, np.newaxis]
    return np.asarray(((high + low) / 2 + (high - low) / 2 * NODES).ravel())


def sampled(function: Callable[[Reals], Any], edges: Reals) -> Profile:
    """A profile of a function that takes radii and gives (functions, len(r))."""
    values = np.asarray(function(nodes_on(edges)), dtype=complex)
    return Profile(edges, values.reshape(len(values), -1, ORDER))
