"""A wave that is known only as an integral over r, which is left unevaluated."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.expressions import as_sum
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.waves.base import Place, Section, Wave

__all__ = ["IntegralWave"]


@dataclass(frozen=True)
class IntegralWave:
    """exp(i charge phi) factor(r) times a round wave, behind a section, as a Hankel integral.

    U(r) = (k/b) int_0^limit f(s) exp(i k a s^2/2b) J_l(k r s/b) s ds, and the field is
    -i (-i)^l exp(i l phi) exp(i k d r^2/2b) U(r).

    Parameters
    ----------
    wave : at the last patterned part or stop.
    charge : turns of phase added there.
    section : from there to here.
    factor : function of r there: a stop, a lens.
    limit : where the integral ends: the radius of a round stop [m].
    """

    wave: Wave
    charge: Any
    section: Section
    factor: Any = sp.S.One
    limit: Any = sp.oo

    @property
    def total(self) -> Any:
        """The charge here."""
        inner = self.wave.total
        return None if inner is None else inner + self.charge

    def moved(self, section: Section) -> IntegralWave:
        return replace(self, section=self.section.then(section))

    def twisted(self, charge: Any, section: Section) -> Wave:
        return IntegralWave(self, charge, section)

    def flipped(self, axis: str) -> tuple[Any, IntegralWave]:
        angle, wave = self.wave.flipped(axis)
        own = sp.pi * self.charge if axis == "x" else 0
        return angle + own, replace(self, wave=wave, charge=-self.charge)

    def poly(self, place: Place) -> Poly:
        place.letters.note("no closed form is known behind the last plate or stop: U is left as an integral over s")
        k, section = place.wave_number, self.section
        # What depends on r is spelled out: inside the integral r is s.
        before = place.letters.spelled_out(as_sum(self.wave.poly(place)))
        order = sp.sympify(self.total)
        at = sp.Symbol("s", positive=True)
        shape = (before.subs(PHI, 0) * self.factor).subs(R, at)
        kernel = sp.exp(sp.I * k * section.a * at**2 / (2 * section.b)) * sp.besselj(order, k * R * at / section.b)
        value = k / section.b * sp.Integral(shape * kernel * at, (at, 0, self.limit))
        name = place.letters.function("U", value)
        phase = place.maths.phasor(order * PHI - sp.pi * (order + 1) / 2 + k * section.d * R**2 / (2 * section.b))
        return phase * place.maths.ring.complex_function(name)
