"""Light that comes back to where it was: the steady state of a cavity as a closed form, for plane waves."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.denominators import over
from fastaxis.engines.symbolic.elimination import Loops, Matrix
from fastaxis.engines.symbolic.field import Field
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.sources import as_field
from fastaxis.engines.symbolic.steps import applied
from fastaxis.engines.symbolic.waves import Place, StillWave, Wave
from fastaxis.engines.symbolic.waves.base import exactly
from fastaxis.errors import SymbolError
from fastaxis.laws import TravelLaw
from fastaxis.light import Component
from fastaxis.plan.arms import upstream
from fastaxis.train.graph import Node, lit_nodes, source_nodes
from fastaxis.train.routes import lit_target

__all__ = ["circulating", "has_loop"]

MOST_LOOPS = 3  # with letters at every mirror, four of them take 2800 terms and a minute


def has_loop(train: Any, target: str) -> bool:
    """Whether some light on its way to the port comes back to where it was."""
    graph, on_the_way = train.graph, _on_the_way(train, target)[0]
    # What has nothing before it is taken away until only loops, and what they feed, are left.
    while free := {node for node in on_the_way if on_the_way.isdisjoint(graph.predecessors(node))}:
        on_the_way -= free
    return bool(on_the_way)


def _on_the_way(train: Any, target: str) -> tuple[set[Node], Node]:
    """The lit port states that light passes on its way to a port, and the port's own."""
    graph = train.graph
    lit = lit_nodes(graph, source_nodes(train.elements))
    end = lit_target(train.elements, graph, lit, target)
    return upstream(graph, lit, end), end


def circulating(train: Any, component: Component, source: str, target: str, place: Place) -> Field:
    """One incoherent part of a laser behind a bench with loops; the carrier counts from its first route.

    Plane waves at all port states solve linear equations with one 2x2 matrix for each passage. What follows where all
    light has come together is applied part by part, and may give it a shape.

    Raises
    ------
    SymbolError : light with a shape goes round; a line of some width; too many loops.
    """
    if not train.elements[source].line.sharp:
        raise SymbolError(
            "light of one frequency alone has a steady field in a loop; a line of some width is summed in numbers",
            got=f"{source}.line = {train.elements[source].line}",
            fix=f'train.with_changes({{"{source}.line": fa.Monochromatic()}})',
        )
    graph, (nodes, end) = train.graph, _on_the_way(train, target)
    start = next(node for node in nodes if node[0] == source)
    tail = _tail(graph, nodes, end)
    meeting = upstream(graph, nodes, tail[0])
    bench = _Bench(train, target, component.wavelength_or(train.wavelength), place)
    light = as_field(component.beam, place)
    if len(light.pieces) > 1 or not _plane(light):
        raise bench.refusal(f"{source} sends a beam of finite width")
    ((wave, pair),) = light.pieces
    ways = {way: bench.matrix(way, wave) for way in graph.edges if meeting.issuperset(way)}
    loops = Loops.of(ways, start, tail[0])
    if len(loops.places) > MOST_LOOPS:
        raise SymbolError(
            f"more than {MOST_LOOPS} loops that feed each other have a closed form of thousands of terms",
            got=f"{target}: {len(loops.places)} loops",
            fix=f'train.power("{target}")',
        )
    field = over(loops.light(pair), wave, light)
    for way in pairwise(tail):
        field = bench.behind(way, field)
    first = next(route for route in train.routes(target) if route.source_name == source)
    return field.times(bench.carrier(-sum(exactly(law.path) for _, law in first.steps() if isinstance(law, TravelLaw))))


def _tail(graph: Any, nodes: set[Node], end: Node) -> list[Node]:
    """The port states from the last one at which light of several ways meets, to the end."""
    tail = [end]
    while len(before := [node for node in graph.predecessors(tail[0]) if node in nodes]) == 1:
        tail.insert(0, before[0])
    return tail


def _plane(field: Field) -> bool:
    """Whether light is the same everywhere."""
    (wave, pair), *others = field.pieces
    ring = field.place.maths.ring
    shaped = {place for place, generator in enumerate(ring.generators) if generator.expression.has(R, PHI)}
    even = isinstance(wave, StillWave) and not wave.shape.has(R) and not others
    return even and not any(shaped & ring.exponents(key)[1].keys() for poly in pair for key in poly.terms)


@dataclass(frozen=True)
class _Bench:
    """The passages of a bench at one wavelength, with exact carriers."""

    train: Any
    target: str
    wavelength: Any
    place: Place

    def behind(self, way: tuple[Node, Node], field: Field) -> Field:
        """Light that has gone from one port state to the next."""
        here, there = way
        if self.train.graph.edges[way]["kind"] != "inside":
            return field
        length = sp.S.Zero
        for law in self.train.elements[here[0]].passages(self.wavelength)[here[1], there[1]].steps():
            field = applied(field, here[0], law)
            length += exactly(law.path) if isinstance(law, TravelLaw) else 0
        return field.times(self.carrier(length))

    def carrier(self, length: Any) -> Poly:
        """exp(i k length)."""
        return self.place.maths.phasor(sp.expand(self.place.wave_number * length))

    def matrix(self, way: tuple[Node, Node], wave: Wave) -> Matrix:
        """What a passage does to a plane wave."""
        one, zero = self.place.maths.number(1), self.place.maths.ring.zero
        columns = [self.behind(way, Field(((wave, pair),), self.place)) for pair in ((one, zero), (zero, one))]
        if not all(map(_plane, columns)):
            raise self.refusal(f"{way[0][0]} gives it a shape")
        (left, right) = (column.pieces[0][1] for column in columns)
        return (left[0], right[0]), (left[1], right[1])

    def refusal(self, why: str) -> SymbolError:
        return SymbolError(
            "light that goes round a loop has a closed form as a plane wave; a beam has another size on every trip",
            got=f"{self.target}: a loop on the way, and {why}",
            fix=f'train.power("{self.target}")',
        )
