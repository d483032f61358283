"""Pass: neighbouring scalar laws with the same centre become one."""

from __future__ import annotations

from fastaxis.laws import UNIT, Amplitude, ScalarLaw
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import Step, Steps

__all__ = ["multiply", "product"]


def _transmission(first: Amplitude, second: Amplitude) -> Amplitude | None:
    if first == UNIT:
        return second
    if second == UNIT:
        return first
    return first.times(second) if first.uniform and second.uniform else None


def product(first: ScalarLaw, second: ScalarLaw) -> ScalarLaw | None:
    """One scalar law for two met in the same plane, or None where one law cannot say both."""
    transmission = _transmission(first.transmission, second.transmission)
    if first.centre != second.centre or transmission is None or (first.stop and second.stop):
        return None
    (ax, ay), (bx, by) = first.tilt, second.tilt
    return ScalarLaw(
        transmission,
        first.charge + second.charge,
        first.vergence + second.vergence,
        (ax + bx, ay + by),
        first.stop or second.stop,
        first.centre,
    )


def _multiply(steps: Steps, _: float) -> Steps:
    out: list[Step] = []
    for step in steps:
        if out and isinstance(step.law, ScalarLaw) and isinstance(out[-1].law, ScalarLaw):
            both = product(out[-1].law, step.law)
            if both is not None:
                out[-1] = out[-1].joined(step, both)
                continue
        out.append(step)
    return tuple(out)


def multiply(plan: Plan) -> Plan:
    """Masks, wedges, spiral plates and stops in one plane are multiplied out once."""
    return plan.rewritten(_multiply, "scalar parts in one plane multiplied")
