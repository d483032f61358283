"""The light paths of a form: all ways from a laser to the port, which add up with the phase of their lengths."""

from __future__ import annotations

from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.field import Field
from fastaxis.engines.symbolic.sources import as_field
from fastaxis.engines.symbolic.steps import applied
from fastaxis.engines.symbolic.waves import Place
from fastaxis.engines.symbolic.waves.base import exactly
from fastaxis.laws import TravelLaw
from fastaxis.light import Component

__all__ = ["joined", "open_routes"]


def open_routes(train: Any, target: str) -> dict[str, list[Any]]:
    """The routes to a port by the laser they start from."""
    found: dict[str, list[Any]] = {}
    for route in train.routes(target):
        found.setdefault(route.source_name, []).append(route)
    return found


def joined(component: Component, routes: list[Any], place: Place) -> Field:
    """One incoherent part of a laser by all its routes. Lengths count from the first route's."""
    first = _length(routes[0])
    total: Field | None = None
    for route in routes:
        field = as_field(component.beam, place)
        for name, law in route.steps():
            field = applied(field, name, law)
        ahead = sp.cancel(_length(route) - first)
        if ahead != 0:
            field = field.times(place.maths.phasor(sp.expand(place.wave_number * ahead)))
        total = field if total is None else total.plus(field)
    assert total is not None
    return total


def _length(route: Any) -> Any:
    """Optical path length [m], exact."""
    return sum((exactly(law.path) for _, law in route.steps() if isinstance(law, TravelLaw)), sp.S.Zero)
