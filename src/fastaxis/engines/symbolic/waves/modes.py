"""Gaussian, Laguerre-Gauss and Hermite-Gauss modes through any ray matrix."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R, X, Y
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.waves.base import Place, Section, Wave
from fastaxis.errors import SymbolError

__all__ = ["ModeWave"]


@dataclass(frozen=True)
class ModeWave:
    """P(sqrt2 x/w, sqrt2 y/w)/w exp(-r^2/w^2 + i k r^2/2R - i N zeta), for a ray matrix from the waist.

    w^2 = w0^2 (a^2 + b^2/zR^2), 1/R = (a c zR^2 + b d)/(a^2 zR^2 + b^2), zeta = arg(a + i b/zR), with the Rayleigh
    range zR = pi w0^2/wavelength.

    Parameters
    ----------
    kind : "LG" with orders (p, l) or "HG" with orders (m, n).
    waist : w0 [m].
    section : from the waist to here.

    H. Kogelnik and T. Li, Appl. Opt. 5, 1550 (1966), with the conjugate time factor.
    """

    kind: str
    orders: tuple[Any, Any]
    waist: Any
    section: Section

    @property
    def charge(self) -> Any:
        """Turns of phase per turn of phi; None where the mode is no function of r alone times such a phase."""
        if self.kind == "LG":
            return self.orders[1]
        return sp.S.Zero if self.orders == (0, 0) else None

    @property
    def total(self) -> Any:
        """The charge, as of every wave."""
        return self.charge

    @property
    def gouy_order(self) -> Any:
        """The N of N zeta."""
        first, second = self.orders
        return 2 * first + abs(second) + 1 if self.kind == "LG" else first + second + 1

    def moved(self, section: Section) -> ModeWave:
        return replace(self, section=self.section.then(section))

    def twisted(self, charge: Any, section: Section) -> Wave:
        from fastaxis.engines.symbolic.waves.kummer import TwistedWave  # noqa: PLC0415  # each is made of the other

        if self.charge is None:
            raise SymbolError(
                "a spiral or patterned plate on a Hermite-Gauss beam has no closed form behind free space",
                got=f"HG{self.orders[0]}{self.orders[1]} with charge {charge}",
                fix="mode=fa.LaguerreGauss(p=0, l=1, waist=0.8*mm)",
            )
        return TwistedWave(self, charge, section)

    def flipped(self, axis: str) -> tuple[Any, ModeWave]:
        first, second = self.orders
        if self.kind == "LG":
            return (sp.pi * second if axis == "x" else sp.S.Zero), replace(self, orders=(first, -second))
        return sp.pi * (first if axis == "x" else second), self

    # --- what it looks like here ------------------------------------------------------------------------------------
    def rayleigh(self, place: Place) -> Any:
        """Rayleigh range pi w0^2/wavelength [m]."""
        return sp.pi * self.waist**2 / place.wavelength

    def at_waist(self) -> bool:
        return self.section.b == 0 and self.section.a in (1, -1)

    def width(self, place: Place) -> Any:
        """The radius w [m]: the user's letter in the waist, else a name for it."""
        if self.at_waist():
            return self.waist
        if self.section.b == 0:
            meaning = self.waist * sp.Abs(self.section.a)
        else:
            reach = self.rayleigh(place)
            meaning = self.waist * sp.sqrt(self.section.a**2 + (self.section.b / reach) ** 2)
        return place.letters.name("w", meaning, positive=True)

    def front(self, place: Place) -> Any:
        """k/R [1/m^2]: 0 for a flat front, else a name for it."""
        value = self.bend(place)
        return sp.S.Zero if value == 0 else place.letters.name("K", value)

    def bend(self, place: Place) -> Any:
        """k/R [1/m^2], spelled out."""
        s, reach = self.section, self.rayleigh(place)
        curvature = (s.a * s.c * reach**2 + s.b * s.d) / (s.a**2 * reach**2 + s.b**2)
        return place.wave_number * sp.cancel(curvature)

    def gouy(self, place: Place) -> Any:
        """The phase zeta [rad]."""
        a, b = self.section.a, self.section.b
        if b == 0:
            return sp.pi if a.is_negative else sp.S.Zero
        if a == 0:
            # An unsigned letter is a length, and lengths are positive.
            return -sp.pi / 2 if b.is_negative else sp.pi / 2
        reach = self.rayleigh(place)
        angle = sp.atan(b / (a * reach)) if a.is_positive else sp.atan2(b, a * reach)
        return place.letters.name("zeta", angle)

    def poly(self, place: Place) -> Poly:
        maths = place.maths
        radius = self.width(place)
        envelope = maths.number(sp.exp(-(R**2) / radius**2))
        phase = maths.phasor(self.front(place) * R**2 / 2 - self.gouy_order * self.gouy(place))
        polynomial = maths.number(sp.expand(self._polynomial(radius)))
        return polynomial * envelope * phase * self._turning(place)

    def _turning(self, place: Place) -> Poly:
        return place.maths.phasor(self.orders[1] * PHI if self.kind == "LG" else 0)

    def radial(self, radius: Any, at: Any = R) -> Any:
        """The polynomial part of a Laguerre-Gauss mode, its 1/w included."""
        p, l = self.orders if self.kind == "LG" else (0, 0)
        size = abs(l)
        norm = sp.sqrt(2 * sp.factorial(p) / (sp.pi * sp.factorial(p + size))) / radius
        s = sp.sqrt(2) * at / radius
        return norm * s**size * sp.assoc_laguerre(p, size, s**2)

    def _polynomial(self, radius: Any) -> Any:
        if self.kind == "LG":
            return self.radial(radius)
        m, n = self.orders
        norm = sp.sqrt(2 / (sp.pi * 2 ** (m + n) * sp.factorial(m) * sp.factorial(n))) / radius
        return norm * sp.hermite(m, sp.sqrt(2) * X / radius) * sp.hermite(n, sp.sqrt(2) * Y / radius)
