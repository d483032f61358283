"""One law applied to a field of the ring."""

from __future__ import annotations

from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R, X, Y
from fastaxis.engines.symbolic.field import Field
from fastaxis.engines.symbolic.waves import Section
from fastaxis.engines.symbolic.waves.base import exactly
from fastaxis.errors import SymbolError
from fastaxis.laws import AxisLaw, CircularLaw, Flip, Law, ScalarLaw, TravelLaw, Turn
from fastaxis.laws.stops import Annulus, Disc
from fastaxis.maths import Pattern

__all__ = ["applied"]


def applied(field: Field, name: str, law: Law) -> Field:
    """The field behind one law of the part ``name``.

    Raises
    ------
    SymbolError : a part that has no closed form, such as a plate given by a Pattern.
    """
    if any(isinstance(value, Pattern) for value in law.values):
        raise SymbolError(
            "a plate given as a pattern of numbers has no closed form",
            got=f"{name}: a Pattern",
            fix='train.expose("cam", fa.SIX_STATES)',
        )
    if isinstance(law, Flip):
        return field.flipped(law.axis)
    if isinstance(law, Turn):
        return _turned(field, name, law)
    if isinstance(law, TravelLaw):
        return field.moved(Section.of(law))
    if isinstance(law, ScalarLaw):
        return _scalar(field, name, law)
    assert isinstance(law, AxisLaw | CircularLaw)
    phi = _azimuth(law.centre) if isinstance(law, AxisLaw) else PHI
    return field.with_matrix(law.circular(field.place.maths, phi))


def _turned(field: Field, name: str, law: Turn) -> Field:
    try:
        return field.turned(law.angle)
    except ValueError:
        raise SymbolError(
            "a Hermite-Gauss beam turned by any angle is a sum of many; a Laguerre-Gauss beam only gains a phase",
            got=f"{name}: turns the picture by {law.angle}",
            fix="fa.LaguerreGauss(p=0, l=1, waist=0.8*mm)",
        ) from None


def _scalar(field: Field, name: str, law: ScalarLaw) -> Field:
    maths = field.place.maths
    factor = law.transmission.value(maths)
    if law.charge != 0:
        factor = factor * maths.phasor(law.charge * _azimuth(law.centre))
    if law.tilt != (0.0, 0.0):
        k = field.place.wave_number
        (tx, ty), (x, y) = law.tilt, law.centre
        ramp = exactly(tx) * (X - exactly(x)) + exactly(ty) * (Y - exactly(y))
        factor = factor * maths.phasor(sp.expand(k * ramp))
    if law.stop is not None:
        factor = factor * maths.ring.switch(_clear(name, law))
    field = field.times(factor) if law != ScalarLaw(vergence=law.vergence, centre=law.centre) else field
    if law.vergence == 0:
        return field
    if not _on_axis(law.centre):
        k, (x, y) = field.place.wave_number, law.centre
        # A lens off centre is a centred lens, a tilt and a constant phase.
        shift = k * exactly(law.vergence) * (exactly(x) * X + exactly(y) * Y - (exactly(x) ** 2 + exactly(y) ** 2) / 2)
        field = field.times(maths.phasor(sp.expand(shift)))
    return field.bent(exactly(law.vergence))


def _clear(name: str, law: ScalarLaw) -> Any:
    """1 inside a round stop, 0 outside."""
    stop = law.stop
    if _on_axis(law.centre) and isinstance(stop, Disc):
        rim = exactly(stop.radius)
        return sp.Heaviside(R - rim) if stop.opaque else sp.Heaviside(rim - R)
    if _on_axis(law.centre) and isinstance(stop, Annulus):
        return sp.Heaviside(exactly(stop.outer) - R) * sp.Heaviside(R - exactly(stop.inner))
    raise SymbolError(
        "only a round, centred stop has a closed form",
        got=f"{name}: {type(stop).__name__} at {law.centre}",
        fix='train.expose("cam", fa.SIX_STATES)',
    )


def _azimuth(centre: tuple[Any, Any]) -> Any:
    """The azimuth counted from a centre."""
    if _on_axis(centre):
        return PHI
    return sp.atan2(Y - exactly(centre[1]), X - exactly(centre[0]))


def _on_axis(centre: tuple[Any, Any]) -> bool:
    return all(not getattr(c, "free_symbols", None) and c == 0 for c in centre)
