"""Where a picture is and how wide: second moments, rings, half-maximum widths."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.analysis.circles import means_on_circles
from fastaxis.analysis.places import checked, inscribed_radius
from fastaxis.errors import ParameterError
from fastaxis.train.lab_values import lab_length

__all__ = ["Widths", "fwhm", "radial_profile", "ring_radius", "widths"]

Reals = NDArray[np.float64]
_ON_AXIS = (0.0, 0.0)


@dataclass(frozen=True, kw_only=True)
class Widths:
    """Second moments of a picture (ISO 11146-1).

    Parameters
    ----------
    power : sum over the pixels, in the unit of the picture.
    peak : brightest pixel, in the unit of the picture.
    centroid : (x, y) [m].
    xx, yy, xy : variances and covariance about the centroid [m^2].
    """

    power: float
    peak: float
    centroid: tuple[float, float]
    xx: float
    yy: float
    xy: float

    @property
    def d4sigma(self) -> tuple[float, float]:
        """Four standard deviations along x and along y [m]; 2w for a Gaussian beam of radius w."""
        return 4 * math.sqrt(self.xx), 4 * math.sqrt(self.yy)

    @property
    def principal(self) -> tuple[float, float, float]:
        """D4sigma along the long and the short axis [m], and the angle of the long one [rad], -90 .. 90 deg."""
        mean, half = (self.xx + self.yy) / 2, math.hypot((self.xx - self.yy) / 2, self.xy)
        angle = math.atan2(2 * self.xy, self.xx - self.yy) / 2
        return 4 * math.sqrt(mean + half), 4 * math.sqrt(max(mean - half, 0.0)), angle


def widths(frame: Any, *, x: Any, y: Any) -> Widths:
    """Centroid, second moments and peak of a picture.

    No background is subtracted: a frame made here has none. Hard-edged beams have no finite second moment in the
    far field; what comes out then measures the sensor.

    Parameters
    ----------
    frame : (ny, nx) power per pixel.
    x, y : centres of columns and rows [m].

    Raises
    ------
    ParameterError : a dark picture; axes that do not belong to it.

    Examples
    --------
    >>> axis = np.arange(-20, 21) * 0.1
    >>> spot = np.exp(-2 * (axis**2 + (axis[:, None] - 0.3) ** 2) / 0.5**2)
    >>> found = widths(spot, x=axis, y=axis)
    >>> round(found.centroid[1], 6), round(found.d4sigma[0], 6)
    (0.3, 1.0)
    """
    frame, x, y = checked(frame, x, y)
    power = _power(frame)
    columns, rows = frame.sum(axis=0), frame.sum(axis=1)
    cx, cy = float(columns @ x) / power, float(rows @ y) / power
    return Widths(
        power=power,
        peak=float(frame.max()),
        centroid=(cx, cy),
        xx=float(columns @ (x - cx) ** 2) / power,
        yy=float(rows @ (y - cy) ** 2) / power,
        xy=float((y - cy) @ frame @ (x - cx)) / power,
    )


def _power(frame: Reals) -> float:
    power = float(frame.sum())
    if not power > 0:
        raise ParameterError("a width needs light", got=f"picture of power {power:g}", fix='shots.frame("H")')
    return power


def radial_profile(
    frame: Any, *, x: Any, y: Any, centre: tuple[float, float] = _ON_AXIS, count: int = 128
) -> tuple[Reals, Reals]:
    """Mean over circles about a centre: radii [m] in steps of a quarter pixel, and the means.

    Parameters
    ----------
    frame : (ny, nx).
    x, y : centres of columns and rows [m].
    centre : of the circles [m]; the axis of the beam if left out.
    count : points on a circle; harmonics of the picture up to count - 1 average out.

    Raises
    ------
    ParameterError : the centre is outside the picture.

    Examples
    --------
    >>> axis = np.arange(-20, 21) * 0.1
    >>> radii, means = radial_profile(axis**2 + axis[:, None] ** 2, x=axis, y=axis)
    >>> round(float(means[40] / radii[40] ** 2), 6)
    1.0
    """
    frame, x, y = checked(frame, x, y)
    step = (x[1] - x[0]) / 4
    radii = np.arange(0, inscribed_radius(x, y, centre), step)
    return radii, means_on_circles(frame, x, y, centre=centre, radii=radii, count=count)


def ring_radius(frame: Any, *, x: Any, y: Any, centre: tuple[float, float] = _ON_AXIS) -> float:
    """Radius at which the mean irradiance over a circle is greatest [m]; 0 for a picture brightest at its centre.

    A parabola through the three means about the greatest one gives the place between them.

    Parameters
    ----------
    frame, x, y, centre : as in :func:`radial_profile`.

    Examples
    --------
    >>> axis = np.arange(-40, 41) * 0.05
    >>> r2 = axis**2 + axis[:, None] ** 2
    >>> round(ring_radius(r2 * np.exp(-2 * r2), x=axis, y=axis), 3)
    0.707
    """
    radii, means = radial_profile(frame, x=x, y=y, centre=centre)
    _power(means)
    top = int(np.argmax(means))
    if top in (0, len(means) - 1):
        return float(radii[top])
    before, at, after = means[top - 1 : top + 2]
    return float(radii[top] + (radii[1] - radii[0]) * (before - after) / (2 * (before - 2 * at + after)))


def fwhm(frame: Any, *, x: Any, y: Any, centre: tuple[float, float] = _ON_AXIS) -> float:
    """Diameter [m] outside which the mean over circles stays below half its greatest value; 1.1774 w for a Gaussian.

    Parameters
    ----------
    frame, x, y, centre : as in :func:`radial_profile`.

    Raises
    ------
    ParameterError : the picture has not fallen to a half inside the largest circle that fits.

    Examples
    --------
    >>> axis = np.arange(-40, 41) * 0.05
    >>> round(fwhm(np.exp(-2 * (axis**2 + axis[:, None] ** 2)), x=axis, y=axis), 3)
    1.177
    """
    radii, means = radial_profile(frame, x=x, y=y, centre=centre)
    half = means.max() / 2
    last = int(np.flatnonzero(means >= half)[-1])
    if last == len(means) - 1:
        raise ParameterError(
            "a half-maximum width needs the picture to fall to half inside the sensor",
            got=f"fwhm: {means[-1] / means.max():.2f} of the maximum at r = {lab_length(radii[-1])}",
            fix="fa.Camera(pixel=6.9*um, shape=(1024, 1024))",
        )
    share = (means[last] - half) / (means[last] - means[last + 1])
    return float(2 * (radii[last] + share * (radii[1] - radii[0])))
