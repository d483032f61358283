"""Pass for a question about power alone: what follows the last loss is left out."""

from __future__ import annotations

from fastaxis.laws import Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import Steps

__all__ = ["drop_trailing"]


def _trim(steps: Steps, _: float) -> Steps:
    kept = list(steps)
    while kept:
        law = kept[-1].law
        phase_only = isinstance(law, ScalarLaw) and law.stop is None and law.transmission.power == 1
        if not (phase_only or isinstance(law, TravelLaw | Flip | Turn)):
            break
        kept.pop()
    return tuple(kept)


def drop_trailing(plan: Plan) -> Plan:
    """Travel, flips, turns and pure phases after the last loss change no power; ask only of plans for total power."""
    return plan.rewritten(_trim, "lossless end left out: only power is asked for")
