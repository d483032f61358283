"""Fields to Stokes parameters, Stokes parameters to ellipses. Components come first: (2, ...) and (4, ...)."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import ArrayLike, NDArray

__all__ = ["degree_of_polarization", "ellipse", "stokes"]

Reals = NDArray[np.float64]


def stokes(field: ArrayLike) -> Reals:
    """Stokes parameters of a field (Ex, Ey): shape (2, ...) in, (4, ...) out, in the square of its unit.

    S0 = |Ex|^2 + |Ey|^2, S1 = |Ex|^2 - |Ey|^2, S2 = 2 Re(Ex* Ey), S3 = 2 Im(Ex Ey*) = I_R - I_L in the
    receiver's naming.

    >>> stokes([1, -1j])
    array([2., 0., 0., 2.])
    """
    ex, ey = np.asarray(field, dtype=complex)
    px, py = _power(ex), _power(ey)
    cross = 2 * np.conj(ex) * ey
    # + 0.0 turns a negative zero into a plain one.
    return np.stack([px + py, px - py, cross.real, -cross.imag]) + 0.0


def _power(component: NDArray[np.complex128]) -> Any:
    return component.real**2 + component.imag**2


def ellipse(stokes: ArrayLike) -> tuple[Reals, Reals]:
    """Azimuth and ellipticity [rad] of the polarized part, shape (...) each, from (4, ...).

    azimuth = atan2(S2, S1)/2 in -90 .. 90 deg, ellipticity = atan2(S3, hypot(S1, S2))/2 in -45 .. 45 deg,
    positive for right-handed. For fully polarized light the latter is asin(S3/S0)/2, without its loss of
    digits near the poles. Where there is no light both are 0; on a circle the azimuth is 0.

    >>> ellipse([1, 0, 0, 1])[1] * 180 / np.pi
    np.float64(45.0)
    """
    _, s1, s2, s3 = np.asarray(stokes, dtype=float)
    return np.arctan2(s2, s1) / 2, np.arctan2(s3, np.hypot(s1, s2)) / 2


def degree_of_polarization(stokes: ArrayLike) -> Reals:
    """sqrt(S1^2 + S2^2 + S3^2)/S0, shape (...), from (4, ...); 0 where there is no light.

    >>> float(degree_of_polarization([2, 1, 0, 0]))
    0.5
    """
    s0, s1, s2, s3 = np.asarray(stokes, dtype=float)
    polarized: Reals = np.sqrt(s1**2 + s2**2 + s3**2)
    degree: Reals = np.divide(polarized, s0, out=np.zeros_like(polarized), where=s0 > 0)
    return degree
