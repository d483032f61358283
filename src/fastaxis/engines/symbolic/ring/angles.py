"""An angle as a linear combination of independent generators with rational coefficients."""

from __future__ import annotations

from fractions import Fraction
from functools import lru_cache
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.ring.numerals import exact, pi_multiple
from fastaxis.errors import SymbolError

__all__ = ["RADIAN", "linear"]

RADIAN = sp.Integer(1)
"""The generator of angles that are plain numbers of radians and no fraction of pi: exp(0.3 i)."""

Linear = tuple[Fraction, tuple[tuple[Any, Fraction], ...]]


def linear(angle: Any) -> Linear:
    """(turns, ((generator, coefficient), ...)) with angle = 2 pi turns + sum coefficient * generator.

    >>> linear(sp.Symbol("q") * sp.Symbol("a") / 2 + 3.141592653589793)
    (Fraction(1, 2), ((a*q, Fraction(1, 2)),))
    """
    if isinstance(angle, sp.Basic):
        return _expression(angle)
    return _number(float(angle))


@lru_cache(maxsize=4096)
def _number(value: float) -> Linear:
    if value == 0:
        return Fraction(0), ()
    share = pi_multiple(value)
    if share is not None:
        return share / 2, ()
    return Fraction(0), ((RADIAN, exact(value)),)


@lru_cache(maxsize=4096)
def _expression(angle: Any) -> Linear:
    if angle.has(sp.I) or angle.is_real is False:
        raise SymbolError("an angle is a real quantity", got=f"the angle {angle}", fix='sympy.Symbol("a", real=True)')
    turns = Fraction(0)
    found: dict[Any, Fraction] = {}
    for term in sp.Add.make_args(sp.expand(angle)):
        coefficient, generator = _term(term)
        if generator == sp.pi:
            turns += coefficient / 2
        elif coefficient:
            found[generator] = found.get(generator, Fraction(0)) + coefficient
    return turns, tuple((g, c) for g, c in found.items() if c)


def _term(term: Any) -> tuple[Fraction, Any]:
    """Rational coefficient and generator of one product."""
    coefficient, rest = term.as_coeff_Mul()
    if isinstance(coefficient, sp.Float):
        share = pi_multiple(float(coefficient))
        if share is not None:
            return share, rest * sp.pi
        return exact(float(coefficient)), rest
    return Fraction(int(coefficient.p), int(coefficient.q)), rest
