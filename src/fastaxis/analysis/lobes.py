"""How many bright lobes a picture has about a point, and where they stand."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.analysis.places import checked, inscribed_radius

__all__ = ["Lobes", "lobes"]

Reals = NDArray[np.float64]


@dataclass(frozen=True)
class Lobes:
    """Bright lobes of a picture.

    Parameters
    ----------
    count : of bright lobes; 0 for a picture that has none.
    angle : of a bright lobe [rad], counter-clockwise from x, in [0, 2 pi / count); nan if there is none.
    contrast : of the modulation about the centre: 1 for cos^2 lobes, up to 2 for narrow ones.
    kind : "dark"; "round" about the centre; "beside": round about a place beside it; "lobes"; or "other": uneven, but
        not in lobes about the centre, as stripes are.
    """

    count: int
    angle: float
    contrast: float
    kind: str = "lobes"


def lobes(
    frame: Any,
    *,
    x: Any,
    y: Any,
    centre: tuple[float, float] = (0.0, 0.0),
    least: float = 0.05,
    most: int = 16,
) -> Lobes:
    """Count the bright lobes about a centre and tell the angle of one, from the azimuthal Fourier content.

    The content of order m is sum(I u^m) over the picture with u = exp(-i phi), softened near the centre so that a
    round spot has none on square pixels; a lobe stands at -arg/m. A picture with two bright halves, drawn-out spots
    included, has two lobes along its long direction.

    Parameters
    ----------
    frame : (ny, nx) power per pixel.
    x, y : centres of columns and rows [m].
    centre : about which the lobes are counted [m]; the axis of the beam if left out.
    least : contrast from which a modulation counts as lobes; 5 % is what an eye sees on a screen.
    most : largest count looked for; fewer in a small picture, where lobes would be narrower than four pixels.

    Raises
    ------
    ParameterError : the centre is outside the picture.

    Notes
    -----
    A round spot beside the centre is round: where one lobe would be counted, roundness about the centroid is looked at.

    Examples
    --------
    >>> axis = np.arange(-30, 31) * 0.1
    >>> two = axis**2 * np.exp(-2 * (axis**2 + axis[:, None] ** 2))
    >>> found = lobes(two, x=axis, y=axis)
    >>> found.count, round(found.angle, 9), round(found.contrast, 3)
    (2, 0.0, 1.0)
    """
    frame, x, y = checked(frame, x, y)
    if frame.size == 1 or not frame.max() > 0:
        return Lobes(0, math.nan, 0.0, "dark")
    found = _dominant(_contents(frame, x, y, centre, most), least)
    if found.count == 1:
        centroid = (float(frame.sum(axis=0) @ x / frame.sum()), float(frame.sum(axis=1) @ y / frame.sum()))
        if _dominant(_contents(frame, x, y, centroid, most), least).kind == "round":
            return Lobes(0, math.nan, 0.0, "beside")
    return found


def _dominant(contents: NDArray[np.complex128], least: float) -> Lobes:
    contrasts = np.abs(contents)
    if not contrasts.max() >= least:
        return Lobes(0, math.nan, float(contrasts.max()), "round")
    # Narrow lobes have overtones nearly as strong as their fundamental: the lowest of the strong ones counts.
    order = int(np.flatnonzero(contrasts >= 0.8 * contrasts.max())[0]) + 1
    # So many equal lobes have no content but that order and its overtones. A dark line through the centre has all even
    # orders alike, up to the finest looked at.
    odd = np.arange(1, contrasts.size + 1) % order != 0
    if np.max(contrasts, where=odd, initial=0.0) >= 0.75 * contrasts[order - 1]:
        return Lobes(0, math.nan, float(contrasts.max()), "other")
    spacing = 2 * math.pi / order
    angle = float(-np.angle(contents[order - 1]) / order) % spacing
    # A lobe at zero comes out a rounding below it: that is angle 0, not one spacing.
    angle = 0.0 if spacing - angle < 1e-12 else angle
    return Lobes(order, angle, float(contrasts[order - 1]))


def _contents(frame: Reals, x: Reals, y: Reals, centre: tuple[float, float], most: int) -> NDArray[np.complex128]:
    """Twice sum(I u^m) / sum(I |u|^m) for m = 1 .. most, or fewer in a picture of few pixels."""
    spread = _spread(frame, x - centre[0], y - centre[1])
    limit = min(inscribed_radius(x, y, centre), 4 * spread)
    # Lobes narrower than four pixels can't be told from the pixels themselves.
    most = min(most, max(2, int(2 * math.pi * spread / (4 * (x[1] - x[0])))))
    frame, dx, dy = _binned(*_cropped(frame, x - centre[0], y - centre[1], limit))
    r2 = dx**2 + dy[:, None] ** 2
    # Beyond the inscribed circle only the corners look on, and they have a fourfold content of their own.
    light = np.where(r2 <= limit**2, frame, 0.0) * _taper(np.sqrt(r2) / limit)
    power = light.sum()
    if not power > 0:
        return np.zeros(most, complex)
    soft = 0.1 * (light * r2).sum() / power  # a third of the r.m.s. radius: sums over pixels stay smooth at the centre
    u = (dx - 1j * dy[:, None]) / np.sqrt(r2 + soft)
    size = np.abs(u)
    contents, weighted, weight = np.empty(most, complex), light.astype(complex), light.copy()
    for m in range(most):
        weighted *= u
        weight *= size
        contents[m] = 2 * weighted.sum() / weight.sum()
    return contents


def _spread(frame: Reals, dx: Reals, dy: Reals) -> float:
    """Root mean square distance from the centre [m]: four of it hold all the light that shapes a picture."""
    return math.sqrt(float(frame.sum(axis=0) @ dx**2 + frame.sum(axis=1) @ dy**2) / float(frame.sum()))


def _cropped(frame: Reals, dx: Reals, dy: Reals, limit: float) -> tuple[Reals, Reals, Reals]:
    columns, rows = np.flatnonzero(np.abs(dx) <= limit), np.flatnonzero(np.abs(dy) <= limit)
    across, along = slice(columns[0], columns[-1] + 1), slice(rows[0], rows[-1] + 1)
    return frame[along, across], dx[across], dy[along]


def _binned(frame: Reals, dx: Reals, dy: Reals) -> tuple[Reals, Reals, Reals]:
    """At most about 512 pixels a side, neighbours added up: the lobes counted here are many pixels wide."""
    k = max(frame.shape) // 512
    if k < 2:
        return frame, dx, dy
    ny, nx = frame.shape[0] // k, frame.shape[1] // k
    blocks = frame[: ny * k, : nx * k].reshape(ny, k, nx, k).sum(axis=(1, 3))
    return blocks, dx[: nx * k].reshape(nx, k).mean(axis=1), dy[: ny * k].reshape(ny, k).mean(axis=1)


def _taper(share: Reals) -> Reals:
    """1 inside 0.8 of the circle, falling smoothly to 0 at its edge, so that no stairs of pixels are counted."""
    return np.asarray(np.cos(np.pi / 2 * np.clip((share - 0.8) / 0.2, 0, 1)) ** 2)
