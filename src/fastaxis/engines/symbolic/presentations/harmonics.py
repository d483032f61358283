"""A form as a Fourier sum in a chosen angle: what a rotating plate's detector measures."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.expressions import angle_of
from fastaxis.engines.symbolic.presentations.compact import compact
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.ring import ANGLE, UNIT
from fastaxis.errors import SymbolError

__all__ = ["harmonics", "order_in"]


def harmonics(poly: Poly, angle: Any) -> dict[Any, tuple[Any, Any]]:
    """{n: (a_n, b_n)} with poly = a_0 + sum a_n cos(n angle) + b_n sin(n angle), for a real polynomial.

    ``n`` is a number or, for an angle that enters as q*angle, an expression in q. b_0 is 0.
    """
    parts: dict[Any, Poly] = poly.parts(lambda key: order_in(poly, key, angle))
    found = {}
    for order, part in parts.items():
        if -order in found or (order.could_extract_minus_sign() and -order in parts):
            continue  # the conjugate of one that is counted
        scale = poly.ring.rational(1 if order != 0 else Fraction(1, 2))
        i = poly.ring.root_of_unity(Fraction(1, 4))
        found[order] = (compact((part + part.conj()) * scale), compact((part - part.conj()) * scale * i))
    return {n: found[n] for n in sorted(found, key=sp.default_sort_key)}


def order_in(poly: Poly, key: int, angle: Any) -> tuple[Any, int]:
    """How often the angle turns in a monomial, and the monomial without it."""
    ring = poly.ring
    root, exponents = ring.exponents(key)
    order: Any = sp.Integer(0)
    for place in list(exponents):
        generator = ring.generators[place]
        if not generator.expression.has(angle):
            continue
        factor = sp.cancel(generator.expression / angle)
        if generator.kind != ANGLE or factor.has(angle):
            raise SymbolError(
                "harmonics are counted in an angle that enters in proportion",
                got=f"{angle} occurs in {angle_of(ring, key) if generator.kind == ANGLE else generator.expression}",
                fix=f"form.frame(theta).series({angle}, order=2)",
            )
        order += sp.Rational(exponents.pop(place), UNIT) * factor
    return order, ring.pack(root, exponents)
