"""The light paths of a form: all ways from a laser to the port, which add up with the phase of their lengths."""

from __future__ import annotations

from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.field import Field
from fastaxis.engines.symbolic.sources import as_field
from fastaxis.engines.symbolic.steps import applied
from fastaxis.engines.symbolic.waves import Place
from fastaxis.engines.symbolic.waves.base import exactly
from fastaxis.errors import SymbolError
from fastaxis.laws import Law, TravelLaw
from fastaxis.light import Component

__all__ = ["joined", "laws_at", "open_routes"]


def open_routes(train: Any, target: str) -> dict[str, list[Any]]:
    """The routes to a port by the laser they start from."""
    found: dict[str, list[Any]] = {}
    for route in train.routes(target):
        found.setdefault(route.source_name, []).append(route)
    return found


def joined(train: Any, component: Component, routes: list[Any], place: Place) -> Field:
    """One incoherent part of a laser by all its routes. Lengths count from the first route's.

    Raises
    ------
    SymbolError : paths of different length, and a line of some width.
    """
    ways = [laws_at(train, route, component.wavelength_or(train.wavelength)) for route in routes]
    ahead = [sp.cancel(_length(laws) - _length(ways[0])) for laws in ways]
    _check_line(routes[0], ahead)
    total: Field | None = None
    for laws, more in zip(ways, ahead, strict=True):
        field = as_field(component.beam, place)
        for name, law in laws:
            field = applied(field, name, law)
        if more != 0:
            field = field.times(place.maths.phasor(sp.expand(place.wave_number * more)))
        total = field if total is None else total.plus(field)
    assert total is not None
    return total


def laws_at(train: Any, route: Any, wavelength: Any) -> list[tuple[str, Law]]:
    """(name of the part, law) at the wavelength of the light, which need not be the train's."""
    passages = ((leg, train.elements[leg.element_name].passages(wavelength)) for leg in route.legs)
    return [(leg.element_name, law) for leg, ways in passages for law in ways[leg.entered, leg.left].steps()]


def _length(laws: list[tuple[str, Law]]) -> Any:
    """Optical path length [m], exact."""
    return sum((exactly(law.path) for _, law in laws if isinstance(law, TravelLaw)), sp.S.Zero)


def _check_line(route: Any, ahead: list[Any]) -> None:
    if any(ahead) and not route.laser.line.sharp:
        raise SymbolError(
            "paths of different length add up as a form for light of one frequency; of a line of some width they are "
            "partly coherent, which numbers take into account",
            got=f"{route.source_name}.line = {route.laser.line}",
            fix=f'train.with_changes({{"{route.source_name}.line": fa.Monochromatic()}})',
        )
