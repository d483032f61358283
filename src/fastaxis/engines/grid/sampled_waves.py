"""The waves that make the band-limited curve through samples."""

from __future__ import annotations

from itertools import product
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.filled import lit, marginals
from fastaxis.engines.grid.light import GridLight
from fastaxis.engines.grid.transforms import forward
from fastaxis.engines.grid.waves import Waves
from fastaxis.engines.grid.workers import together
from fastaxis.recycled import scratch

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
    factor = np.exp(2j * np.pi * turns) / count
    factor[[0, -1]] /= 2
    spectrum = forward(light.samples.copy())
    down, across = (line[order % count] for line in marginals(spectrum))
    for line in (down, across):
        line[[0, -1]] /= 4  # of the squares of what is shared
    rows, columns = lit(down, kind), lit(across, kind)
    samples = _ordered(spectrum, order[rows], order[columns])
    # Waves as they are counted elsewhere turn the other way round.
    waves = Waves(samples, (factor[rows], factor[columns]), (rows.start, columns.start), count + 1, mirrored=True)
    return waves, (down, across)


def _ordered(spectrum: NDArray[Any], rows: NDArray[np.intp], columns: NDArray[np.intp]) -> NDArray[Any]:
    """Some orders of a spectrum side by side: negative ones stand at its end, so these are four blocks at most."""
    out = scratch((len(spectrum), rows.size, columns.size), spectrum.dtype)

    def copy(block: tuple[tuple[slice, slice], tuple[slice, slice]]) -> None:
        (down, there), (across, here) = block
        out[:, down, across] = spectrum[:, there, here]

    together(copy, product(_runs(rows, spectrum.shape[1]), _runs(columns, spectrum.shape[2])))
    return out


def _runs(orders: NDArray[np.intp], count: int) -> list[tuple[slice, slice]]:
    """(where to, where from) of the orders below 0 and of the others."""
    below = int(np.searchsorted(orders, 0))
    runs = [(slice(below), orders[:below] + count), (slice(below, len(orders)), orders[below:])]
    return [(to, slice(int(some[0]), int(some[-1]) + 1)) for to, some in runs if some.size]
