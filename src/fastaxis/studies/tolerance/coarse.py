"""Pictures on fewer pixels, for what thousands of them are read for."""

from __future__ import annotations

import math
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

__all__ = ["coarse"]

Reals: TypeAlias = NDArray[np.float64]

# Blocks of light to its root mean square radius: with as many, lobes up to a count of 16 are still four blocks wide.
ACROSS = 16 * 4 / (2 * math.pi)


def coarse(frame: Reals, x: Any, y: Any) -> tuple[Reals, Reals, Reals]:
    """A frame (ny, nx) in square blocks of pixels added up, with the middles of its columns and rows.

    Blocks are a tenth of the root mean square radius of the light. Angles of lobes move by some 1e-7 rad, as they do
    when the camera is moved by part of a pixel. A picture of little light across, or of none, stays as it is.

    >>> frame = np.arange(4.0).reshape(2, 2)
    >>> coarse(frame, np.arange(2.0), np.arange(2.0))[0] is frame
    True
    """
    x, y = np.asarray(x, float), np.asarray(y, float)
    power = float(frame.sum())
    side = int(_radius(frame, x, y, power) / (ACROSS * abs(x[1] - x[0]))) if power > 0 and x.size > 1 else 1
    if side < 2:
        return frame, x, y
    ny, nx = frame.shape[0] // side, frame.shape[1] // side
    # Columns first: sums along rows as they lie in memory take a third of the time.
    blocks = frame[: ny * side, : nx * side].reshape(ny, side, nx * side).sum(axis=1).reshape(ny, nx, side).sum(axis=2)
    return blocks, x[: nx * side].reshape(nx, side).mean(axis=1), y[: ny * side].reshape(ny, side).mean(axis=1)


def _radius(frame: Reals, x: Reals, y: Reals, power: float) -> float:
    """Root mean square distance of the light from its middle."""
    across, down = frame.sum(axis=0) / power, frame.sum(axis=1) / power
    return math.sqrt(max(float(across @ (x - across @ x) ** 2 + down @ (y - down @ y) ** 2), 0.0))
