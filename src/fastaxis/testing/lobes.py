"""Lobes of a picture, in the beam's own frame: how many, where, and how they turn."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from typing import Any

from fastaxis.analysis.lobes import Lobes, lobes
from fastaxis.analysis.turning import turning as turning_of
from fastaxis.errors import ParameterError
from fastaxis.light import linear
from fastaxis.testing.asked import a_place, an_angle, at_least, positive, real, slack, whole
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train
from fastaxis.testing.words import degrees

__all__ = ["lobe_angle", "lobe_count", "turning"]

ON_AXIS = (0.0, 0.0)
DEGREE = math.radians(1)
TURNED = tuple(linear(math.radians(angle)) for angle in (0, 15, 30, 45, 60))


@about_a_train
def lobe_count(train: Any, camera: str, count: int, *, behind: Any, centre: tuple[float, float] = ON_AXIS) -> None:
    """The number of bright lobes about a centre; 0 for a round picture.

    Parameters
    ----------
    train : the bench.
    camera : that looks.
    count : expected.
    behind : analyzer or state in front of the camera.
    centre : about which is counted [m].

    Raises
    ------
    BenchError : there are more or fewer.
    ParameterError : a count that is negative or not whole.
    """
    count, centre = whole("lobe_count", "count", count, fix="2"), a_place("lobe_count", centre)
    at_least("lobe_count", "count", count, 0, fix="2")

    def found(shots: Any) -> int:
        return _lobes(shots, centre).count

    hold(
        train,
        Claim(
            camera,
            f"{count} lobes",
            lambda shots: f"{found(shots)} lobes behind {shots.labels[0]}",
            lambda shots: 2.0 * abs(found(shots) - count),
            "shots",
            (behind,),
        ),
    )


@about_a_train
def lobe_angle(
    train: Any, camera: str, angle: float, *, behind: Any, within: float = DEGREE, centre: tuple[float, float] = ON_AXIS
) -> None:
    """A bright lobe stands at this angle.

    Parameters
    ----------
    train : the bench.
    camera : that looks.
    angle : expected [rad], counter-clockwise from x.
    behind : analyzer or state in front of the camera.
    within : deviation that is still good [rad].
    centre : about which lobes are counted [m].

    Raises
    ------
    BenchError : no lobe stands there.
    ParameterError : an angle that is no number, or was meant in degrees.
    """
    angle, within = an_angle("lobe_angle", "angle", angle), slack("lobe_angle", within)
    centre = a_place("lobe_angle", centre)

    def misfit(shots: Any) -> float:
        found = _lobes(shots, centre)
        if not found.count:
            return math.inf
        spacing = 2 * math.pi / found.count
        return abs((found.angle - angle + spacing / 2) % spacing - spacing / 2) / within

    def told(shots: Any) -> str:
        found = _lobes(shots, centre)
        if not found.count:
            return "no lobes"
        every = f" and every {360 / found.count:g} deg" if found.count > 1 else ""
        return f"{found.count} lobes, at {degrees(found.angle)}{every}"

    hold(train, Claim(camera, f"a lobe at {degrees(angle)} within {degrees(within)}", told, misfit, "shots", (behind,)))


@about_a_train
def turning(
    train: Any,
    camera: str,
    rate: float,
    *,
    within: float = 0.05,
    analyzers: Sequence[Any] = TURNED,
    centre: tuple[float, float] = ON_AXIS,
) -> None:
    """How fast, and which way, the lobes turn with a linear analyzer.

    Parameters
    ----------
    train : the bench.
    camera : that looks.
    rate : angle of the lobes per angle of the analyzer; +1 turns with it, -1 against it.
    within : deviation of the rate that is still good.
    analyzers : linear states in steps well below half the spacing of the lobes.
    centre : about which lobes are counted [m].

    Raises
    ------
    BenchError : they turn at another rate, or there are none.
    ParameterError : a rate that is no number; a deviation that is not positive; fewer than two analyzers.
    """
    rate = real("turning", "rate", rate, fix="+1")
    within, centre = positive("turning", "within", within, fix="within=0.05"), a_place("turning", centre)
    if not isinstance(analyzers, Iterable) or len(tuple(analyzers)) < 2:
        raise ParameterError(
            "lobes turn from one analyzer to the next",
            got=f"turning: analyzers = {analyzers!r:.60}",
            fix="analyzers=[fa.linear(0*deg), fa.linear(15*deg)]",
        )

    def misfit(shots: Any) -> float:
        return abs(turning_of(shots, centre=centre).rate - rate) / within

    def told(shots: Any) -> str:
        try:
            found = turning_of(shots, centre=centre)
        except ParameterError as error:
            return error.got
        sense = "with" if found.rate > 0 else "against"
        return f"{found.lobes} lobes turning {sense} the analyzer, {found.rate:+.3g} to one"

    sense = "with" if rate > 0 else "against"
    expected = f"lobes turning {sense} the analyzer, {rate:+.3g} to one"
    hold(train, Claim(camera, expected, told, _or_bad(misfit), "shots", tuple(analyzers)))


def _lobes(shots: Any, centre: tuple[float, float]) -> Lobes:
    """In the beam's own frame, however the camera is mounted; none where there is no light but roundings."""
    if shots.is_dark(0):
        return Lobes(0, math.nan, 0.0)
    seen = shots.upright
    return lobes(seen.frame(0), x=seen.x, y=seen.y, centre=centre)


def _or_bad(misfit: Any) -> Any:
    """The misfit, or infinity where there are no lobes to follow."""

    def safe(shots: Any) -> float:
        try:
            return float(misfit(shots))
        except ParameterError:
            return math.inf

    return safe
