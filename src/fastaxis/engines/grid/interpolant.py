"""The band-limited curve through symmetric samples: its values and its integrals, as real matrices."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["integral_matrix", "value_matrix"]

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


def integral_matrix(edges: Reals, count: int, pitch: float) -> Reals:
    """(intervals, count): integrals [m] between neighbouring edges; what lies outside the window is dark."""
    half = count * pitch / 2
    clipped = np.clip(edges, -half, half)
    low, high = clipped[:-1], clipped[1:]
    return _from_waves((low + high) / 2, high - low, high - low, count, pitch)


def _from_waves(middle: Reals, weight: Reals, length: Reals, count: int, pitch: float) -> Reals:
    """Rows of samples -> sum over waves exp(2 pi i f x) sinc(f length) * weight.

    The curve is (1/n) sum_m U_m exp(2 pi i m (x - x0)/L), x0 the first sample; each row is a transform over m of the
    wave's value at the place. Real by symmetry of the waves; the highest one, shared by +n/2 and -n/2, as a cosine.
    """
    window = count * pitch
    m = np.arange(count // 2 + 1)
    turns = np.outer((middle + (count - 1) / 2 * pitch) / window, m)
    waves = np.exp(-2j * np.pi * np.mod(turns, 1.0))
    waves *= weight[:, None] * np.sinc(np.outer(length / window, m))
    waves[:, -1] = waves[:, -1].real
    return np.fft.irfft(waves, n=count, axis=1)
