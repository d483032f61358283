"""How close the light came to the limits of its samples."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.light import GridLight
from fastaxis.errors import SamplingError, SamplingWarning, caution
from fastaxis.plan import Grid

__all__ = ["check", "edge_watched", "phase_step"]

FRAME = 1 / 16  # of half the side
QUIET = 0.99  # share of the light whose phase steps are looked at
# A frame that holds one part in a thousand is what the slow tails of a hard edge put there in a good window; ten
# times that would show in a frame. With 20 % the light has come round the edge.
WARN, REFUSE = 1e-2, 0.2
LINES = 128  # rows and columns looked at for phase steps: enough to meet a beam anywhere


def edge_watched(light: GridLight) -> GridLight:
    """The light with the power near the edge of its window noted, if that is the most so far."""
    if light.periodic:
        return light
    samples, count = light.samples, light.count
    inner = slice(math.ceil(count * FRAME / 2), count - math.ceil(count * FRAME / 2))
    total = float(np.vdot(samples, samples).real)
    if total == 0:
        return light
    middle = samples[:, inner, inner]
    inside = float(np.sum(middle.real**2) + np.sum(middle.imag**2))
    return replace(light, edge_power=max(light.edge_power, 1 - inside / total, 0.0))


def phase_step(light: GridLight) -> float:
    """Phase step [rad] between neighbouring samples that all but 1 % of the light stays below.

    Looked at on some rows and columns of both components. A step counts as much as the two samples have light in
    common, so the jump by pi at a zero of the field, which no sampling removes, weighs next to nothing.
    """
    stride = max(light.count // LINES, 1)
    steps, weights = [], []
    for part in light.samples:
        for lines in (part[::stride], part[:, ::stride].T):
            product = lines[:, 1:] * lines[:, :-1].conj()
            steps.append(abs(np.angle(product)).ravel())
            weights.append(abs(product).ravel())
    return _quantile(np.concatenate(steps), np.concatenate(weights))


def _quantile(steps: NDArray[np.float64], weights: NDArray[np.float64]) -> float:
    order = np.argsort(steps)
    below = np.cumsum(weights[order])
    return float(steps[order[np.searchsorted(below, QUIET * below[-1])]])


def check(light: GridLight, names: tuple[str, ...], grid: Grid) -> Guard:
    """The guard of finished light; warned about or refused where it is bad.

    ``names`` are the parts of the last step, ``grid`` the samples at the source: the same pitch twice as wide is the
    remedy named.

    Warns
    -----
    SamplingWarning : more than 1 % of the power came near the edge of the window or was cut off.

    Raises
    ------
    SamplingError : more than 20 %.
    """
    guard = Guard(light.edge_power, phase_step(light), light.discarded)
    worst = max(guard.edge_power, guard.discarded)
    if worst > WARN:
        message: dict[str, Any] = {
            "rule": "the samples must hold the light, with dark room around it",
            "got": f"{' '.join(names) or 'source'}: {guard.edge_power:.2%} of the power near the edge of the window, "
            f"{guard.discarded:.2%} cut off by the band limit",
            "fix": f"grid=fa.Grid(samples={2 * grid.samples}, window={2 * grid.window:.4g})",
        }
        if worst > REFUSE:
            raise SamplingError(**message)
        caution(SamplingWarning(**message))
    return guard
