"""The radius of a bright ring."""

from __future__ import annotations

from typing import Any

from fastaxis.analysis.widths import ring_radius as radius_of
from fastaxis.camera.settings import no_analyzer
from fastaxis.testing.asked import a_place, at_least, positive
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train
from fastaxis.testing.words import microns

__all__ = ["ring_radius"]


@about_a_train
def ring_radius(
    train: Any,
    camera: str,
    radius: float,
    *,
    within: float = 0.02,
    behind: Any = None,
    centre: tuple[float, float] = (0.0, 0.0),
) -> None:
    """The circle of greatest mean brightness has this radius; 0 for a spot.

    Parameters
    ----------
    train : the bench.
    camera : that looks.
    radius : expected [m].
    within : relative deviation that is still good; of a pixel where the radius is 0.
    behind : analyzer or state in front of the camera, if any.
    centre : of the circles [m].

    Raises
    ------
    BenchError : the ring is wider, narrower, or a spot.
    ParameterError : a radius that is negative or no number; a deviation that is not positive.
    """
    radius = at_least("ring_radius", "radius", radius, 0.0, fix="90*um")
    within, centre = positive("ring_radius", "within", within, fix="within=0.02"), a_place("ring_radius", centre)
    setting = no_analyzer() if behind is None else behind

    def found(shots: Any) -> float:
        seen = shots.upright
        return radius_of(seen.frame(0), x=seen.x, y=seen.y, centre=centre)

    hold(
        train,
        Claim(
            camera,
            f"a ring of {microns(radius)} within {100 * within:g} %",
            lambda shots: f"a ring of {microns(found(shots))}" if found(shots) else "a spot, brightest in the middle",
            lambda shots: abs(found(shots) - radius) / (within * (radius or shots.pixel)),
            "shots",
            (setting,),
        ),
    )
