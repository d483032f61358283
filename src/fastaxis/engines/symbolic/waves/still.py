"""A mode without a closed form of travel: known in the plane of the source only."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from fastaxis.engines.symbolic.coordinates import R
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.waves.base import Place, Section, Wave

__all__ = ["StillWave"]


@dataclass(frozen=True)
class StillWave:
    """A round function of r (a plane wave, a flat top): exact as long as it does not travel.

    Parameters
    ----------
    shape : sympy expression in r [1/m].
    """

    shape: Any
    total = 0
    """Its charge."""

    def moved(self, section: Section) -> Wave:
        if not self.shape.has(R) and section.c == 0 and section.a == 1:
            return self  # a plane wave
        return self.twisted(0, section)

    def twisted(self, charge: Any, section: Section) -> Wave:
        from fastaxis.engines.symbolic.waves.integral import IntegralWave  # noqa: PLC0415  # each is made of the other

        return IntegralWave(self, charge, section)

    def flipped(self, axis: str) -> tuple[Any, StillWave]:
        return 0, self

    def poly(self, place: Place) -> Poly:
        if not self.shape.has(R):
            return place.maths.number(self.shape)
        return place.maths.ring.amplitude(place.letters.name("u", self.shape))
