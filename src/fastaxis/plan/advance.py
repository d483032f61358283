"""Pass: Gaussian modes travel in closed form up to the first part that gives them another shape."""

from __future__ import annotations

import cmath
import math
from dataclasses import replace
from functools import reduce
from itertools import takewhile

from fastaxis.laws import Flip, TravelLaw
from fastaxis.light import Beam, Term
from fastaxis.light.modes.family import GaussFamily
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.plan import Branch, Plan
from fastaxis.plan.sampling import Sampling, turned_at
from fastaxis.plan.steps import Step, Steps

__all__ = ["advance", "carried"]


def advance(plan: Plan) -> Plan:
    """Light on samples is first sampled at the part that shapes it; its samples there are the same.

    Uniform matrices and reversals on the way commute with centred sections and are left. Light that nothing shapes is
    left to the samples that were asked for.
    """
    branches = tuple(map(_advanced, plan.branches))
    names = {name: None for branch in branches for name in branch.opening}
    if not names:
        return plan
    note = f"{', '.join(names)} in closed form: up to there the modes of the laser keep their shape"
    return replace(plan, branches=branches, notes=(*plan.notes, note), declared=plan.declared or plan.steps)


def _advanced(branch: Branch) -> Branch:
    steps = branch.steps
    if branch.sampling is None or branch.harmonic_steps:
        return branch
    leading = tuple(takewhile(_keeps_shape, steps))
    travels = [index for index, step in enumerate(leading) if isinstance(step.law, TravelLaw) and step.law.b != 0]
    if not travels or len(leading) == len(steps) or not all(_centred(term) for term in branch.beam.terms):
        return branch
    end = travels[-1] + 1
    moving, kept = _parted(steps[:end])
    section = reduce(TravelLaw.then, (step.law for step in moving if isinstance(step.law, TravelLaw)))
    beam = Beam(tuple(carried(term, section, branch.wavelength) for term in branch.beam.terms))
    names = tuple(dict.fromkeys(name for step in moving for name in step.names))
    sampling = _from(branch.sampling, end, len(kept))
    return replace(branch, beam=beam, steps=kept + steps[end:], sampling=sampling, opening=names)


def _keeps_shape(step: Step) -> bool:
    return isinstance(step.law, TravelLaw | Flip) or as_matrix(step) is not None


def _centred(term: Term) -> bool:
    return isinstance(term.mode, GaussFamily) and term.mode.centred


def _parted(steps: Steps) -> tuple[Steps, Steps]:
    moving = tuple(step for step in steps if isinstance(step.law, TravelLaw))
    return moving, tuple(step for step in steps if step not in moving)


def _from(sampling: Sampling, end: int, kept: int) -> Sampling:
    """The samples from behind step ``end`` on; what is left of the steps before acts there."""
    here, *rest = sampling.planes[end:]
    turned = turned_at(sampling.planes, end)
    return replace(sampling, turned=turned, planes=(replace(here, hop=None), *[replace(here, hop=None)] * kept, *rest))


def carried(term: Term, section: TravelLaw, wavelength: float) -> Term:
    """A mode behind a section: of the same family, with another waist elsewhere and a phase.

    With 1/q = 1/R + i wavelength/(pi w^2) of the source and s = a + b/q, the width is w |s|, 1/q behind is
    (c + d/q)/s, and each of degree + 1 Gouy phases grows by arg s. A. E. Siegman, Lasers (1986), section 20.4.
    """
    mode = term.mode
    assert isinstance(mode, GaussFamily)
    w = mode.width(wavelength)
    before = mode.curvature(wavelength) + 1j * wavelength / (math.pi * w**2)
    stretch = section.a + section.b * before
    after = (section.c + section.d * before) / stretch
    # 1/q = 1/(z - i z_R): its inverse gives the place of the waist and the Rayleigh range.
    waist, reach = 1 / after, -(1 / after).imag
    behind = replace(mode, waist=math.sqrt(wavelength * reach / math.pi), waist_at=-waist.real)
    turn = mode.gouy(wavelength) + cmath.phase(stretch) - behind.gouy(wavelength)
    return replace(term, amplitude=term.number * cmath.exp(-1j * (mode.degree + 1) * turn), mode=behind)
