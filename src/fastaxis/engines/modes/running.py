"""A branch of a plan whose light keeps its shape."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.modes.summing import ModeSum, combined
from fastaxis.engines.modes.waves import Waves
from fastaxis.laws import Flip, TravelLaw
from fastaxis.plan import Branch, JonesStep
from fastaxis.plan.displacement import Displacement

__all__ = ["run"]


@dataclass
class _Way:
    """What the steps of a branch do together, in this order."""

    wavelength: float
    matrix: NDArray[np.complex128] = field(default_factory=lambda: np.eye(2, dtype=complex))
    section: TravelLaw = field(default_factory=TravelLaw)
    senses: dict[str, int] = field(default_factory=lambda: {"x": 1, "y": 1})
    displacement: Displacement = field(default_factory=Displacement)

    @classmethod
    def of(cls, branch: Branch) -> _Way:
        way = cls(branch.wavelength)
        for step in branch.steps:
            law = step.law
            if isinstance(law, JonesStep):
                way.matrix = np.array(law.matrix) @ way.matrix
            elif isinstance(law, TravelLaw):
                way.section, way.displacement = way.section.then(law), way.displacement.through(law)
            elif isinstance(law, Flip):
                way.senses[law.axis] *= -1
                way.displacement = way.displacement.reversed(law.axis)
            elif isinstance(law, Displacement):
                way.displacement = way.displacement.then(law)
        return way

    def middle(self, centre: tuple[Any, Any]) -> Displacement:
        """Where light arrives that began at a place beside the axis, and how it is tilted."""
        begun = Displacement((float(centre[0]), float(centre[1]))).through(self.section)
        for axis in (axis for axis, sense in self.senses.items() if sense < 0):
            begun = begun.reversed(axis)
        return begun.then(self.displacement)


def run(branch: Branch) -> ModeSum:
    """The light of a branch at its target.

    Behind a ray matrix a mode has w' = w |s| and its Gouy phase is arg s larger for each of its N = degree + 1, with
    s = a + b (1/R + i wavelength/(pi w^2)) of the source; a negative a turns it over, which that phase has in it.
    A. E. Siegman, Lasers (1986), section 20.4. Beside the axis it is the same about the place where a ray arrives.
    """
    way, scale = _Way.of(branch), branch.beam.scale(branch.wavelength) * math.sqrt(branch.power)
    parts = [_wave(term.mode, scale * term.number * (way.matrix @ term.state.jones), way) for term in branch.beam.terms]
    return combined(parts, np.ones(len(parts), dtype=complex))


def _wave(mode: Any, jones: Any, way: _Way) -> ModeSum:
    w, section, wavelength = mode.width(way.wavelength), way.section, way.wavelength
    before = mode.curvature(wavelength) + 1j * wavelength / (math.pi * w**2)  # 1/q
    stretch = section.a + section.b * before
    after = (section.c + section.d * before) / stretch
    width = w * abs(stretch)
    gouy = (mode.degree + 1) * (mode.gouy(wavelength) + math.atan2(stretch.imag, stretch.real))
    exponent = 1 / width**2 - 1j * math.pi / wavelength * after.real
    middle, k = way.middle(mode.centre), 2 * math.pi / wavelength
    (x, y), (tx, ty) = middle.offset, middle.tilt
    phase = k * (middle.path + (x * tx + y * ty) / 2) - gouy  # counted from the middle, no longer from half way
    waves = Waves(
        mode,
        (way.senses["x"], way.senses["y"]),
        np.array([width]),
        np.array([exponent]),
        np.asarray(jones * np.exp(1j * phase))[np.newaxis],
        np.array([middle.offset]),
        k * np.array([middle.tilt]),
    )
    return ModeSum(wavelength, (waves,))
