"""Many modes of one kind, each with a width, a phase front and an amplitude of its own."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.light.modes.family import GaussFamily

__all__ = ["Waves", "overlaps"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]


@dataclass(frozen=True, eq=False)
class Waves:
    """jones/w P(u, v) exp(-exponent r^2), u and v = sqrt2 x/w and sqrt2 y/w times the sense of the axis.

    Parameters
    ----------
    mode : whose polynomial P it is.
    senses : +1 or -1 for x and y.
    widths : w [m], shape (n,).
    exponents : 1/w^2 - i k/2R [1/m^2], shape (n,).
    jones : (Ex, Ey) [sqrt(W)], Gouy phases included, shape (n, 2).
    """

    mode: GaussFamily
    senses: tuple[int, int]
    widths: Reals
    exponents: Complexes
    jones: Complexes

    def at(self, x: Reals, y: Reals) -> Complexes:
        """Their sum [sqrt(W)/m] at columns x and rows y, shape (2, ny, nx)."""
        across, down = (np.exp(-np.multiply.outer(self.exponents, places**2)) for places in (x, y))
        amplitudes = self.jones / self.widths[:, np.newaxis]
        if self.mode.degree == 0:
            level = complex(self.mode.polynomial(0.0, 0.0))
            return np.stack([level * (down.T * part) @ across for part in amplitudes.T])
        total = np.zeros((2, len(y), len(x)), dtype=complex)
        scales = np.sqrt(2) / self.widths
        for scale, amplitude, column, row in zip(scales, amplitudes, across, down, strict=True):
            shape = self._polynomial(scale * x[np.newaxis, :], scale * y[:, np.newaxis])
            total += np.multiply.outer(amplitude, shape * (row[:, np.newaxis] * column))
        return total

    def _polynomial(self, u: Any, v: Any, *, conjugate: bool = False) -> Any:
        return self.mode.polynomial(self.senses[0] * u, self.senses[1] * v, conjugate=conjugate)

    def bare(self, x: Complexes, y: Complexes, place: int | slice, *, conjugate: bool) -> Complexes:
        """P/w of some of the waves at places in the complex plane."""
        w = self.widths[place]
        return np.asarray(
            self._polynomial(np.sqrt(2) * x / w, np.sqrt(2) * y / w, conjugate=conjugate) / w, dtype=complex
        )


def overlaps(one: Waves, other: Waves) -> Complexes:
    """<one_j|other_k> of unit amplitudes, shape (n, m).

    A polynomial times a complex Gaussian, whose path of integration is turned to the steepest descent, where few
    Gauss-Hermite nodes are exact.
    """
    nodes, weights = np.polynomial.hermite.hermgauss((one.mode.degree + other.mode.degree) // 2 + 1)
    x, y = (grid.ravel()[:, np.newaxis] for grid in np.meshgrid(nodes, nodes))
    both = np.outer(weights, weights).ravel()
    found = np.empty((len(one.widths), len(other.widths)), dtype=complex)
    for j, exponent in enumerate(one.exponents):  # one row at a time, which bounds the memory
        square = exponent.conjugate() + other.exponents
        root = np.sqrt(square)
        products = one.bare(x / root, y / root, j, conjugate=True) * other.bare(
            x / root, y / root, slice(None), conjugate=False
        )
        found[j] = both @ np.broadcast_to(products, (len(both), len(root))) / square
    return found
