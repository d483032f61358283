"""Singular points and lines of a polarization pattern."""

from __future__ import annotations

from typing import Any

import numpy as np

from fastaxis.analysis.places import checked, inscribed_radius, on_circles
from fastaxis.analysis.widths import radial_profile
from fastaxis.errors import ParameterError
from fastaxis.train.lab_values import lab_length

__all__ = ["l_line_radius", "polarization_index"]

_POINTS = 360


def polarization_index(
    stokes: Any, *, x: Any, y: Any, radius: float, centre: tuple[float, float] = (0.0, 0.0)
) -> float:
    """Turns of the long axis of the ellipse along a circle walked once counter-clockwise.

    index = (1/2)(1/2 pi) of the winding of S1 + i S2. A radial, azimuthal or spiral beam has +1 at its centre, a lemon
    +1/2, a star -1/2, a uniform beam 0. A mirror keeps it, since it flips the places and the ellipses alike; a
    half-wave plate changes its sign. The picture is that of an upright camera: a mirrored one flips the places alone.

    Parameters
    ----------
    stokes : (4, ny, nx).
    x, y : centres of columns and rows [m].
    radius : of the circle [m].
    centre : of the circle [m]; the axis of the beam if left out.

    Raises
    ------
    ParameterError : the circle leaves the picture; it crosses circular light or darkness, where there is no axis.

    Notes
    -----
    J. F. Nye, Proc. R. Soc. Lond. A 389, 279 (1983); I. Freund, Opt. Commun. 201, 251 (2002).

    Examples
    --------
    >>> axis = np.arange(-20, 21) * 0.1
    >>> phi = np.arctan2(axis[:, None], axis)
    >>> radial = np.stack([np.ones_like(phi), np.cos(2 * phi), np.sin(2 * phi), 0 * phi])
    >>> polarization_index(radial, x=axis, y=axis, radius=1.0)
    1.0
    """
    stokes, x, y = checked(stokes, x, y)
    room = inscribed_radius(x, y, centre)
    if not 0 < radius <= room:
        raise ParameterError(
            "the circle stays inside the picture",
            got=f"polarization_index: radius = {lab_length(radius)}, room for {lab_length(room)}",
            fix=f"radius={room * 500:.4g}*mm",
        )
    s1, s2 = (on_circles(stokes[k], x, y, centre=centre, radii=np.array([radius]), count=_POINTS)[0] for k in (1, 2))
    axis = s1 + 1j * s2
    steps = np.angle(np.roll(axis, -1) * axis.conj())
    # A quarter turn of S1 + iS2 between neighbours of one degree is a jump, not a turn.
    if np.abs(axis).min() <= 1e-6 * stokes[0].max() or np.abs(steps).max() > np.pi / 2:
        raise ParameterError(
            "the circle avoids places that are dark or circular: there the ellipse has no axis to follow",
            got=f"polarization_index: radius = {lab_length(radius)}",
            fix=f"radius={radius * 500:.4g}*mm",
        )
    return float(np.round(steps.sum() / (2 * np.pi))) / 2


def l_line_radius(stokes: Any, *, x: Any, y: Any, centre: tuple[float, float] = (0.0, 0.0)) -> float:
    """Radius [m] of the innermost circle on which the light is linear, from the means of S3 over circles.

    Parameters
    ----------
    stokes : (4, ny, nx).
    x, y : centres of columns and rows [m].
    centre : of the circles [m].

    Raises
    ------
    ParameterError : the mean of S3 does not change sign.

    Examples
    --------
    >>> axis = np.arange(-20, 21) * 0.1
    >>> r2 = axis**2 + axis[:, None] ** 2
    >>> stokes = np.stack([1 + r2, 0 * r2, 0 * r2, 1 - r2])
    >>> round(l_line_radius(stokes, x=axis, y=axis), 6)
    1.0
    """
    stokes, x, y = checked(stokes, x, y)
    radii, s3 = radial_profile(stokes[3], x=x, y=y, centre=centre)
    s3 = np.where(np.abs(s3) <= 1e-9 * stokes[0].max(), 0.0, s3)  # darkness far out has no sign
    changes = np.flatnonzero(s3[:-1] * s3[1:] < 0)
    if not changes.size:
        raise ParameterError(
            "an L-line parts right-handed from left-handed light",
            got="l_line_radius: S3 keeps its sign",
            fix='shots.frame("R") - shots.frame("L")',
        )
    k = int(changes[0])
    return float(radii[k] + (radii[1] - radii[0]) * s3[k] / (s3[k] - s3[k + 1]))
