"""A factor turned by a constant phase so that it is real, and what then is left of the whole."""

from __future__ import annotations

import cmath
from fractions import Fraction

from fastaxis.engines.symbolic.expressions import by_root, centred
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.polar import polar
from fastaxis.engines.symbolic.ring.ring import ANGLE
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["is_real", "made_real", "quotient", "real_phases", "value_at_zero"]


def is_real(poly: Poly) -> bool:
    return poly.terms == poly.conj().terms


def real_phases(poly: Poly) -> list[int]:
    """Constant phases, in parts of a turn, that would make a pair of opposite phasors real; and 0."""
    numbers, found = by_root(poly), {0}
    for key, number in numbers.items():
        twin = numbers.get(_opposite(poly, key))
        if twin is None:
            continue
        product: dict[int, int] = {}
        for one, value in number.items():
            for other, theirs in twin.items():
                product[one + other] = product.get(one + other, 0) + value * theirs
        size = polar(product)
        if size is not None and size.root % 2 == 0:
            found.add(-size.root // 2 % (TURN // 2))
    return sorted(found)


def _opposite(poly: Poly, key: int) -> int:
    """The monomial with every phase reversed."""
    ring = poly.ring
    _, exponents = ring.exponents(key)
    return ring.pack(0, {place: -e if ring.generators[place].kind == ANGLE else e for place, e in exponents.items()})


def made_real(factor: Poly) -> Poly | None:
    """The factor times a phasor that makes it real, positive where all angles are zero."""
    _, turned = centred(factor)
    for phase in real_phases(turned):
        for extra in (0, TURN // 4):
            real = turned * turned.ring.root_of_unity(Fraction(phase + extra, TURN))
            if is_real(real):
                return -real if value_at_zero(real).real < 0 else real
    return None


def value_at_zero(poly: Poly) -> complex:
    """The value where all angles are zero and all amplitudes 1."""
    roots = [(poly.ring.exponents(key)[0] % TURN, value) for key, value in poly.terms.items()]
    return sum(value * cmath.exp(2j * cmath.pi * (root / TURN)) for root, value in roots) / poly.den


def quotient(poly: Poly, product: Poly) -> Poly | None:
    """poly/product if that is a monomial with a number, else None."""
    ring, whole, parts = poly.ring, by_root(poly), by_root(product)
    bottom = max(parts)
    below = ring.poly(dict(parts[bottom]), product.den)
    norm = below.abs2()
    if not norm.is_rational:
        return None
    for key in sorted(whole, reverse=True)[:4]:
        number = ring.poly(dict(whole[key]), poly.den) * below.conj() * ring.rational(1 / norm.value)
        monomial = number * ring.poly({key - bottom: 1})
        if monomial * product == poly:
            return monomial
    return None
