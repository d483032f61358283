"""Pass: a run of uniform Jones laws becomes one matrix."""

from __future__ import annotations

from fastaxis.laws import AxisLaw, CircularLaw, ScalarLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import JonesStep, Step, Steps

__all__ = ["as_matrix", "fuse"]


def as_matrix(step: Step) -> JonesStep | None:
    """The matrix of a step that is the same everywhere in the plane, else None."""
    law = step.law
    if isinstance(law, JonesStep):
        return law
    if isinstance(law, AxisLaw | CircularLaw) and law.uniform:
        return JonesStep.of(law)
    if isinstance(law, ScalarLaw) and law.uniform:
        return JonesStep.scale(complex(law.transmission.value(NUMBERS)))
    return None


def _fuse(steps: Steps, _: float) -> Steps:
    out: list[Step] = []
    for step in steps:
        matrix = as_matrix(step)
        if matrix is None:
            out.append(step)
        elif out and isinstance(out[-1].law, JonesStep):
            out[-1] = out[-1].joined(step, out[-1].law.then(matrix))
        else:
            out.append(Step(step.names, matrix))
    return tuple(out)


def fuse(plan: Plan) -> Plan:
    """Neighbouring uniform laws (plates, polarizers, rotators, plain losses) become one 2x2 matrix."""
    return plan.rewritten(_fuse, "uniform plates fused into matrices")
