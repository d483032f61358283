"""The two transforms, through scipy.fft so that a user may set another backend or worker count."""

from __future__ import annotations

from typing import Any

from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.workers import WORKERS

__all__ = ["forward", "inverse"]

Samples = NDArray[Any]


def forward(samples: Samples) -> Samples:
    """Two-dimensional transform of each component; may reuse the memory of its input."""
    transformed: Samples = fft.fft2(samples, axes=(-2, -1), overwrite_x=True, workers=WORKERS)
    return transformed


def inverse(spectrum: Samples) -> Samples:
    """Inverse of :func:`forward`; may reuse the memory of its input."""
    transformed: Samples = fft.ifft2(spectrum, axes=(-2, -1), overwrite_x=True, workers=WORKERS)
    return transformed
