"""Gauss-Legendre quadrature to the last digit."""

from __future__ import annotations

from functools import lru_cache
from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["gauss_legendre"]


@lru_cache(maxsize=128)
def gauss_legendre(count: int) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Nodes in (-1, 1), ascending, and weights that sum to 2; exact for polynomials up to degree 2 count - 1.

    numpy's nodes are good to the last digit, its weights only to 6e-14 of themselves for 32 nodes and 1e-9 for 1024.
    Newton steps in extended precision mend them; where there is none, in double, which is no worse than before.
    Shared by all callers, so they can't be written to.

    >>> nodes, weights = gauss_legendre(32)
    >>> bool(abs(weights @ nodes**4 - 2 / 5) < 1e-15)
    True
    """
    x: NDArray[Any] = np.polynomial.legendre.leggauss(count)[0].astype(np.longdouble)
    for _ in range(2):
        last, this = np.ones_like(x), x
        for j in range(1, count):
            last, this = this, ((2 * j + 1) * x * this - j * last) / (j + 1)
        slope = count * (last - x * this) / (1 - x * x)
        x = x - this / slope
    nodes, weights = x.astype(float), (2 / ((1 - x * x) * slope**2)).astype(float)
    nodes.flags.writeable = weights.flags.writeable = False
    return nodes, weights
