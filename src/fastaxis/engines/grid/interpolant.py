"""The band-limited curve through symmetric samples: its values, as a real matrix."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["value_matrix"]

Reals = NDArray[np.float64]


def value_matrix(places: Reals, count: int, pitch: float) -> Reals:
    """(places, count): values at some places, from samples at (i - (count - 1)/2) pitch; outside the window 0.

    The curve of one sample, t samples away from it, is sin(pi t)/(n tan(pi t/n)) for an even number n of them. All t of
    a place have one fraction of a sample, so that the sine is taken once a place.
    """
    x = np.atleast_1d(places)
    place = x / pitch + (count - 1) / 2
    nearest = np.rint(place)
    fraction = place - nearest
    sample = np.arange(count)
    signs = 1.0 - 2.0 * (sample % 2)
    sines = np.sin(np.pi * fraction) * (1 - 2 * np.mod(nearest, 2)) / count
    on_sample = fraction == 0
    fraction[on_sample] = 0.5  # whatever is no division by zero
    matrix = np.tan((nearest[:, None] - sample + fraction[:, None]) * (np.pi / count))
    np.divide(signs, matrix, out=matrix)
    matrix *= sines[:, None]
    matrix[on_sample] = np.mod(nearest[on_sample, None] - sample, count) == 0
    matrix[abs(x) > count * pitch / 2] = 0
    return np.asarray(matrix)
