"""The two transforms, through scipy.fft so that a user may set another backend or worker count."""

from __future__ import annotations

import os

import numpy as np
from numpy.typing import NDArray
from scipy import fft

__all__ = ["forward", "inverse"]

WORKERS = os.cpu_count() or 1


def forward(samples: NDArray[np.complex128]) -> NDArray[np.complex128]:
    """Two-dimensional transform of each component; may reuse the memory of its input."""
    return fft.fft2(samples, axes=(-2, -1), overwrite_x=True, workers=WORKERS)


def inverse(spectrum: NDArray[np.complex128]) -> NDArray[np.complex128]:
    """Inverse of :func:`forward`; may reuse the memory of its input."""
    return fft.ifft2(spectrum, axes=(-2, -1), overwrite_x=True, workers=WORKERS)
