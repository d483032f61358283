"""The phase that both components share all over the plane, and that no frame shows."""

from __future__ import annotations

from fractions import Fraction

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.expressions import middle
from fastaxis.engines.symbolic.field import Pair
from fastaxis.engines.symbolic.presentations.reality import real_phases, value_at_zero
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.ring import ANGLE
from fastaxis.engines.symbolic.ring.roots import TURN

__all__ = ["plainest_phase", "without_common_phase"]

NOTHING = 1e-9  # of a component: roundings of the value of an exact number


def without_common_phase(pair: Pair, *, halfway: bool) -> Pair:
    """Both components without the phase they share all over the plane.

    Parameters
    ----------
    halfway : take off the phase in the middle of both, which makes linear components real; else the one that leaves
        the fewest letters in the phases.
    """
    polys = [poly for poly in pair if poly]
    if not polys:
        return pair
    choices = [polys] if halfway else [[], *([poly] for poly in polys), polys]
    pairs = [_without(pair, _constant(choice)) for choice in choices]
    return min(pairs, key=_letters)


def _constant(polys: list[Poly]) -> tuple[Poly, int] | None:
    """The middle phasor of some components, without what differs from place to place."""
    if not polys:
        return None
    ring = polys[0].ring
    _, exponents = ring.exponents(middle(polys))
    common = {place: value for place, value in exponents.items() if not ring.generators[place].expression.has(R, PHI)}
    return polys[0], ring.pack(0, common)


def _without(pair: Pair, common: tuple[Poly, int] | None) -> Pair:
    if common is None:
        return pair
    ring, key = common[0].ring, common[1]
    left, right = (Poly.made(ring, {k - key: v for k, v in poly.terms.items()}, poly.den) for poly in pair)
    return left, right


def _letters(pair: Pair) -> int:
    ring = pair[0].ring
    rows = [ring.exponents(key)[1] for poly in pair for key in poly.terms]
    return sum(ring.generators[place].kind == ANGLE for row in rows for place in row)


def plainest_phase(pair: Pair) -> Pair:
    """Both components turned by the one constant phase that leaves the least imaginary part, and no leading minus."""
    phases = sorted({phase for poly in pair for phase in real_phases(poly)})
    turned = [_turned(pair, phase + extra) for phase in phases for extra in (0, TURN // 4)]
    best = min(turned, key=_terms)
    values = [value_at_zero(poly) for poly in best]
    first = next((value for value in values if abs(value) > NOTHING), 1 + 0j)
    negative = first.real < -NOTHING or (abs(first.real) <= NOTHING and first.imag < 0)
    return (-best[0], -best[1]) if negative else best


def _turned(pair: Pair, phase: int) -> Pair:
    root = pair[0].ring.root_of_unity(Fraction(phase % TURN, TURN))
    return pair[0] * root, pair[1] * root


def _terms(pair: Pair) -> int:
    """Terms of the real and of the imaginary parts; one more where there is an imaginary part at all."""
    real = sum(len(poly + poly.conj()) for poly in pair)
    imag = sum(len(poly - poly.conj()) for poly in pair)
    return real + imag + bool(imag)
