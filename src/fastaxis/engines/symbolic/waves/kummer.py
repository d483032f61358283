"""A Laguerre-Gauss mode through a spiral plate and a ray matrix: Kummer's function.

With alpha = 1/w^2 - i k/2R - i k a/2b at the plate and beta = k/b the Collins integral of r^s exp(-r^2/w^2 + i k r^2/2R
+ i l phi) is

    (k/i b) (-i)^|l| exp(i l phi) exp(i k d r^2/2b) beta^|l| r^|l| Gamma(m) / (2^(|l|+1) alpha^m |l|!)
    1F1(m; |l| + 1; -beta^2 r^2/4 alpha),      m = (s + |l|)/2 + 1.

I. S. Gradshteyn and I. M. Ryzhik, Table of Integrals, Series, and Products, 6.631.1; V. V. Kotlyar et al.,
J. Opt. Soc. Am. A 22, 849 (2005) for the Gaussian with a spiral plate.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.waves.base import Place, Section, Wave
from fastaxis.engines.symbolic.waves.modes import ModeWave

__all__ = ["TwistedWave"]


@dataclass(frozen=True)
class TwistedWave:
    """exp(i charge phi) times a mode, behind a section.

    Parameters
    ----------
    mode : Gaussian or Laguerre-Gauss mode at the plate.
    charge : turns of phase the plate added; a number or a whole expression.
    section : from the plate to here.
    """

    mode: ModeWave
    charge: Any
    section: Section

    def moved(self, section: Section) -> TwistedWave:
        return replace(self, section=self.section.then(section))

    def twisted(self, charge: Any, section: Section) -> Wave:
        from fastaxis.engines.symbolic.waves.integral import IntegralWave  # noqa: PLC0415  # each is made of the other

        if self.section.b == 0 and self.section.a.is_positive:
            return TwistedWave(self.mode.moved(self.section), self.charge + charge, section)
        return IntegralWave(self, charge, section)

    def flipped(self, axis: str) -> tuple[Any, TwistedWave]:
        angle, mode = self.mode.flipped(axis)
        own = sp.pi * self.charge if axis == "x" else 0
        return angle + own, replace(self, mode=mode, charge=-self.charge)

    @property
    def total(self) -> Any:
        """The charge here, the mode's own included."""
        return sp.sympify(self.charge + self.mode.charge)

    def poly(self, place: Place) -> Poly:
        if self.section.b == 0:
            return self._image(place)
        maths, size = place.maths, sp.Abs(self.total)
        k, b = place.wave_number, self.section.b
        mode_phase = -self.mode.gouy_order * self.mode.gouy(place)
        front = k * self.section.d * R**2 / (2 * b)
        phase = maths.phasor(front + mode_phase - sp.pi * (size + 1) / 2 + self.total * PHI)
        return phase * self._radial(place)

    def _image(self, place: Place) -> Poly:
        turned = sp.pi * self.charge if self.section.a.is_negative else 0
        return self.mode.moved(self.section).poly(place) * place.maths.phasor(self.charge * PHI + turned)

    def _radial(self, place: Place) -> Poly:
        """The function of r left when all phases are taken out; real where the front at the plate is flat enough."""
        value, real = self.profile(place)
        if real:
            return place.maths.ring.amplitude(place.letters.name("U", value))
        return place.maths.ring.complex_function(place.letters.function("U", value))

    def profile(self, place: Place) -> tuple[Any, bool]:
        """(U(r), whether it is real)."""
        k, b, size = place.wave_number, self.section.b, sp.Abs(self.total)
        radius = self.mode.width(place)
        bend = sp.cancel(self.mode.bend(place) / 2 + k * self.section.a / (2 * b))
        alpha = 1 / radius**2 - sp.I * bend
        beta = k / b
        total = sp.S.Zero
        at = sp.Dummy("s", positive=True)
        for term in sp.Add.make_args(sp.expand(self.mode.radial(radius, at))):
            factor, power = term.as_independent(at)
            m = (_power(power, at) + size) / 2 + 1
            shape = _kummer(m, size + 1, -(beta**2) * R**2 / (4 * alpha))
            total += factor * sp.gamma(m) / alpha**m * shape
        scale = k / b * (beta * R) ** size / (2 ** (size + 1) * sp.gamma(size + 1))
        return scale * total, bend == 0


def _power(expression: Any, at: Any) -> Any:
    return expression.as_base_exp()[1] if expression.has(at) else sp.S.Zero


def _kummer(a: Any, b: Any, z: Any) -> Any:
    return sp.exp(z) if a == b else sp.hyper([a], [b], z)
