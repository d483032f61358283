"""The waves that make the band-limited curve through samples."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.filled import lit, marginals
from fastaxis.engines.grid.light import GridLight
from fastaxis.engines.grid.transforms import forward
from fastaxis.engines.grid.waves import Waves

__all__ = ["waves_of"]

Reals = NDArray[np.float64]


def waves_of(light: GridLight) -> tuple[Waves, tuple[Reals, Reals]]:
    """Waves of whole orders across the window, and the power of each order down and across.

    With x0 = -(n - 1)/2 pitch the first sample, the curve is the sum of U_k exp(2 pi i k (x - x0)/window)/n, k from
    -n/2 to n/2; the highest wave is shared by both signs.
    """
    count, kind = light.count, light.samples.dtype
    order = np.arange(-(count // 2), count // 2 + 1)
    turns = np.mod(order * (count - 1), 2 * count) / (2 * count)
    factor = np.exp(-2j * np.pi * turns) / count
    factor[[0, -1]] /= 2
    spectrum = forward(light.samples.copy())
    samples: NDArray[Any] = np.ascontiguousarray(spectrum[:, -order[:, None] % count, -order % count])
    down, across = marginals(samples)
    for line in (down, across):
        line[[0, -1]] /= 4  # of the squares of what is shared
    rows, columns = lit(down, kind), lit(across, kind)
    waves = Waves(samples[:, rows, columns], (factor[rows], factor[columns]), (rows.start, columns.start), count + 1)
    return waves, (down, across)
