"""The polarization ellipse at each pixel."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.light.stokes import degree_of_polarization, ellipse
from fastaxis.units import deg

__all__ = ["EllipseMap", "ellipse_map"]


@dataclass(frozen=True, kw_only=True, eq=False)
class EllipseMap:
    """Ellipses over a picture; all arrays of shape (ny, nx).

    Parameters
    ----------
    azimuth : of the long axis [rad], -90 .. 90 deg; nan where dark and where the light is circular.
    ellipticity : [rad], -45 .. 45 deg, positive for right-handed light; nan where dark.
    hand : +1 right-handed, -1 left-handed, 0 linear or dark, in the naming of the Stokes images given.
    degree : degree of polarization, 0 .. 1; nan where dark.
    lit : True where there is light enough to speak of an ellipse.
    """

    azimuth: NDArray[np.float64] = field(repr=False)
    ellipticity: NDArray[np.float64] = field(repr=False)
    hand: NDArray[np.int8] = field(repr=False)
    degree: NDArray[np.float64] = field(repr=False)
    lit: NDArray[np.bool_] = field(repr=False)


def ellipse_map(stokes: Any, *, dark: float = 1e-3, flat: float = 0.1 * deg) -> EllipseMap:
    """Azimuth, ellipticity and hand at each pixel, masked where they are not defined.

    azimuth = atan2(S2, S1)/2, ellipticity = atan2(S3, hypot(S1, S2))/2; both of the polarized part of the light.

    Parameters
    ----------
    stokes : (4, ny, nx), any unit.
    dark : share of the brightest pixel's S0 below which a pixel counts as dark [0 .. 1].
    flat : ellipticity up to which light counts as linear, and distance from 45 deg up to which it counts as
        circular [rad]; 0.1 deg is thinner than any line drawn.

    Examples
    --------
    >>> import numpy as np
    >>> drawn = ellipse_map(np.array([[1.0, 1.0], [1.0, 0.0], [0.0, 0.0], [0.0, -1.0]]).reshape(4, 1, 2))
    >>> drawn.hand.tolist(), drawn.azimuth.tolist()
    ([[0, -1]], [[0.0, nan]])
    """
    stokes = np.asarray(stokes, float)
    lit = (stokes[0] > dark * stokes[0].max()) & (stokes[0] > 0)
    azimuth, ellipticity = ellipse(stokes)
    circular = np.abs(ellipticity) >= np.pi / 4 - flat
    hand = np.where(lit & (np.abs(ellipticity) > flat), np.sign(stokes[3]), 0)
    return EllipseMap(
        azimuth=np.where(lit & ~circular, azimuth, np.nan),
        ellipticity=np.where(lit, ellipticity, np.nan),
        hand=hand.astype(np.int8),
        degree=np.where(lit, degree_of_polarization(stokes), np.nan),
        lit=lit,
    )
