"""Pass: the frame changes of reflections move to the end, where pairs of them cancel."""

from __future__ import annotations

from dataclasses import replace

from fastaxis.laws import Amplitude, AxisLaw, Flip, ScalarLaw
from fastaxis.maths import Pattern, Value
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import Step, StepLaw, Steps

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
    out: list[Step] = []
    for step in steps:
        if isinstance(step.law, Flip):
            axis = step.law.axis
            if axis in flips:
                del flips[axis]
            else:
                flips[axis] = step
            continue
        law: StepLaw = step.law
        for axis in flips:
            law = seen_before_flip(law, axis)
        out.append(Step(step.names, law))
    return (*out, *flips.values())


def gather_flips(plan: Plan) -> Plan:
    """Reflections reverse the picture once at the end, so that the paths before and after a mirror can be merged."""
    return plan.rewritten(_gather, "frame changes of reflections gathered at the end")
