"""sympy expressions read into the ring: powers of amplitudes, cosines, exponentials."""

from __future__ import annotations

from fractions import Fraction
from functools import reduce
from operator import add, mul
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.ring.angles import linear
from fastaxis.engines.symbolic.ring.numerals import exact, pi_multiple
from fastaxis.engines.symbolic.ring.polar import square_root
from fastaxis.engines.symbolic.ring.poly import Poly
from fastaxis.engines.symbolic.ring.ring import REAL, Ring

__all__ = ["read", "root_of"]


def root_of(ring: Ring, power: Any) -> Poly:
    """The non-negative square root of a non-negative expression."""
    return _raised(ring, sp.factor(_rationalized(power)), Fraction(1, 2))


def read(ring: Ring, expression: Any) -> Poly:
    """An expression as a polynomial; what is neither sum, product, cosine nor exponential is a real generator.

    >>> x = sp.Symbol("x")
    >>> ring = Ring()
    >>> read(ring, 2 * sp.cos(x) ** 2) == read(ring, 1 + sp.cos(2 * x))
    True
    """
    return _read(ring, _rationalized(sp.sympify(expression)))


def _read(ring: Ring, e: Any) -> Poly:
    if isinstance(e, sp.Rational):
        return ring.rational(Fraction(int(e.p), int(e.q)))
    if e == sp.I:
        return ring.root_of_unity(Fraction(1, 4))
    if isinstance(e, sp.Add | sp.Mul):
        parts = [_read(ring, part) for part in e.args]
        return reduce(add if isinstance(e, sp.Add) else mul, parts)
    for kind, reader in _FUNCTIONS.items():
        if isinstance(e, kind):
            return reader(ring, e)
    return ring.amplitude(e)


def _cosine(ring: Ring, e: Any) -> Poly:
    turns, generators = linear(e.args[0])
    phasor = ring.phasor(dict(generators), turns)
    if isinstance(e, sp.cos):
        return (phasor + phasor.conj()) * ring.rational(Fraction(1, 2))
    return (phasor.conj() - phasor) * ring.root_of_unity(Fraction(1, 4)) * ring.rational(Fraction(1, 2))


def _exponential(ring: Ring, e: Any) -> Poly:
    """exp(real + i angle), the real exponent being one generator."""
    real: list[Any] = []
    imag: list[Any] = []
    for part in sp.Add.make_args(sp.expand(e.args[0])):
        (imag if part.has(sp.I) else real).append(part)
    turns, generators = linear(sp.expand(-sp.I * sp.Add(*imag)))
    phasor = ring.phasor(dict(generators), turns)
    return phasor * ring.amplitude(sp.exp(sp.Add(*real))) if real else phasor


def _power(ring: Ring, e: Any) -> Poly:
    if not isinstance(e.exp, sp.Rational):
        return ring.amplitude(e)
    exponent = Fraction(int(e.exp.p), int(e.exp.q))
    if exponent.denominator == 1 and exponent > 0:
        return _read(ring, e.base).power(int(exponent))
    return _raised(ring, sp.factor(e.base), exponent)


def _raised(ring: Ring, base: Any, exponent: Fraction) -> Poly:
    """A non-negative expression to a multiple of 1/2."""
    if isinstance(base, sp.Mul):
        product = ring.rational(1)
        for part in _positive_parts(base):
            product = product * _raised(ring, part, exponent)
        return product
    if isinstance(base, sp.Pow) and isinstance(base.exp, sp.Rational):
        return _raised(ring, base.base, exponent * Fraction(int(base.exp.p), int(base.exp.q)))
    if isinstance(base, sp.Rational):
        return _rational_power(ring, Fraction(int(base.p), int(base.q)), exponent)
    whole = _read(ring, base)
    if exponent.denominator == 1 and (exponent > 0 or len(whole) == 1):
        return whole.power(int(exponent))
    if isinstance(base, sp.Add):
        number = _number_root(ring, whole) if exponent == Fraction(1, 2) else None
        if number is not None:
            return number
        ring.sum_root(base, whole)
    return ring.poly({ring.key(REAL, base, exponent): 1})


def _positive_parts(product: Any) -> tuple[Any, ...]:
    """Factors of a positive product, a leading minus taken into a sum of numbers: -(sqrt(2) - 2) is 2 - sqrt(2)."""
    number, rest = product.as_coeff_Mul()
    parts = sp.Mul.make_args(rest)
    for place, part in enumerate(parts):
        if number.is_negative and isinstance(part, sp.Add) and part.is_number:
            return -number, *parts[:place], -part, *parts[place + 1 :]
    return product.args  # type: ignore[no-any-return]  # sympy has no types


def _number_root(ring: Ring, whole: Poly) -> Poly | None:
    """The square root of a sum of square roots that is a cosine, such as sqrt(1/2 - sqrt(2)/4) = sin(pi/8)."""
    if any(ring.exponents(key)[1] for key in whole.terms):
        return None
    found = square_root(whole.terms, whole.den)
    return None if found is None else ring.poly(found[0].terms, found[1])


def _rational_power(ring: Ring, value: Fraction, exponent: Fraction) -> Poly:
    if exponent.denominator == 1:
        return ring.rational(value ** int(exponent))
    root = ring.surd(value if exponent > 0 else 1 / value)
    return root.power(abs(exponent.numerator))


_FUNCTIONS = {sp.cos: _cosine, sp.sin: _cosine, sp.exp: _exponential, sp.Pow: _power}


def _rationalized(e: Any) -> Any:
    """Floats replaced by the exact numbers they stand for."""
    floats = e.atoms(sp.Float)
    return e.xreplace({f: _exact_number(float(f)) for f in floats}) if floats else e


def _exact_number(value: float) -> Any:
    share = pi_multiple(value) if value else None
    if share is not None:
        return sp.Rational(share.numerator, share.denominator) * sp.pi
    number = exact(value)
    return sp.Rational(number.numerator, number.denominator)
