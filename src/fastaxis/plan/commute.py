"""Pass: uniform Jones laws move towards the source, past everything that treats both polarizations alike."""

from __future__ import annotations

from fastaxis.laws import AxisLaw, CircularLaw
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import Step, Steps

__all__ = ["commute"]


def _commute(steps: Steps, _: float) -> Steps:
    out: list[Step] = []
    stretch = 0  # first place after the last law that mixes polarization with place
    matrices = 0  # uniform laws already gathered there
    for step in steps:
        if as_matrix(step) is not None:
            out.insert(stretch + matrices, step)
            matrices += 1
        else:
            out.append(step)
            if isinstance(step.law, AxisLaw | CircularLaw):
                stretch, matrices = len(out), 0
    return tuple(out)


def commute(plan: Plan) -> Plan:
    """Uniform laws gather at the start of each stretch between patterned plates.

    A matrix that is the same everywhere acts on (Ex, Ey); scalar laws and travel act on places; so their order does
    not matter. A reflection's change of frame moves places only (its polarization part is a law of its own), so a
    matrix passes it unchanged too. They gather early rather than late because a polarizer met early leaves one
    scalar field to propagate where two components were.
    """
    return plan.rewritten(_commute, "uniform plates moved up to the last patterned plate")
