"""The polarization at a port."""

from __future__ import annotations

import math
from typing import Any

import numpy as np

from fastaxis.errors import ParameterError
from fastaxis.light.stokes import degree_of_polarization, ellipse
from fastaxis.testing.asked import an_angle, slack
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train
from fastaxis.testing.words import degrees

__all__ = ["state_at"]

HALF_DEGREE = math.radians(0.5)
ROUND = 0.01  # |S3|/S0 below which light has no hand to speak of, and |(S1, S2)|/S0 below which it has no long axis
QUARTER = math.pi / 4
ROUNDINGS = 1e-12  # of 45*deg, with room to spare


@about_a_train
def state_at(
    train: Any,
    port: str,
    *,
    azimuth: float | None = None,
    ellipticity: float | None = None,
    helicity: int | None = None,
    within: float = HALF_DEGREE,
) -> None:
    """The polarization of all light at a port taken together; what is left out may be anything.

    Parameters
    ----------
    train : the bench.
    port : port, camera or detector.
    azimuth : of the long axis [rad], counter-clockwise from x facing the source; circular and unpolarized light have
        none, and fail.
    ellipticity : [rad], -45 to 45 deg, positive for right-handed light.
    helicity : +1 or -1; right-handed light as the receiver sees it has -1.
    within : deviation of the angles that is still good [rad].

    Raises
    ------
    BenchError : it is another state, or dark.
    ParameterError : nothing is expected, or what no light can be: an azimuth of circular light, an ellipticity beyond
        45 deg, a helicity other than 1 and -1; an angle meant in degrees.
    """
    if azimuth is None and ellipticity is None and helicity is None:
        raise ParameterError(
            "a state is expected by its azimuth, its ellipticity or its helicity",
            got=f"state_at: nothing expected at {port}",
            fix=f'state_at(train, "{port}", azimuth=45*deg)',
        )

    within = slack("state_at", within)
    if azimuth is not None:
        azimuth = an_angle("state_at", "azimuth", azimuth)
    if ellipticity is not None:
        ellipticity = _ellipticity(ellipticity, azimuth)
    if helicity is not None and helicity not in (1, -1):
        raise ParameterError(
            "helicity is +1 or -1; right-handed light as the receiver sees it has -1",
            got=f"state_at: helicity = {helicity!r}",
            fix="helicity=-1",
        )

    def misfit(stokes: Any) -> float:
        found_azimuth, found_ellipticity = map(float, ellipse(stokes))
        off = [0.0] if stokes[0] > 0 else [math.inf]
        if azimuth is not None:
            apart = abs((found_azimuth - azimuth + math.pi / 2) % math.pi - math.pi / 2) / within
            off.append(apart if _has_axis(stokes) else 2.0)
        if ellipticity is not None:
            off.append(abs(found_ellipticity - ellipticity) / within)
        if helicity is not None and -stokes[3] * helicity <= ROUND * stokes[0]:
            off.append(2.0)
        return max(off)

    wanted = [
        *([f"azimuth {degrees(azimuth)}"] if azimuth is not None else []),
        *([f"ellipticity {degrees(ellipticity)}"] if ellipticity is not None else []),
        *([f"helicity {helicity:+d}"] if helicity is not None else []),
    ]
    hold(train, Claim(port, f"{', '.join(wanted)} within {degrees(within)}", _told, misfit))


def _ellipticity(value: Any, azimuth: float | None) -> float:
    ellipticity = an_angle("state_at", "ellipticity", value)
    if abs(ellipticity) > QUARTER + ROUNDINGS:
        raise ParameterError(
            "an ellipticity lies between -45 and 45 deg",
            got=f"state_at: ellipticity = {degrees(ellipticity)}",
            fix="ellipticity=45*deg",
        )
    if azimuth is not None and abs(ellipticity) > QUARTER - ROUNDINGS:
        raise ParameterError(
            "circular light has no long axis, so no azimuth",
            got=f"state_at: ellipticity = {degrees(ellipticity)}, azimuth = {degrees(azimuth)}",
            fix=f"ellipticity={math.degrees(ellipticity):g}*deg",
        )
    return ellipticity


def _has_axis(stokes: Any) -> bool:
    return bool(math.hypot(stokes[1], stokes[2]) > ROUND * stokes[0])


def _told(stokes: Any) -> str:
    if not stokes[0] > 0:
        return "no light"
    azimuth, ellipticity = map(float, ellipse(stokes))
    hand = f"helicity {-int(np.sign(stokes[3])):+d}" if abs(stokes[3]) > ROUND * stokes[0] else "no helicity"
    degree = float(degree_of_polarization(stokes))
    axis = f"azimuth {degrees(azimuth)}" if _has_axis(stokes) else "no azimuth"
    return f"{axis}, ellipticity {degrees(ellipticity)}, {hand}, {100 * degree:.4g} % polarized"
