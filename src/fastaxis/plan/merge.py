"""Pass: lenses become ray matrices, and neighbouring ray matrices one section."""

from __future__ import annotations

import math
from dataclasses import replace

from fastaxis.laws import ScalarLaw, TravelLaw
from fastaxis.plan.plan import Plan
from fastaxis.plan.steps import Step, Steps

__all__ = ["merge", "split_lens"]


def split_lens(law: ScalarLaw, wavelength: float) -> tuple[ScalarLaw, TravelLaw]:
    """A lens as what is left of its scalar law and a lens centred on the axis.

    With v = 1/f, centre c and s = r - c:  -k v |s|^2 / 2 = -k v |r|^2 / 2 + k v c.s + k v |c|^2 / 2,
    so an off-centre lens is a centred one, a tilt by v c (counted from the centre) and a fixed phase.
    """
    v, (x, y), (tx, ty) = law.vergence, law.centre, law.tilt
    phase = math.pi / wavelength * v * (x * x + y * y)
    transmission = law.transmission if phase == 0 else replace(law.transmission, phase=law.transmission.phase + phase)
    rest = replace(law, transmission=transmission, vergence=0.0, tilt=(tx + v * x, ty + v * y))
    return rest, TravelLaw.lens(v)


def _lenses(steps: Steps, wavelength: float) -> Steps:
    out: list[Step] = []
    for step in steps:
        law = step.law
        if isinstance(law, ScalarLaw) and law.vergence != 0:
            rest, lens = split_lens(law, wavelength)
            if not (rest.uniform and rest.transmission.values == (1.0, 0.0)):
                out.append(Step(step.names, rest))
            out.append(Step(step.names, lens))
        else:
            out.append(step)
    return tuple(out)


def _travels(steps: Steps) -> Steps:
    out: list[Step] = []
    for step in steps:
        if out and isinstance(step.law, TravelLaw) and isinstance(out[-1].law, TravelLaw):
            out[-1] = out[-1].joined(step, out[-1].law.then(step.law))
        else:
            out.append(step)
    return tuple(out)


def merge(plan: Plan) -> Plan:
    """Free spaces and lenses between the same two plates become one ABCD section, done with one transform."""
    return plan.rewritten(lambda s, w: _travels(_lenses(s, w)), "spaces and lenses merged into ABCD sections")
