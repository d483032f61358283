"""Laws met before a turn of the picture in place of behind it."""

from __future__ import annotations

from dataclasses import replace

from fastaxis.laws import AxisLaw, ScalarLaw
from fastaxis.maths import NUMBERS, Pattern
from fastaxis.plan.steps import StepLaw

__all__ = ["seen_before_turn", "turned"]

Pair = tuple[float, float]


def turned(place: Pair, angle: float) -> Pair:
    """A place or direction turned counter-clockwise by an angle [rad]."""
    (x, y), cosine, sine = place, NUMBERS.cos(angle), NUMBERS.sin(angle)
    return cosine * x - sine * y, sine * x + cosine * y


def seen_before_turn(law: StepLaw, angle: float) -> StepLaw | None:
    """The law that, met before a turn of places, does what ``law`` does after it; None if no law says that.

    Only places turn: what stood at r is met at R(-angle) r, so phi there is phi - angle and an axis at q*phi + alpha
    becomes one at q*phi + alpha + q*angle about a turned centre. The components (Ex, Ey) keep their names. Patterns
    and stops that are not round can't be turned.
    """
    if isinstance(law, AxisLaw) and not law.uniform:
        if any(isinstance(value, Pattern) for value in law.values):
            return None
        return replace(law, angle=law.angle + law.order * angle, centre=turned(law.centre, -angle))
    if isinstance(law, ScalarLaw):
        if not law.transmission.uniform or not (law.stop is None or getattr(law.stop, "round", False)):
            return None
        phase = law.transmission.phase + law.charge * angle
        return replace(
            law,
            transmission=replace(law.transmission, phase=phase),
            tilt=turned(law.tilt, -angle),
            centre=turned(law.centre, -angle),
        )
    return law
