"""Places in a picture: checked coordinates, and circles about a point."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.ndimage import map_coordinates

from fastaxis.errors import ParameterError
from fastaxis.train.lab_values import lab_length

__all__ = ["checked", "inscribed_radius", "on_circles"]

Reals = NDArray[np.float64]


def checked(picture: Any, x: Any, y: Any) -> tuple[Reals, Reals, Reals]:
    """The picture (..., ny, nx) and its axes as arrays.

    Raises
    ------
    ParameterError : the axes do not belong to the picture.
    """
    picture, x, y = np.asarray(picture, float), np.asarray(x, float), np.asarray(y, float)
    if picture.ndim < 2 or picture.shape[-2:] != (y.size, x.size):
        raise ParameterError(
            "a picture has rows along y and columns along x: its last two lengths are those of y and x",
            got=f"picture of shape {picture.shape}, x of {x.size}, y of {y.size}",
            fix="x=shots.x, y=shots.y",
        )
    return picture, x, y


def inscribed_radius(x: Reals, y: Reals, centre: tuple[float, float]) -> float:
    """Largest circle about the centre that stays on the pixel centres [m].

    Raises
    ------
    ParameterError : the centre is not inside the picture.
    """
    radius = min(centre[0] - x[0], x[-1] - centre[0], centre[1] - y[0], y[-1] - centre[1])
    if not radius > 0:
        told = [lab_length(float(place)) for place in (*centre, x[0], x[-1], y[0], y[-1])]
        raise ParameterError(
            "the centre lies inside the picture",
            got=f"centre = ({told[0]}, {told[1]}), picture {told[2]} .. {told[3]} by {told[4]} .. {told[5]}",
            fix="centre=(0*mm, 0*mm)",
        )
    return float(radius)


def on_circles(picture: Reals, x: Reals, y: Reals, *, centre: tuple[float, float], radii: Reals, count: int) -> Reals:
    """One picture (ny, nx) on circles: shape (len(radii), count), counter-clockwise from x, by cubic splines."""
    phi = np.arange(count) * (2 * np.pi / count)
    columns = (centre[0] + np.outer(radii, np.cos(phi)) - x[0]) / (x[1] - x[0])
    rows = (centre[1] + np.outer(radii, np.sin(phi)) - y[0]) / (y[1] - y[0])
    return np.asarray(map_coordinates(picture, [rows, columns], order=3, mode="nearest"))
