"""Pass: reversals and turns of the picture move to the end, where pairs of them cancel."""

from __future__ import annotations

from dataclasses import replace

from fastaxis.laws import Amplitude, AxisLaw, Flip, ScalarLaw, Turn
from fastaxis.maths import NUMBERS, Pattern, Value
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import Step, StepLaw, Steps
from fastaxis.plan.turning import seen_before_turn

__all__ = ["gather_flips", "seen_before_flip"]

PI = 3.141592653589793


def _mirrored(value: Value, axis: str) -> Value:
    return value.mirrored(axis) if isinstance(value, Pattern) else value


def seen_before_flip(law: StepLaw, axis: str) -> StepLaw:
    """The law that, met before a flip of places, does what ``law`` does after it.

    Only places are reversed: an axis at q*phi + alpha stands where phi is pi - phi' (x reversed) or -phi'
    (y reversed), so at -q*phi' + alpha (+ q*pi). The (x, y) components of the field keep their names.
    """
    if isinstance(law, ScalarLaw):
        return law.mirrored(axis)
    if isinstance(law, AxisLaw) and not law.uniform:
        x, y = law.centre
        angle = _mirrored(law.angle, axis)
        if axis == "x" and law.order != 0:
            angle = angle + law.order * PI
        along, across = (Amplitude(*(_mirrored(v, axis) for v in t.values)) for t in (law.along, law.across))
        centre = (-x, y) if axis == "x" else (x, -y)
        return replace(law, along=along, across=across, angle=angle, order=-law.order, centre=centre)
    return law


def _gather(steps: Steps, _: float) -> Steps:
    flips: dict[str, Step] = {}
    turn: Step | None = None  # a turn that is still to be done, before the flips
    out: list[Step] = []
    for step in steps:
        if isinstance(step.law, Flip):
            axis = step.law.axis
            if axis in flips:
                del flips[axis]
            else:
                flips[axis] = step
            continue
        if isinstance(step.law, Turn):
            turn = _added(turn, step, -1 if len(flips) == 1 else 1)
            continue
        law: StepLaw = step.law
        for axis in flips:
            law = seen_before_flip(law, axis)
        if turn is not None and isinstance(turn.law, Turn):
            earlier = seen_before_turn(law, turn.law.angle)
            if earlier is None:
                out.append(turn)
                turn = None
            else:
                law = earlier
        out.append(Step(step.names, law))
    return (*out, *([] if turn is None else [turn]), *flips.values())


def _added(turn: Step | None, step: Step, sense: int) -> Step | None:
    """A turn and one more, met through flips that leave or reverse its sense; None once they make whole turns."""
    angle = sense * step.law.angle  # type: ignore[union-attr]  # a Turn, by the caller
    if turn is not None:
        angle, step = angle + turn.law.angle, turn.joined(step, turn.law)  # type: ignore[union-attr]  # both Turns
    return None if NUMBERS.phasor(angle) == 1 else Step(step.names, Turn(angle))


def gather_flips(plan: Plan) -> Plan:
    """Reflections reverse the picture once at the end, so that the paths before and after a mirror can be merged.

    Turns of the picture go there too, up to the first pattern or stop that a turned law can't describe.
    """
    return plan.rewritten(_gather, "frame changes of reflections gathered at the end")
