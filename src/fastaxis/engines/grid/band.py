"""The band limit of the angular spectrum on a finite window."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

__all__ = ["band_limit", "cut_band"]


def band_limit(window: float, distance: float, wavelength: float) -> float:
    """Highest frequency [1/m] whose phase step is still sampled, for a transform over a window.

    Neighbouring frequencies are 1/window apart; beyond |f| = 1/(wavelength sqrt((2 distance/window)^2 + 1)) the
    transfer function turns by more than pi between them: light of that slope would leave the window by one side and
    come in by the other. ``window`` is the whole width transformed, padding included.

    K. Matsushima and T. Shimobaba, Opt. Express 17, 19662 (2009), eq. (13).

    >>> round(band_limit(2 * 1024 * 10e-6, 0.5, 632.8e-9), 3)
    32357.311
    """
    return 1 / (wavelength * math.hypot(2 * distance / window, 1))


def cut_band(spectrum: NDArray[np.complex128], frequency: NDArray[np.float64], limit: float) -> float:
    """Set everything beyond the limit to zero, in place; the share of the power that was there."""
    beyond = abs(frequency) > limit
    if not beyond.any():
        return 0.0
    total = float(np.vdot(spectrum, spectrum).real)
    rows, columns = spectrum[:, beyond, :], spectrum[:, ~beyond, :][:, :, beyond]
    lost = float(np.vdot(rows, rows).real + np.vdot(columns, columns).real)
    spectrum[:, beyond, :] = 0
    spectrum[:, :, beyond] = 0
    return lost / total if total else 0.0
