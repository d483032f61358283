"""The index of a singular point of the polarization pattern."""

from __future__ import annotations

import math
from typing import Any

from fastaxis.analysis.singular import polarization_index
from fastaxis.camera.settings import no_analyzer
from fastaxis.errors import ParameterError
from fastaxis.testing.asked import a_place, positive, real, whole
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train

__all__ = ["singular_index"]


@about_a_train
def singular_index(
    train: Any, camera: str, index: float, *, radius: float, centre: tuple[float, float] = (0.0, 0.0)
) -> None:
    """Turns of the polarization ellipse along a circle: +1 radial or azimuthal, -1 its counterpart, 1/2 lemon, 0 none.

    Parameters
    ----------
    train : the bench.
    camera : that looks, however it is mounted.
    index : expected, a multiple of 1/2.
    radius, centre : of the circle [m].

    Raises
    ------
    BenchError : the index is another, or the circle crosses darkness or circular light.
    ParameterError : an index that is no multiple of 1/2; a radius that is not positive.
    """
    whole("singular_index", "twice the index", 2 * real("singular_index", "index", index, fix="+1"), fix="+1/2")
    radius, centre = positive("singular_index", "radius", radius, fix="radius=80*um"), a_place("singular_index", centre)

    def found(shots: Any) -> float | str:
        seen = shots.upright  # a mirrored picture flips the places alone
        try:
            return polarization_index(seen.stokes, x=seen.x, y=seen.y, radius=radius, centre=centre)
        except ParameterError as error:
            return f"no index: {error.rule}"

    def misfit(shots: Any) -> float:
        got = found(shots)
        return math.inf if isinstance(got, str) else 4 * abs(got - index)

    def told(shots: Any) -> str:
        got = found(shots)
        return got if isinstance(got, str) else f"index {got:+g}"

    hold(train, Claim(camera, f"index {index:+g}", told, misfit, "shots", (no_analyzer(),)))
