"""Places inside the pixels of a camera, dense enough for the fringes there."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fastaxis.light import Raster

__all__ = ["PixelNodes", "nodes_needed"]

Reals = NDArray[np.float64]

SETTLED = 1e-11
"""Error of a pixel, as a share of the brightest irradiance times its area: that of the engines under the arms."""
LARGEST = 24  # nodes in one stretch; a pixel that spans many fringes is cut into stretches


def nodes_needed(turns: float) -> int:
    """Gauss-Legendre nodes for the mean of a fringe that runs through this many turns across the pixel.

    The error of n nodes on cos(s t), -1 < t < 1, is at most 2^(2n+1) (n!)^4 s^(2n) / ((2n + 1) (2n)!^3), s = pi turns
    (P. J. Davis and P. Rabinowitz, Methods of Numerical Integration (1984), section 2.7); half of it, for the mean.

    >>> nodes_needed(0.0), nodes_needed(0.02), nodes_needed(1.0)
    (1, 3, 9)
    """
    s, n = math.pi * turns, 1
    while n < LARGEST and s > 0:
        log = 2 * n * math.log(2 * s) + 4 * math.lgamma(n + 1) - 3 * math.lgamma(2 * n + 1) - math.log(2 * n + 1)
        if log < math.log(SETTLED):
            break
        n += 1
    return n


@dataclass(frozen=True)
class PixelNodes:
    """Nodes and weights along one axis, the same in every pixel.

    Parameters
    ----------
    offsets : from the middle of a pixel [m].
    weights : of the integral over it [m].
    """

    offsets: Reals
    weights: Reals

    @classmethod
    def of(cls, pixel: float, frequency: float) -> PixelNodes:
        """For irradiance of at most this spatial frequency [1/m]."""
        stretches = max(1, math.ceil(pixel * frequency / 4))
        side = pixel / stretches
        nodes, weights = np.polynomial.legendre.leggauss(nodes_needed(side * frequency))
        middles = (np.arange(stretches) - (stretches - 1) / 2) * side
        offsets = (middles[:, np.newaxis] + nodes * side / 2).ravel()
        return cls(offsets, np.tile(weights * side / 2, stretches))

    def places(self, middles: Reals) -> Reals:
        """All nodes of the pixels with these middles, in order."""
        return np.asarray((middles[:, np.newaxis] + self.offsets).ravel())

    def collected(self, values: Reals, raster_shape: tuple[int, int]) -> Reals:
        """Integrals over pixels of values (components, ny n, nx n) at the nodes."""
        (ny, nx), n = raster_shape, len(self.offsets)
        cells = values.reshape(len(values), ny, n, nx, n)
        return np.asarray(np.einsum("cynxm,n,m->cyx", cells, self.weights, self.weights, optimize=True))

    def rows_at_once(self, raster: Raster, most: int) -> int:
        """How many rows of pixels have about ``most`` nodes."""
        return max(1, most // (raster.shape[1] * len(self.offsets) ** 2))
