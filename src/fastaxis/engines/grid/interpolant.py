"""The band-limited curve through symmetric samples: its values and its integrals, as real matrices."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["integral_matrix", "value_matrix"]

Reals = NDArray[np.float64]


def value_matrix(places: Reals, count: int, pitch: float) -> Reals:
    """(places, count): values at some places, from samples at (i - (count - 1)/2) pitch; outside the window 0."""
    x = np.atleast_1d(places)
    inside = abs(x) <= count * pitch / 2
    return _from_waves(x, inside.astype(float), np.zeros_like(x), count, pitch)


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
