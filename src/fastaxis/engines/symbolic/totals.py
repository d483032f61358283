"""Power of a form: its irradiance summed over the plane."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import R
from fastaxis.engines.symbolic.field import Field, Pair, split
from fastaxis.engines.symbolic.presentations import compact
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.waves import IntegralWave, ModeWave, Wave
from fastaxis.engines.symbolic.waves.base import exactly
from fastaxis.errors import SymbolError

if TYPE_CHECKING:
    from fastaxis.engines.symbolic.form import Form

__all__ = ["total_power"]


def total_power(form: Form) -> Any:
    """Power [W]: free space and lenses keep the power of every wave, and waves of different charge are orthogonal."""
    maths = form.parts[0].field.place.maths
    total = maths.ring.zero
    for part in form.parts:
        weight = maths.number(part.weight) * maths.ring.rational(part.field.scale)
        total = total + weight * _power(part.field, form.target)
    return exactly(form.source_power) * compact(total)


Piece = tuple[Wave, Any, Pair]


def _power(field: Field, target: str) -> Poly:
    total = field.place.maths.ring.zero
    for wave, _ in field.pieces:
        _passed_whole(wave, target)
    pieces: list[Piece] = [
        (wave, charge, pair)
        for wave, whole in field.pieces
        for (charge, shape), pair in split(whole).items()
        if _uncut(shape, target)
    ]
    for i, (wave, charge, pair) in enumerate(pieces):
        total = total + pair[0].abs2() + pair[1].abs2()
        for other_wave, other_charge, other in pieces[i + 1 :]:
            cross = pair[0].conj() * other[0] + pair[1].conj() * other[1]
            if cross and not _orthogonal(wave, charge, other_wave, other_charge):
                raise SymbolError(
                    "the power of two waves of one charge needs their overlap, which has no closed form here",
                    got=f"{target}: two waves that are not orthogonal",
                    fix=f'train.power("{target}")',
                )
    return total


def _passed_whole(wave: Wave, target: str) -> None:
    """Refuses a wave that went through a stop on its way."""
    while isinstance(wave, IntegralWave):
        _uncut(sp.sympify(wave.factor), target)
        if wave.limit != sp.oo:
            _uncut(sp.Heaviside(wave.limit - R), target)
        wave = wave.wave


def _uncut(shape: Any, target: str) -> bool:
    if shape.has(sp.Heaviside):
        raise SymbolError(
            "the power of light that is cut by a stop has no closed form here",
            got=f"{target}: a stop of shape {shape}",
            fix=f'train.power("{target}")',
        )
    return True


def _orthogonal(wave: Wave, charge: Any, other: Wave, other_charge: Any) -> bool:
    one, two = getattr(wave, "total", None), getattr(other, "total", None)
    if one is not None and two is not None:
        difference = sp.expand(one + charge - two - other_charge)
        # A letter stands for any half-integer q, so only a difference that is always a number is sure.
        if difference.is_zero is False:
            return True
    modes = isinstance(wave, ModeWave) and isinstance(other, ModeWave)
    return modes and charge == other_charge and _family(wave) == _family(other)


def _family(wave: Any) -> tuple[Any, ...]:
    """Modes that agree in this are orthogonal."""
    return wave.kind, wave.waist, wave.section
