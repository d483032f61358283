"""The light of a laser as a field of the ring."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import R
from fastaxis.engines.symbolic.expressions import written
from fastaxis.engines.symbolic.field import Field, Pair
from fastaxis.engines.symbolic.ring import ExactMaths, Poly
from fastaxis.engines.symbolic.waves import ModeWave, Place, Section, StillWave, Wave
from fastaxis.engines.symbolic.waves.base import exactly
from fastaxis.errors import SymbolError
from fastaxis.light import Beam, FlatTop, Gaussian, HermiteGauss, LaguerreGauss, PlaneWave, State

__all__ = ["as_field", "state_pair", "wave_of"]


def as_field(beam: Beam, place: Place) -> Field:
    """A coherent beam; terms that share a mode share a wave."""
    found: dict[Wave, Pair] = {}
    for term in beam.terms:
        wave = wave_of(term.mode)
        amplitude = place.maths.number(term.amplitude)
        left, right = (amplitude * part for part in state_pair(term.state, place.maths))
        old = found.get(wave)
        found[wave] = (left, right) if old is None else (old[0] + left, old[1] + right)
    size = _size(beam, place)
    plain = {wave: (left * size, right * size) for wave, (left, right) in found.items()}
    root = place.maths.root(2)
    doubled = {wave: (left * root, right * root) for wave, (left, right) in plain.items()}
    if _length(doubled) < _length(plain):
        return Field(tuple(doubled.items()), place, Fraction(1, 2))
    return Field(tuple(plain.items()), place)


def _length(pieces: dict[Wave, Pair]) -> int:
    return sum(len(poly) for pair in pieces.values() for poly in pair)


def state_pair(state: State, maths: ExactMaths) -> Pair:
    """(E_L, E_R) of a state of unit power."""
    left, right = state.circular(maths)
    return left, right


def _size(beam: Beam, place: Place) -> Poly:
    """The factor that takes the beam as written to unit power."""
    maths, terms = place.maths, beam.terms
    pairs = [tuple(maths.number(t.amplitude) * part for part in state_pair(t.state, maths)) for t in terms]
    total = maths.ring.zero
    for i, one in enumerate(terms):
        for j, other in enumerate(terms):
            product = pairs[i][0].conj() * pairs[j][0] + pairs[i][1].conj() * pairs[j][1]
            if product:
                total = total + product * _overlap(one.mode, other.mode, place)
    if total.is_rational:
        return maths.root(sp.Rational(1, 1) / sp.Rational(total.value.numerator, total.value.denominator))
    return maths.number(1 / sp.sqrt(written(total)))


def _overlap(one: Any, other: Any, place: Place) -> Poly:
    """<one|other> of two unit modes."""
    maths = place.maths
    if one == other:
        return maths.number(1)
    if _relatives(one, other):
        return maths.ring.zero
    if one.symbols or other.symbols:
        raise SymbolError(
            "the power of a sum of modes that overlap is known as a number only; with letters, use modes of one waist",
            got=f"{type(one).__name__} beside {type(other).__name__}",
            fix="fa.LaguerreGauss(p=0, l=1, waist=w)",
        )
    return maths.number(one.overlap(other, float(place.wavelength)))


def _relatives(one: Any, other: Any) -> bool:
    """Different members of one orthonormal family."""
    same = [getattr(m, "waist", None) is not None and (m.waist, m.waist_at, m.centre) for m in (one, other)]
    kinds = {type(m) for m in (one, other)}
    return (bool(same[0]) and same[0] == same[1] and HermiteGauss not in kinds) or (
        kinds == {HermiteGauss} and same[0] == same[1]
    )


def wave_of(mode: Any) -> Wave:
    """A mode of a source as a wave with exact parameters."""
    if isinstance(mode, PlaneWave):
        return StillWave(1 / sp.sqrt(exactly(mode.area)))
    if not hasattr(mode, "centre") or any(c != 0 for c in mode.centre):
        raise SymbolError(
            "forms start from a centred Gaussian, Laguerre-Gauss, Hermite-Gauss, plane or flat-top mode",
            got=f"the mode {type(mode).__name__}",
            fix="mode=fa.Gaussian(waist=0.8*mm)",
        )
    if isinstance(mode, FlatTop):
        return StillWave(_flat_top(exactly(mode.radius), mode.order))
    before = Section(sp.S.One, -exactly(mode.waist_at), sp.S.Zero, sp.S.One)
    waist = exactly(mode.waist)
    if isinstance(mode, LaguerreGauss):
        return ModeWave("LG", _whole(mode.p, mode.l), waist, before)
    if isinstance(mode, HermiteGauss):
        return ModeWave("HG", _whole(mode.m, mode.n), waist, before)
    assert isinstance(mode, Gaussian)
    return ModeWave("LG", _whole(0, 0), waist, before)


def _whole(*orders: Any) -> tuple[Any, ...]:
    for order in orders:
        if getattr(order, "free_symbols", None):
            raise SymbolError(
                "the orders of a mode are whole numbers in a form: its polynomial has that many terms",
                got=f"a mode of order {order}",
                fix="mode=fa.LaguerreGauss(p=0, l=1, waist=w)",
            )
    return tuple(sp.Integer(int(order)) for order in orders)


def _flat_top(radius: Any, order: Any) -> Any:
    if order is None:
        return sp.Heaviside(radius - R) / sp.sqrt(sp.pi * radius**2)
    n = exactly(order)
    area = sp.pi * radius**2 * (2 / n) * sp.gamma(2 / n) * 2 ** (-2 / n)
    return sp.exp(-((R / radius) ** n)) / sp.sqrt(area)
