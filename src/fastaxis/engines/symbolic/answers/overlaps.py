"""How much of a beam is in a given mode, or turns with a given charge."""

from __future__ import annotations

from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.field import Field, split
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.sources import wave_of
from fastaxis.engines.symbolic.waves import ModeWave
from fastaxis.errors import SymbolError

__all__ = ["charge_share", "mode_share"]


def mode_share(field: Field, mode: Any) -> Poly:
    """Power in a Laguerre-Gauss mode of either polarization, for a beam of power 1 at a plane where its front is flat.

    Raises
    ------
    SymbolError : a beam or mode that is not of the Laguerre-Gauss family, or has a curved front.
    """
    wanted = wave_of(mode)

    def weight(wave: Any, charge: Any) -> Any:
        around = _around(charge + wave.total - wanted.total)
        return 0 if around == 0 else around * _radial_overlap(_flat(wave, field), _flat(wanted, field))

    return _summed(field, weight)


def charge_share(field: Field, charge: Any) -> Poly:
    """Power that turns with exp(i charge phi), whatever its function of r, for a beam of power 1.

    Raises
    ------
    SymbolError : a beam of several functions of r.
    """
    if len(field.pieces) != 1 or field.pieces[0][0].total is None:
        raise SymbolError(
            "charges are counted in a beam of one function of r",
            got=f"{len(field.pieces)} functions of r",
            fix="mode=fa.Gaussian(waist=0.8*mm)",
        )
    return _summed(field, lambda wave, own: _around(own + wave.total - charge))


def _summed(field: Field, weight: Any) -> Poly:
    maths = field.place.maths
    left = right = maths.ring.zero
    for wave, whole in field.pieces:
        for (charge, shape), pair in split(whole).items():
            if shape != 1:
                raise SymbolError(
                    "overlaps have a closed form where nothing is cut off", got=f"the factor {shape}", fix="radius=None"
                )
            factor = maths.number(sp.sympify(weight(wave, charge)))
            left, right = left + factor * pair[0], right + factor * pair[1]
    return (left.abs2() + right.abs2()) * maths.ring.rational(field.scale)


def _around(order: Any) -> Any:
    """The mean of exp(i order phi) over a turn with its cut at phi = pi."""
    if order == 0 or order.is_integer:
        return sp.Integer(int(order == 0)) if not order.free_symbols else sp.KroneckerDelta(order, 0)
    return sp.sin(sp.pi * order) / (sp.pi * order)


def _flat(wave: Any, field: Field) -> ModeWave:
    if not isinstance(wave, ModeWave) or wave.kind != "LG" or wave.bend(field.place) != 0 or not wave.at_waist():
        raise SymbolError(
            "overlaps have a closed form between Laguerre-Gauss modes in their waists",
            got=f"a {type(wave).__name__}",
            fix="form.share(fa.LaguerreGauss(p=0, l=1, waist=w))",
        )
    return wave


def _radial_overlap(one: ModeWave, two: ModeWave) -> Any:
    """2 pi times the integral of the product of two radial functions."""
    at = sp.Dummy("s", positive=True)
    width = 1 / one.waist**2 + 1 / two.waist**2
    product = sp.expand(one.radial(one.waist, at) * two.radial(two.waist, at) * at)
    total = sp.S.Zero
    for term in sp.Add.make_args(product):
        factor, power = term.as_independent(at)
        half = (power.as_base_exp()[1] + 1) / 2
        total += factor * sp.pi * sp.gamma(half) / width**half
    return sp.factor(total)
