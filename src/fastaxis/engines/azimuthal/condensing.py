"""Fewer nodes and fewer radii for kernels with few fringes: as many as a polynomial needs that carries the kernel.

Light on panels may have far more fringes than a kernel to places near the axis. That kernel is a polynomial of a modest
degree in the node and another one in the radius, so that light may be moved to the Chebyshev points of the first
without changing any sum, and sums at those of the second give all others (Halko, Martinsson and Tropp, SIAM Rev. 53,
217, 2011, have what may be done with kernels of low rank).
"""

from __future__ import annotations

import math

import numpy as np

from fastaxis.engines.azimuthal.far import phasors
from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.engines.azimuthal.products import product

__all__ = ["condensed", "enough", "read", "spanned"]

CHUNK = 1 << 10  # places at a time: their polynomials stay in the cache


def enough(phase: float) -> int:
    """Chebyshev points for a kernel with so much phase [rad] from end to end.

    exp(i c x) on [-1, 1] has coefficients 2 J_n(c) in Chebyshev polynomials, c being half the phase. Behind n = c they
    fall within some c^(1/3), as an Airy function does, and are below 1e-16 from here on (DLMF 10.19.8).
    """
    half = float(phase) / 2
    return math.ceil(half + 10 * math.cbrt(half) + 16)


def spanned(low: float, high: float, count: int) -> Reals:
    """Chebyshev points between two places."""
    return np.asarray((low + high) / 2 + (high - low) / 2 * np.cos(_angles(count)))


def _angles(count: int) -> Reals:
    return np.asarray(np.pi * (np.arange(count)[::-1] + 0.5) / count)


def _to_coefficients(count: int) -> Reals:
    """From values at Chebyshev points to coefficients, shape (count, count)."""
    matrix = np.cos(np.multiply.outer(np.arange(count), _angles(count))) * (2 / count)
    matrix[0] /= 2
    return matrix


def _polynomials(places: Reals, low: float, high: float, count: int) -> Reals:
    """T_n at some places, shape (count, places): by doubling, as climbing from n to n + 1 loses digits at the ends."""
    place = np.clip((2 * places - low - high) / max(high - low, 1e-300), -1, 1)
    return phasors(np.zeros(len(places)), np.arccos(place), count).real


def condensed(places: Reals, values: Complexes, low: float, high: float, count: int) -> Complexes:
    """Values at ``count`` Chebyshev points that give the same sums with each polynomial of a degree below it.

    Parameters
    ----------
    places : between ``low`` and ``high``.
    values : shape (functions, places).
    """
    columns = np.ascontiguousarray(values.T).view(float)
    moments = np.zeros((count, columns.shape[1]))
    for start in range(0, len(places), CHUNK):
        some = slice(start, start + CHUNK)
        moments += product(_polynomials(places[some], low, high, count), columns[some])
    return np.ascontiguousarray(product(_to_coefficients(count).T, moments)).view(complex).T


def read(values: Complexes, places: Reals, low: float, high: float) -> Complexes:
    """The polynomials through values (functions, nodes) at Chebyshev points, read at places between the ends."""
    count = values.shape[1]
    columns = product(_to_coefficients(count), np.ascontiguousarray(values.T).view(float))
    out = np.empty((len(places), columns.shape[1]))
    for start in range(0, len(places), CHUNK):
        some = slice(start, start + CHUNK)
        out[some] = product(_polynomials(places[some], low, high, count).T, columns)
    return out.view(complex).T
