"""Polynomials of the ring written as sympy expressions."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.ring.polar import canonical_sum, polar
from fastaxis.engines.symbolic.ring.poly import Poly
from fastaxis.engines.symbolic.ring.ring import ANGLE, UNIT, Ring
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["amplitude_of", "angle_of", "as_sum", "by_root", "real_sum", "split_key", "written"]


def split_key(ring: Ring, key: int) -> tuple[int, int, int]:
    """(phasor, amplitude, root of unity) parts of a packed monomial; their sum is the monomial."""
    root, exponents = ring.exponents(key)
    angle = ring.pack(0, {p: e for p, e in exponents.items() if ring.generators[p].kind == ANGLE})
    return angle, key - angle - root, root


def angle_of(ring: Ring, key: int, root: int = 0) -> Any:
    """The phase of a monomial."""
    _, exponents = ring.exponents(key)
    parts = [
        sp.Rational(e, UNIT) * ring.generators[p].expression
        for p, e in exponents.items()
        if ring.generators[p].kind == ANGLE
    ]
    return sp.Add(*parts, 2 * sp.pi * sp.Rational(root, TURN))


def amplitude_of(ring: Ring, key: int) -> Any:
    """The product of the amplitudes of a monomial."""
    _, exponents = ring.exponents(key)
    return sp.Mul(
        *(
            ring.generators[p].expression ** sp.Rational(e, UNIT)
            for p, e in exponents.items()
            if ring.generators[p].kind != ANGLE
        )
    )


def by_root(poly: Poly) -> dict[int, dict[int, int]]:
    """Coefficients by root of unity, for each monomial without its root."""
    found: dict[int, dict[int, int]] = {}
    for key, value in poly.terms.items():
        root = poly.ring.exponents(key)[0]
        found.setdefault(key - root, {})[root] = value
    return found


Group = dict[int, dict[int, dict[int, int]]]


def grouped(poly: Poly) -> Group:
    """Whole coefficients by phasor, amplitude and root of unity."""
    found: Group = {}
    for key, value in poly.terms.items():
        angle, amplitude, root = split_key(poly.ring, key)
        found.setdefault(angle, {}).setdefault(amplitude, {})[root] = value
    return found


def written(poly: Poly) -> Any:
    """A polynomial as a sum of cosines if it is real, up to a common phasor, else as a sum of exponentials."""
    if not poly:
        return sp.S.Zero
    centre, turned = centred(poly)
    for quarter, factor in ((0, 1), (TURN // 4, sp.I)):
        real = Poly.made(poly.ring, {key - quarter: value for key, value in turned.terms.items()}, turned.den)
        if real.terms == real.conj().terms:
            return factor * sp.exp(sp.I * angle_of(poly.ring, centre)) * real_sum(real)
    return as_sum(poly)


def centred(poly: Poly) -> tuple[int, Poly]:
    """The middle phasor of a polynomial, and the polynomial divided by it."""
    centre = middle([poly])
    return centre, Poly.made(poly.ring, {key - centre: value for key, value in poly.terms.items()}, poly.den)


def middle(polys: Iterable[Poly]) -> int:
    """The phasor halfway between the extreme exponents of every angle."""
    ring, low, high, count = None, {}, {}, 0  # type: ignore[var-annotated]  # filled below, letter by letter
    for poly in polys:
        ring = poly.ring
        for key in poly.terms:
            exponents = {p: e for p, e in ring.exponents(key)[1].items() if ring.generators[p].kind == ANGLE}
            for place in exponents.keys() | low.keys():
                e = exponents.get(place, 0)
                # A generator first met now had the exponent 0 in all monomials before.
                low[place] = min(low.get(place, 0 if count else e), e)
                high[place] = max(high.get(place, 0 if count else e), e)
            count += 1
    if ring is None:
        return 0
    return ring.pack(0, {place: (low[place] + high[place]) // 2 for place in low if low[place] + high[place]})


def as_sum(poly: Poly) -> Any:
    """A polynomial as a sum of exponentials."""
    ring, parts = poly.ring, []
    for angle, amplitudes in grouped(poly).items():
        for amplitude, roots in amplitudes.items():
            factor, rest = _number(roots, poly.den)
            phase = angle_of(ring, angle, rest)
            parts.append(factor * amplitude_of(ring, amplitude) * sp.exp(sp.I * phase))
    return sp.Add(*parts)


def _number(roots: dict[int, int], den: int) -> tuple[Any, int]:
    """(factor, rest): a sum of roots of unity as a factor times one root, whose quarter turns are in the factor."""
    found = polar(roots)
    if found is None:
        real, imag = _complex(roots, den)
        return real + sp.I * imag, 0
    quarters, rest = divmod(found.root, TURN // 4)
    return found.size * sp.I**quarters / den, rest


def real_sum(poly: Poly) -> Any:
    """A real polynomial as a sum of cosines (and sines where a term has both)."""
    ring, groups, parts = poly.ring, grouped(poly), []
    for angle, amplitudes in groups.items():
        twin = -angle
        if angle < twin and twin in groups:
            continue  # its conjugate stands for both
        weight = 1 if angle == 0 else 2
        for amplitude, roots in amplitudes.items():
            size = weight * amplitude_of(ring, amplitude)
            parts.append(size * _wave(roots, poly.den, angle_of(ring, angle)))
    return sp.Add(*parts)


def _wave(roots: dict[int, int], den: int, angle: Any) -> Any:
    """Re(coefficient * exp(i angle))."""
    found = polar(roots)
    if found is not None:
        # Halves of a turn are a sign, so that the angle stays small.
        halves = (found.root + TURN // 4) // (TURN // 2)
        left = sp.Rational(found.root - halves * (TURN // 2), TURN)
        return found.size * (-1) ** halves * sp.cos(angle + 2 * sp.pi * left) / den
    real, imag = _complex(roots, den)
    return real * sp.cos(angle) - imag * sp.sin(angle)


def _complex(roots: dict[int, int], den: int) -> tuple[Any, Any]:
    """Real and imaginary part of a sum of roots of unity."""
    quarter = TURN // 4
    return _twice_real(roots) / (2 * den), _twice_real({root - quarter: value for root, value in roots.items()}) / (
        2 * den
    )


def _twice_real(roots: dict[int, int]) -> Any:
    """A number plus its conjugate; one cosine where it can be."""
    total = canonical_sum([*roots.items(), *((-root, value) for root, value in roots.items())])
    found = polar(total) if total else None
    if found is not None:
        return found.size * (1 if found.root == 0 else -1)
    return sp.Add(*(2 * value * sp.cos(2 * sp.pi * sp.Rational(root, TURN)) for root, value in roots.items()))
