"""What every transverse wave answers, and the ray matrix of a section with exact entries."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Protocol

import sympy as sp

from fastaxis.engines.symbolic.letters import Letters
from fastaxis.engines.symbolic.ring import ExactMaths, Poly
from fastaxis.engines.symbolic.ring.numerals import exact
from fastaxis.laws import TravelLaw

__all__ = ["Place", "Section", "Wave", "exactly"]


def exactly(value: Any) -> Any:
    """A number or expression with exact numbers in it.

    >>> exactly(0.5), exactly(532e-9)
    (1/2, 133/250000000)
    """
    if not isinstance(value, sp.Basic):
        number = exact(float(value))
        return sp.Rational(number.numerator, number.denominator)
    floats = {f: exactly(float(f)) for f in value.atoms(sp.Float)}
    return value.xreplace(floats) if floats else value


@dataclass(frozen=True)
class Place:
    """Where waves are written down: the ring, the names given away, the wave number.

    Parameters
    ----------
    wavelength : [m], exact.
    """

    maths: ExactMaths
    letters: Letters
    wavelength: Any

    @property
    def wave_number(self) -> Any:
        """Wave number k = 2 pi/wavelength [1/m]."""
        return 2 * sp.pi / self.wavelength


@dataclass(frozen=True)
class Section:
    """Ray matrix ((a, b), (c, d)) with exact entries."""

    a: Any = sp.S.One
    b: Any = sp.S.Zero
    c: Any = sp.S.Zero
    d: Any = sp.S.One

    @classmethod
    def of(cls, law: TravelLaw) -> Section:
        """The exact section of a law."""
        return cls(*(exactly(value) for value in (law.a, law.b, law.c, law.d)))

    def then(self, later: Section) -> Section:
        """This section followed by a later one; entries are simplified so that an image plane has b = 0 exactly."""
        rows = (
            later.a * self.a + later.b * self.c,
            later.a * self.b + later.b * self.d,
            later.c * self.a + later.d * self.c,
            later.c * self.b + later.d * self.d,
        )
        return Section(*(sp.cancel(entry) for entry in rows))


class Wave(Protocol):
    """A scalar function of the plane."""

    @property
    def total(self) -> Any:
        """Turns of phase per turn of phi; None for a wave that is no function of r alone times such a phase."""

    def moved(self, section: Section) -> Wave:
        """Behind a section."""

    def twisted(self, charge: Any, section: Section) -> Wave:
        """Multiplied by exp(i charge phi), then behind a section that is not an image."""

    def flipped(self, axis: str) -> tuple[Any, Wave]:
        """In a frame with x (or y) reversed: (phase [rad], wave)."""

    def poly(self, place: Place) -> Poly:
        """Its value at (r, phi)."""
