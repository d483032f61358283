"""Many modes of one kind, each with a width, a phase front, a middle, a tilt and an amplitude of its own."""

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
    """jones/w P(u, v) exp(-exponent s^2 + i lean.s), s = r - middle; u, v = sqrt2 s/w times the sense of the axis.

    Parameters
    ----------
    mode : whose polynomial P it is.
    senses : +1 or -1 for x and y.
    widths : w [m], shape (n,).
    exponents : 1/w^2 - i k/2R [1/m^2], shape (n,).
    jones : (Ex, Ey) [sqrt(W)] in the middle, Gouy phases included, shape (n, 2); (n, 1) of a scalar field.
    middles : (x, y) [m], shape (n, 2).
    leans : k times the tilt along x and y [1/m], shape (n, 2).
    """

    mode: GaussFamily
    senses: tuple[int, int]
    widths: Reals
    exponents: Complexes
    jones: Complexes
    middles: Reals
    leans: Reals

    def at(self, x: Reals, y: Reals, bend: float = 0.0) -> Complexes:
        """Their sum [sqrt(W)/m] times exp(-i bend r^2) at columns x and rows y, shape (2, ny, nx)."""
        across, down = (self._along(side, places, bend) for side, places in enumerate((x, y)))
        amplitudes = self.jones / self.widths[:, np.newaxis]
        if self.mode.degree == 0:
            level = complex(self.mode.polynomial(0.0, 0.0))
            return np.stack([level * (down.T * part) @ across for part in amplitudes.T])
        total = np.zeros((self.jones.shape[1], len(y), len(x)), dtype=complex)
        scales = np.sqrt(2) / self.widths
        for scale, amplitude, (mx, my), column, row in zip(scales, amplitudes, self.middles, across, down, strict=True):
            shape = self._polynomial(scale * (x[np.newaxis, :] - mx), scale * (y[:, np.newaxis] - my))
            total += np.multiply.outer(amplitude, shape * (row[:, np.newaxis] * column))
        return total

    def _along(self, side: int, places: Reals, bend: float) -> Complexes:
        """The exponential along one side, shape (n, places)."""
        apart = places - self.middles[:, side, np.newaxis]
        along = apart * (1j * self.leans[:, side, np.newaxis] - self.exponents[:, np.newaxis] * apart)
        return np.asarray(np.exp(along - 1j * bend * places**2))

    def _polynomial(self, u: Any, v: Any, *, conjugate: bool = False) -> Any:
        return self.mode.polynomial(self.senses[0] * u, self.senses[1] * v, conjugate=conjugate)

    def bare(self, x: Complexes, y: Complexes, place: int | slice, *, conjugate: bool) -> Complexes:
        """P/w of some of the waves at places in the complex plane, from their middles."""
        w = self.widths[place]
        return np.asarray(
            self._polynomial(np.sqrt(2) * x / w, np.sqrt(2) * y / w, conjugate=conjugate) / w, dtype=complex
        )


def overlaps(one: Waves, other: Waves) -> Complexes:
    """<one_j|other_k> of unit amplitudes, shape (n, m).

    A polynomial times a complex Gaussian, whose path of integration is turned and moved to the steepest descent, where
    few Gauss-Hermite nodes are exact.
    """
    nodes, weights = np.polynomial.hermite.hermgauss((one.mode.degree + other.mode.degree) // 2 + 1)
    grid = [grid.ravel()[:, np.newaxis] for grid in np.meshgrid(nodes, nodes)]
    both = np.outer(weights, weights).ravel()
    found = np.empty((len(one.widths), len(other.widths)), dtype=complex)
    for j in range(len(one.widths)):  # one row at a time, which bounds the memory
        square = one.exponents[j].conjugate() + other.exponents
        root, rest = np.sqrt(square), np.zeros(len(square), dtype=complex)
        from_one, from_other = [], []
        for side, places in enumerate(grid):
            apart = other.middles[:, side] - one.middles[j, side]
            saddle, height = _saddle(one, other, j, side, apart)
            rest += height
            from_one.append(saddle + places / root)
            from_other.append(saddle - apart + places / root)
        products = one.bare(from_one[0], from_one[1], j, conjugate=True) * other.bare(
            from_other[0], from_other[1], slice(None), conjugate=False
        )
        found[j] = (both @ np.broadcast_to(products, (len(both), len(root)))) * np.exp(rest) / square
    return found


def _saddle(one: Waves, other: Waves, j: int, side: int, apart: Reals) -> tuple[Complexes, Complexes]:
    """Where exp(-A s^2 - i K s - B (s - d)^2 + i L (s - d)) is steepest, s from the middle of one; its logarithm there.

    With A + B = S the exponent is -S (s - m)^2 - A B d^2/S - i d (A L + B K)/S - (L - K)^2/4S, and
    m = (B d + i (L - K)/2)/S.
    """
    a, b = one.exponents[j].conjugate(), other.exponents
    k, l = one.leans[j, side], other.leans[:, side]
    square = a + b
    saddle = (b * apart + 0.5j * (l - k)) / square
    height = -(a * b * apart**2 + 1j * apart * (a * l + b * k) + (l - k) ** 2 / 4) / square
    return np.asarray(saddle), np.asarray(height)
