"""How much of the Poincare sphere a beam's polarization covers."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.analysis.places import checked

__all__ = ["sphere_wrapping"]

Reals = NDArray[np.float64]


def sphere_wrapping(
    stokes: Any, *, x: Any, y: Any, centre: tuple[float, float] = (0.0, 0.0), radius: float = np.inf
) -> float:
    """Signed share of the sphere covered, (1/4 pi) times the integral of s . (ds/dx x ds/dy).

    Each cell between four neighbouring pixels is two triangles on the sphere, whose solid angles are exact.
    +1 or -1 is a whole sphere covered once; the sign tells the sense and changes with the
    naming of R and L.

    Parameters
    ----------
    stokes : (4, ny, nx).
    x, y : centres of columns and rows [m].
    centre : of the part looked at [m].
    radius : of the part looked at [m]; all of the picture if left out.

    Notes
    -----
    A. M. Beckley, T. G. Brown, M. A. Alonso, Opt. Express 18, 10777 (2010);
    S. Gao et al., Phys. Rev. A 102, 053513 (2020).

    Examples
    --------
    >>> axis = np.arange(-50, 51) * 0.04
    >>> x, y = np.meshgrid(axis, axis)
    >>> half = 1 - x**2 - y**2  # stereographic: the rim r = 1 is the equator
    >>> stokes = np.stack([1 + x**2 + y**2, 2 * x, 2 * y, half])
    >>> round(sphere_wrapping(stokes, x=axis, y=axis, radius=1.0), 2)
    0.5
    """
    stokes, x, y = checked(stokes, x, y)
    length = np.sqrt((stokes[1:] ** 2).sum(axis=0))
    s = stokes[1:] / np.where(length > 0, length, 1.0)
    corners = s[:, :-1, :-1], s[:, :-1, 1:], s[:, 1:, 1:], s[:, 1:, :-1]
    angles = _solid_angle(corners[0], corners[1], corners[2]) + _solid_angle(corners[0], corners[2], corners[3])
    middle_x, middle_y = (x[:-1] + x[1:]) / 2 - centre[0], (y[:-1] + y[1:]) / 2 - centre[1]
    # Cells on the circle count by the part of them inside, as if the circle were straight across a cell.
    inside = np.clip((radius - np.hypot(middle_x, middle_y[:, None])) / (x[1] - x[0]) + 0.5, 0, 1)
    return float((angles * inside).sum() / (4 * np.pi))


def _solid_angle(a: Reals, b: Reals, c: Reals) -> Reals:
    """Signed solid angle of spherical triangles, components first (A. van Oosterom, J. Strackee, 1983)."""
    volume = (a * np.cross(b, c, axis=0)).sum(axis=0)
    ab, bc, ca = (a * b).sum(axis=0), (b * c).sum(axis=0), (c * a).sum(axis=0)
    return np.asarray(2 * np.arctan2(volume, 1 + ab + bc + ca))
