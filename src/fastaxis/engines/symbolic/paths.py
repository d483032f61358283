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
from fastaxis.laws import TravelLaw
from fastaxis.light import Component

__all__ = ["joined", "open_routes"]


def open_routes(train: Any, target: str) -> dict[str, list[Any]]:
    """The routes to a port by the laser they start from.

    Raises
    ------
    SymbolError : light runs round a loop on the way, so that there is no end of paths.
    """
    routes = train.routes(target)
    if _has_loop(train.graph, routes):
        raise SymbolError(
            "light that runs round a loop comes by ever longer paths, which have no closed form here",
            got=f"{target}: a loop on the way",
            fix=f'train.power("{target}")',
        )
    found: dict[str, list[Any]] = {}
    for route in routes:
        found.setdefault(route.source_name, []).append(route)
    return found


def _has_loop(graph: Any, routes: Any) -> bool:
    """Whether some light on its way to the port comes back to where it was."""
    ends = {(leg.element_name, leg.left, "out") for route in routes for leg in route.legs[-1:]}
    starts = {(route.source_name, route.laser.exit, "out") for route in routes}
    on_the_way = _closure(graph.successors, starts) & _closure(graph.predecessors, ends)
    # What has nothing before it is taken away until only loops, and what they feed, are left.
    while free := {node for node in on_the_way if on_the_way.isdisjoint(graph.predecessors(node))}:
        on_the_way -= free
    return bool(on_the_way)


def _closure(neighbours: Any, start: set[Any]) -> set[Any]:
    found, waiting = set[Any](), list(start)
    while waiting:
        node = waiting.pop()
        if node not in found:
            found.add(node)
            waiting.extend(neighbours(node))
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
