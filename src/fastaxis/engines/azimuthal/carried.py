"""Gaussian modes through the sections before anything shapes the light: no integral, and few panels."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace

import numpy as np

from fastaxis.engines.azimuthal.panels import Reals
from fastaxis.laws import AxisLaw, CircularLaw, Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.light import Term
from fastaxis.light.modes.family import GaussFamily
from fastaxis.plan import JonesStep
from fastaxis.plan.steps import Step, Steps

__all__ = ["edges_for", "gathered"]


def gathered(terms: Sequence[Term], steps: Steps) -> tuple[TravelLaw, Steps]:
    """The section that the modes of a beam keep their shape through, and the other steps, in order.

    Plates of one matrix, reversals and turns may change places with a centred section.
    """
    section, left = TravelLaw(), list[Step]()
    if not all(isinstance(term.mode, GaussFamily) and term.mode.centred for term in terms):
        return section, steps
    for place, step in enumerate(steps):
        law = step.law
        if isinstance(law, TravelLaw):
            section = section.then(law)
        elif isinstance(law, ScalarLaw) and law.stop is None and not law.charge and law.transmission.uniform:
            section = section.then(TravelLaw.lens(law.vergence))
            left.append(replace(step, law=replace(law, vergence=0.0)))
        elif isinstance(law, JonesStep | CircularLaw | Flip | Turn) or (isinstance(law, AxisLaw) and law.uniform):
            left.append(step)
        else:
            return section, (*left, *steps[place:])
    return section, tuple(left)


def edges_for(modes: Sequence[GaussFamily], wavelength: float, dark: float) -> Reals:
    """Panels out to where all modes are below a share ``dark`` of their peak.

    H_n(sqrt2 x)/sqrt(2^n n!) and the polynomials of Laguerre-Gauss modes stay below (4 x^2)^(n/2) out there, n being
    the degree. Two panels of 32 nodes carry a Gaussian beam; eight more zeros of the polynomial take another one.
    """
    falling, degree = -math.log(dark), max(mode.degree for mode in modes)
    reach = math.sqrt(falling + degree / 2 * math.log(4 * (falling + 2 * degree)))
    width = max(mode.width(wavelength) for mode in modes)
    return np.linspace(0, reach * width, 3 + math.ceil(degree / 8))
