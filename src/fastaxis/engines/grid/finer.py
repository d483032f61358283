"""The same field on finer samples, or on coarser ones where they hold it."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.light import multiply_separable
from fastaxis.engines.grid.transforms import WORKERS, inverse

__all__ = ["finer"]

Complexes = NDArray[np.complex128]

EMPTY = 1e-25  # share of the power; 3e-13 of the field, a thousand roundings


def finer(samples: Complexes, pitch: float) -> tuple[Complexes, float]:
    """Samples and their pitch on the fewest that hold the irradiance: the field's spectrum half filled at most."""
    count = samples.shape[-1]
    spectrum = fft.fft2(samples, workers=WORKERS)
    new = fft.next_fast_len(2 * _filled(spectrum))
    new += new % 2
    if new == count:
        return samples, pitch
    # The first sample of a symmetric grid moves with the pitch: from -(n - 1)/2 pitches to -(new - 1)/2 others.
    shift = (count - 1) / (2 * count) - (new - 1) / (2 * new)
    turn = np.exp(2j * np.pi * shift * fft.fftfreq(new, 1 / new)) * (new / count)
    wide = _resized(spectrum, new)
    multiply_separable(wide, turn)
    return inverse(wide), pitch * count / new


def _resized(spectrum: Complexes, new: int) -> Complexes:
    """The waves of a spectrum that fit in another length, along both axes.

    The highest wave of even samples stands for itself and its mirror image: among more waves it is shared by both.
    """
    count = spectrum.shape[-1]
    half = min(count, new) // 2
    wide = np.zeros((spectrum.shape[0], new, new), dtype=complex)
    low, high = slice(0, half), slice(-half, None)
    for rows in (low, high):
        for columns in (low, high):
            wide[:, rows, columns] = spectrum[:, rows, columns]
    if new > count:
        wide[:, -half, :] /= 2
        wide[:, half, :] = wide[:, -half, :]
        wide[:, :, -half] /= 2
        wide[:, :, half] = wide[:, :, -half]
    return wide


def _filled(spectrum: Complexes) -> int:
    """Waves along a side, from -m to +m, that hold all but rounding of the power."""
    power = np.sum(spectrum.real**2 + spectrum.imag**2, axis=0)
    count = power.shape[-1]
    order = abs(fft.fftfreq(count, 1 / count)).astype(int)
    by_order = np.bincount(order, power.sum(axis=0) + power.sum(axis=1))
    beyond = np.cumsum(by_order[::-1])[::-1]
    needed = np.nonzero(beyond > EMPTY * beyond[0])[0]
    return 2 * (int(needed[-1]) + 1) if needed.size else 2
