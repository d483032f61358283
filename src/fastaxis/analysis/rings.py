"""The bright and the dark ring of a round picture."""

from __future__ import annotations

import math
from typing import Any, NamedTuple

import numpy as np
from numpy.typing import NDArray

from fastaxis.analysis.widths import radial_profile

__all__ = ["Rings", "rings"]

FAINT = 1e-6  # of the brightest circle; below it a picture of 16 bits or a camera shows nothing
DEEP = 0.5  # of the ring around it: a dip that an eye takes for a dark ring


class Rings(NamedTuple):
    """Rings of a round picture.

    Parameters
    ----------
    bright : radius of the brightest circle [m]; 0 for a spot.
    dark : radius of the first dark circle around it [m]; nan if there is none with light outside it.
    """

    bright: float
    dark: float


def rings(frame: Any, *, x: Any, y: Any, centre: tuple[float, float] = (0.0, 0.0)) -> Rings:
    """Where the mean over circles about a centre is greatest, and where it is least before it grows again.

    Parameters
    ----------
    frame : (ny, nx) power per pixel.
    x, y : centres of columns and rows [m].
    centre : of the circles [m]; the axis of the beam if left out.

    Raises
    ------
    ParameterError : the centre is outside the picture.

    Examples
    --------
    >>> axis = np.arange(-60, 61) * 0.05
    >>> r2 = axis**2 + axis[:, None] ** 2
    >>> [round(float(r), 2) for r in rings((1 - r2) ** 2 * np.exp(-r2), x=axis, y=axis)]
    [0.0, 1.0]
    """
    radii, means = radial_profile(frame, x=x, y=y, centre=centre)
    step, top = radii[1] - radii[0], int(np.argmax(means))
    # Radii come in quarters of a pixel: below half a pixel nothing tells a ring from a spot.
    bright = 0.0 if top < 2 else float(radii[top] + step * _offset(means, top))
    return Rings(bright, _dark(radii, means, top))


def _dark(radii: NDArray[np.float64], means: NDArray[np.float64], top: int) -> float:
    inner = np.arange(top + 1, len(means) - 1)
    dips = inner[(means[inner] <= means[inner - 1]) & (means[inner] < means[inner + 1])]
    for dip in dips:
        around = means[dip:].max()
        if around < FAINT * means[top]:
            break
        if means[dip] < DEEP * around:
            return float(radii[dip] + (radii[1] - radii[0]) * _offset(means, dip))
    return math.nan


def _offset(means: NDArray[np.float64], k: int) -> float:
    """Where the parabola through three means has its top or bottom, in steps from the middle one."""
    if not 0 < k < len(means) - 1:
        return 0.0
    before, at, after = means[k - 1 : k + 2]
    bend = before - 2 * at + after
    return float((before - after) / (2 * bend)) if bend else 0.0
