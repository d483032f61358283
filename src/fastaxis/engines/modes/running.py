"""A branch of a plan whose light keeps its shape."""

from __future__ import annotations

import math
from typing import Any

import numpy as np

from fastaxis.engines.modes.summing import ModeSum, combined
from fastaxis.engines.modes.waves import Waves
from fastaxis.laws import Flip, TravelLaw
from fastaxis.plan import Branch, JonesStep

__all__ = ["run"]


def run(branch: Branch) -> ModeSum:
    """The light of a branch at its target.

    Behind a ray matrix a mode has w' = w |s| and its Gouy phase is arg s larger for each of its N = degree + 1, with
    s = a + b (1/R + i wavelength/(pi w^2)) of the source; a negative a turns it over, which that phase has in it.
    A. E. Siegman, Lasers (1986), section 20.4.
    """
    matrix, section, senses = np.eye(2, dtype=complex), TravelLaw(), {"x": 1, "y": 1}
    for step in branch.steps:
        if isinstance(step.law, JonesStep):
            matrix = np.array(step.law.matrix) @ matrix
        elif isinstance(step.law, TravelLaw):
            section = section.then(step.law)
        elif isinstance(step.law, Flip):
            senses[step.law.axis] *= -1
    scale = branch.beam.scale(branch.wavelength) * math.sqrt(branch.power)
    parts = [
        _wave(term.mode, scale * term.number * (matrix @ term.state.jones), section, senses, branch.wavelength)
        for term in branch.beam.terms
    ]
    return combined(parts, np.ones(len(parts), dtype=complex))


def _wave(mode: Any, jones: Any, section: TravelLaw, senses: dict[str, int], wavelength: float) -> ModeSum:
    w = mode.width(wavelength)
    before = mode.curvature(wavelength) + 1j * wavelength / (math.pi * w**2)  # 1/q
    stretch = section.a + section.b * before
    after = (section.c + section.d * before) / stretch
    width = w * abs(stretch)
    gouy = (mode.degree + 1) * (mode.gouy(wavelength) + math.atan2(stretch.imag, stretch.real))
    exponent = 1 / width**2 - 1j * math.pi / wavelength * after.real
    waves = Waves(
        mode,
        (senses["x"], senses["y"]),
        np.array([width]),
        np.array([exponent]),
        np.asarray(jones * np.exp(-1j * gouy))[np.newaxis],
    )
    return ModeSum(wavelength, (waves,))
