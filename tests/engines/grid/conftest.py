"""Integrals of the curve through samples, from all its waves at once: what quicker ways are held against."""

import numpy as np
import pytest


@pytest.fixture
def integral_matrix():
    """(intervals, count) from edges: integrals [m] between them; what lies outside the window is dark."""
    return _integrals


def _integrals(edges, count, pitch):
    """The curve is (1/n) sum_m U_m exp(2 pi i m (x - x0)/L), x0 the first sample; over a length d a wave of frequency f
    gives d sinc(f d) times its value in the middle. The highest wave, shared by both signs, counts as a cosine.
    """
    clipped = np.clip(edges, -count * pitch / 2, count * pitch / 2)
    middle, length = (clipped[:-1] + clipped[1:]) / 2, np.diff(clipped)
    window, m = count * pitch, np.arange(count // 2 + 1)
    turns = np.outer((middle + (count - 1) / 2 * pitch) / window, m)
    waves = np.exp(-2j * np.pi * turns) * length[:, None] * np.sinc(np.outer(length / window, m))
    waves[:, -1] = waves[:, -1].real
    return np.fft.irfft(waves, n=count, axis=1)
