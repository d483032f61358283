"""Quotients of complex polynomials as products in the ring: sizes and phases of what stands below."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

import sympy as sp

from fastaxis.engines.symbolic.elimination import Quotient
from fastaxis.engines.symbolic.expressions import as_sum, centred, written
from fastaxis.engines.symbolic.field import Field
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.presentations.reality import is_real
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.division import divided
from fastaxis.engines.symbolic.ring.ring import REAL
from fastaxis.engines.symbolic.waves import Place, Wave

__all__ = ["over"]


def over(found: Quotient, wave: Wave, like: Field) -> Field:
    """(E_L, E_R)/denominator of a plane wave.

    1/d is |d|^-1 exp(-i arg d): powers hold |d|^2 only, and no conjugate to be multiplied out. Factors that both
    components share with the denominator are cancelled first.
    """
    left, right = found.above
    for factor in (part for below in found.below for part in _factors(below)):
        one, other = divided(left, factor), divided(right, factor)
        if one is not None and other is not None:
            left, right = one, other
            continue
        inverse = _number_inverse(factor) or _inverse(factor, like.place)
        left, right = left * inverse, right * inverse
    return Field(((wave, (left, right)),), like.place, like.scale)


def _factors(poly: Poly) -> Iterator[Poly]:
    """Factors whose product is the polynomial, a number or phasor among them."""
    parts = factored(poly) or []
    product = poly.ring.rational(1)
    for factor, power in parts:
        product = product * factor.power(power)
    rest = divided(poly, product)
    if rest is None:
        yield poly
        return
    yield rest
    for factor, power in parts:
        yield from [factor] * power


def _number_inverse(poly: Poly) -> Poly | None:
    if len(poly) == 1:
        return poly.power(-1)
    norm = poly.abs2()
    return poly.conj() * poly.ring.rational(1 / norm.value) if norm.is_rational else None


def _inverse(poly: Poly, place: Place) -> Poly:
    phase, size = centred(poly)
    turned = poly.ring.poly({-phase: 1})
    if is_real(size):
        return turned * _power(size, Fraction(-1))
    argument = place.letters.name("zeta", sp.arg(as_sum(size)))
    return turned * _power(size.abs2(), Fraction(-1, 2)) * place.maths.phasor(-argument)


def _power(real: Poly, exponent: Fraction) -> Poly:
    """A real polynomial to a negative power, as a generator of its own."""
    ring, expression = real.ring, written(real)
    ring.sum_root(expression, real)
    return ring.poly({ring.key(REAL, expression, exponent): 1})
