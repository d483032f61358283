"""How closely a camera has to be looked at, found by trying."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.joined.nodes import Axis
from fastaxis.light import Raster

__all__ = ["Look", "candidates", "settled"]

Reals = NDArray[np.float64]

COARSER = (2.0, 4.0)  # times the band of the moments
SETTLED = 1e-10  # of the brightest pixel: the bands of edges and singularities fall off slowly, and more buys little
LINES = 6  # rows, and as many columns, on which it is tried


@dataclass(frozen=True)
class Look:
    """Places along both axes.

    Parameters
    ----------
    columns, rows : of a raster.
    """

    columns: Axis
    rows: Axis

    @property
    def farthest(self) -> float:
        """Largest distance of a place along either axis [m]."""
        return float(max(abs(axis.places).max() for axis in (self.rows, self.columns)))


def candidates(raster: Raster, frequency: float, finest: float) -> list[Look]:
    """Ways to look at a camera, those with few places first.

    Parameters
    ----------
    raster : the camera.
    frequency : highest spatial frequency [1/m] by second moments.
    finest : one that is high enough for certain.
    """
    coarser = [factor * frequency for factor in COARSER if factor * frequency < finest]
    return [_look(raster.x, raster.y, raster.pitch, tried) for tried in (*coarser, finest)]


def settled(raster: Raster, finest: float, looks: Sequence[Look], image: Callable[[Look], Reals]) -> Look:
    """The look with the fewest places that shows the same as the finest, on some lines of pixels.

    Second moments say little of how fine the light behind a singularity or an edge is: directly behind it there is
    no limit, and some way on there is next to nothing beyond them. Lines through the middle are among those tried,
    so that a rim about the axis is met.

    Parameters
    ----------
    raster : the camera.
    finest : spatial frequency [1/m] that the last look is good for.
    looks : those to be tried, the finest last.
    image : collects the light at some places.
    """
    *coarser, fine = looks
    if not coarser:
        return fine
    few_x, few_y = _few(raster.x), _few(raster.y)
    across = Look(fine.columns, Axis.inside(few_y, raster.pitch, finest))
    down = Look(Axis.inside(few_x, raster.pitch, finest), fine.rows)
    wanted = image(across), image(down)
    peak = max(abs(values).max() for values in wanted)
    for tried in coarser:
        found = image(Look(tried.columns, across.rows)), image(Look(down.columns, tried.rows))
        if all(abs(one - other).max() <= SETTLED * peak for one, other in zip(found, wanted, strict=True)):
            return tried
    return fine


def _look(x: Reals, y: Reals, pixel: float, frequency: float) -> Look:
    columns = Axis.of(x, pixel, frequency)
    return Look(columns, columns if np.array_equal(x, y) else Axis.of(y, pixel, frequency))


def _few(middles: Reals) -> Reals:
    """The two pixels nearest to the axis and some spread without order."""
    nearest = np.argsort(abs(middles), kind="stable")[:2]
    spread = (0.618034 * np.arange(1, LINES - 1) % 1 * len(middles)).astype(int)
    return np.asarray(middles[np.unique([*nearest, *spread])])
