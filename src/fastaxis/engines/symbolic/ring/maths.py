"""The exact member of the maths namespace: the laws of the parts run on it unchanged."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.ring.angles import linear
from fastaxis.engines.symbolic.ring.numerals import exact
from fastaxis.engines.symbolic.ring.poly import Poly
from fastaxis.engines.symbolic.ring.reading import read, root_of
from fastaxis.engines.symbolic.ring.ring import Ring

__all__ = ["ExactMaths"]


class ExactMaths:
    """Phasors, roots and cosines as polynomials of one ring.

    >>> maths = ExactMaths(Ring())
    >>> a = sp.Symbol("a")
    >>> maths.cos(a) * maths.cos(a) + maths.sin(a) * maths.sin(a) == maths.number(1)
    True
    """

    def __init__(self, ring: Ring) -> None:
        self.ring = ring
        self.half = ring.rational(Fraction(1, 2))
        self._i = ring.root_of_unity(Fraction(1, 4))

    def phasor(self, angle: Any) -> Poly:
        """exp(i angle)."""
        turns, generators = linear(angle)
        return self.ring.phasor(dict(generators), turns)

    def cos(self, angle: Any) -> Poly:
        turned = self.phasor(angle)
        return (turned + turned.conj()) * self.half

    def sin(self, angle: Any) -> Poly:
        turned = self.phasor(angle)
        return (turned.conj() - turned) * self.half * self._i

    def root(self, power: Any) -> Poly:
        """The non-negative square root of a power."""
        if isinstance(power, Poly):
            return self.ring.surd(power.value)
        if isinstance(power, sp.Basic):
            return root_of(self.ring, power)
        return self.ring.surd(exact(float(power)))

    def number(self, value: Any) -> Poly:
        """A number, or a sympy expression, as a polynomial."""
        if isinstance(value, sp.Basic):
            return read(self.ring, value)
        value = complex(value)
        real, imag = (self.ring.rational(exact(part)) for part in (value.real, value.imag))
        return real + imag * self._i if imag else real
