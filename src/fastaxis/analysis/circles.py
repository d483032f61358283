"""Means over circles about a point: weights of the pixels, worked out once for all frames of a camera."""

from __future__ import annotations

from functools import lru_cache
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.ndimage import spline_filter
from scipy.sparse import csr_array

from fastaxis.analysis.places import on_circles

__all__ = ["means_on_circles"]

Reals = NDArray[np.float64]

MARGIN = 12
"""Pixels that a picture is carried on beyond its edge: the cubic spline forgets the edge there, to 0.27^12 = 1e-7."""
MOST = 1 << 17  # places on circles whose weights are kept: 25 MiB


def means_on_circles(
    picture: Reals, x: Reals, y: Reals, *, centre: tuple[float, float], radii: Reals, count: int
) -> Reals:
    """Means over ``count`` points of each circle, shape (len(radii),), of the cubic spline through a picture."""
    if len(radii) * count > MOST:
        return np.asarray(on_circles(picture, x, y, centre=centre, radii=radii, count=count).mean(axis=1))
    across, down = float(x[1] - x[0]), float(y[1] - y[0])
    middle = ((centre[1] - float(y[0])) / down, (centre[0] - float(x[0])) / across)
    weights = _weights(picture.shape, middle, (radii / down).tobytes(), (radii / across).tobytes(), count)
    padded = np.pad(picture, MARGIN, mode="edge")
    return np.asarray(weights @ spline_filter(padded, order=3, mode="nearest").ravel())


@lru_cache(maxsize=2)
def _weights(shape: tuple[int, int], middle: tuple[float, float], down: bytes, across: bytes, count: int) -> Any:
    """From spline coefficients of the padded picture to means, (circles, coefficients).

    Parameters
    ----------
    middle : row and column of the centre.
    down, across : radii in rows and in columns.
    """
    phi = np.arange(count) * (2 * np.pi / count)
    rows, down_weights = _neighbours(middle[0] + np.outer(np.frombuffer(down), np.sin(phi)))
    columns, across_weights = _neighbours(middle[1] + np.outer(np.frombuffer(across), np.cos(phi)))
    height, width = (side + 2 * MARGIN for side in shape)
    places = rows[:, :, :, np.newaxis] * np.int32(width) + columns[:, :, np.newaxis, :]
    numbers = down_weights[:, :, :, np.newaxis] * across_weights[:, :, np.newaxis, :] / count
    begins = np.arange(len(places) + 1, dtype=np.int32) * np.int32(count * 16)
    return csr_array((numbers.ravel(), places.ravel(), begins), shape=(len(places), height * width))


def _neighbours(place: Reals) -> tuple[NDArray[np.int32], Reals]:
    """The four coefficients at a place between rows, and their weights: the cubic B-spline (Schoenberg, 1946)."""
    first = np.floor(place)
    t = place - first
    weights = np.stack([(1 - t) ** 3, 4 - 6 * t**2 + 3 * t**3, 1 + 3 * t + 3 * t**2 - 3 * t**3, t**3], axis=-1) / 6
    return (first[..., np.newaxis] + (MARGIN - 1 + np.arange(4))).astype(np.int32), weights
