"""All ways light takes to a target: the arms of an interferometer, and the round trips of a cavity until they fade."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from functools import cache, cached_property, reduce
from itertools import pairwise
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import SamplingError
from fastaxis.laws import AxisLaw, ScalarLaw
from fastaxis.plan.binding import bound, refuse_letters
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.steps import Step
from fastaxis.train.graph import Node, lit_nodes, port_of, source_nodes
from fastaxis.train.routes import Leg, Route, lit_target

__all__ = ["FAINT", "MOST", "Strength", "arms", "upstream"]

# Amplitude of a path over that of the source at which it is left out: its power is 1e-28, and what it changes by
# interference is 1e-14, a few roundings. Ways that a polarizer or splitter closes exactly go the same way.
FAINT = 1e-14
MOST = 1024  # paths followed; each is propagated, and a camera adds all of them up
Matrix = NDArray[np.complex128]
Laws = Callable[[Node, Node], tuple[Any, ...]]


@dataclass(frozen=True)
class Strength:
    """The largest amplitude that any state of the source can still have: exact while parts are uniform.

    Parameters
    ----------
    states : (2, n), the states of the source after the uniform parts so far; the identity behind a patterned part,
        which could turn the light into anything.
    scale : amplitude kept apart.
    known : whether ``states`` are still those of the source.
    """

    states: Matrix
    scale: float = 1.0
    known: bool = True

    @cached_property
    def amplitude(self) -> float:
        largest = np.linalg.norm(self.states, axis=0).max() if self.known else np.linalg.norm(self.states, 2)
        return self.scale * float(largest)

    def past(self, law: Any) -> Strength:
        matrix = as_matrix(Step((), law))
        if matrix is not None:
            return replace(self, states=np.array(matrix.matrix) @ self.states)
        if isinstance(law, AxisLaw):
            most = max(_most(law.along.power), _most(law.across.power))
            return Strength(np.eye(2, dtype=complex), self.amplitude * math.sqrt(most), known=False)
        if isinstance(law, ScalarLaw):
            return replace(self, scale=self.scale * math.sqrt(_most(law.transmission.power)))
        return self


def _most(power: Any) -> float:
    return float(power) if isinstance(power, int | float) else 1.0


@dataclass(frozen=True)
class _Walk:
    """Light on its way: where it is, how it came, how strong it may be."""

    node: Node
    strength: Strength
    before: _Walk | None = None

    def nodes(self) -> Iterator[_Walk]:
        here: _Walk | None = self
        while here is not None:
            yield here
            here = here.before

    def gain(self) -> float | None:
        """Amplitude kept since the light was last here; None on the first visit."""
        earlier = next((walk for walk in self.nodes() if walk is not self and walk.node == self.node), None)
        return None if earlier is None else self.strength.amplitude / earlier.strength.amplitude


def upstream(graph: Any, lit: set[Node], end: Node) -> set[Node]:
    """The lit port states from which light can get to ``end``."""
    found, waiting = set[Node](), [end]
    while waiting:
        node = waiting.pop()
        if node not in found and node in lit:
            found.add(node)
            waiting.extend(graph.predecessors(node))
    return found


def arms(train: Any, target: str) -> tuple[Route, ...]:
    """All paths to a target that carry light, round trips included, the shortest first.

    Raises
    ------
    WiringError : no light gets there.
    SamplingError : too many paths carry light, as in a cavity of high finesse.
    SymbolError : several paths lead there, and a part or a laser on one has a letter without a value.
    """
    graph, sources = train.graph, source_nodes(train.elements)
    lit = lit_nodes(graph, sources)
    end = lit_target(train.elements, graph, lit, target)
    inside = upstream(graph, lit, end)
    if all(sum(before in inside for before in graph.predecessors(node)) < 2 for node in inside):
        return (train.route(target),)
    found, laws = list[_Walk](), _asked(train)
    for start in sources:
        if start in inside:
            laser = train.elements[start[0]]
            refuse_letters(start[0], laser.parameters())
            states = [t.state.jones for part in bound(laser.source).components for t in part.beam.terms]
            _follow(graph, inside, end, _Walk(start, Strength(np.array(states).T)), found, laws=laws)
    if not found:  # a port that is dark by polarization: one of its paths says so
        return tuple(train.routes(target)[:1])
    legs = {
        (a, b): Leg(a[0], a[1], b[1], data["passage"])
        for a, b, data in graph.edges(data=True)
        if a in inside and b in inside and data["kind"] == "inside"
    }
    return tuple(_route(train, walk, legs) for walk in found)


def _asked(train: Any) -> Laws:
    """The laws of light between two port states, exact numbers made floats; each pair is asked for once."""

    @cache
    def laws(here: Node, ahead: Node) -> tuple[Any, ...]:
        edge = train.graph.edges[here, ahead]
        if edge["kind"] != "inside":
            return ()
        refuse_letters(here[0], train.elements[here[0]].parameters())
        return tuple(bound(law) for law in edge["passage"].laws)

    return laws


def _follow(graph: Any, inside: set[Node], end: Node, start: _Walk, found: list[_Walk], *, laws: Laws) -> None:
    waiting, least = [start], 0.0
    while waiting:
        walk = waiting.pop(0)
        if walk.node == end:
            found.append(walk)
        if len(found) > MOST or len(waiting) > MOST:
            raise _too_many(end, least)
        if graph.in_degree(walk.node) > 1:
            least = max(least, walk.gain() or 0.0)
        for ahead in graph.successors(walk.node):
            if ahead in inside:
                there = _Walk(ahead, reduce(Strength.past, laws(walk.node, ahead), walk.strength), walk)
                if there.strength.amplitude > FAINT:
                    waiting.append(there)


def _too_many(end: Node, gain: float) -> SamplingError:
    port = port_of(end)
    if gain == 0:
        got = f"{port}: the paths double at every pair of splitters"
    elif gain > 1 - 1e-12:  # a few roundings a part
        got = f"{port}: light loses nothing on its way round and would build up for ever"
    else:
        trips = math.ceil(math.log(FAINT) / math.log(gain))
        got = f"{port}: {gain:.4g} of the amplitude is left after a round trip, which takes {trips} trips to fade"
    return SamplingError(
        f"light with a shape is followed along at most {MOST} paths; of plane waves all are summed at once",
        got=got,
        fix=f'train.power("{port}", engine="uniform")',
    )


def _route(train: Any, walk: _Walk, legs: dict[tuple[Node, Node], Leg]) -> Route:
    nodes = [step.node for step in walk.nodes()][::-1]
    taken = tuple(legs[pair] for pair in pairwise(nodes) if pair in legs)
    return Route(nodes[0][0], train.elements[nodes[0][0]], taken, port_of(nodes[-1]))
