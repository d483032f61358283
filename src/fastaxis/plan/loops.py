"""Where light goes round on its way to a port: the place that all trips pass, and the ways to it, round and out."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise
from typing import Any

from fastaxis.laws import Flip, Stop
from fastaxis.plan.arms import upstream
from fastaxis.plan.spread import closed
from fastaxis.train.graph import Node, lit_nodes, source_nodes
from fastaxis.train.routes import lit_target

__all__ = ["Loops", "Walk", "Ways", "has_hole", "reflections_round"]

MOST_WAYS = 16

Walk = tuple[Node, ...]


def reflections_round(train: Any, target: str) -> set[int] | None:
    """How often light that goes round on its way to a target is reflected on a trip; None where none goes round.

    Empty where loops are tangled, so that no one place is passed on every trip.
    """
    bench = Loops.of(train, target)
    if not bench.loops():
        return None
    place = bench.place()
    walks = bench.walks(place, place, place) if place else []
    return {_reflections(train, walk) for walk in walks}


def _reflections(train: Any, walk: Walk) -> int:
    edges = (train.graph.edges[way] for way in pairwise(walk))
    laws = [law for edge in edges if edge["kind"] == "inside" for law in edge["passage"].steps()]
    return sum(isinstance(law, Flip) for law in laws)


@dataclass(frozen=True)
class Ways:
    """Lists of port states: past the place that all trips pass, to it, from it to itself and to the end."""

    direct: list[Walk]
    entries: list[Walk]
    rounds: list[Walk]
    exits: list[Walk]


@dataclass(frozen=True)
class Loops:
    """The port states that light passes on its way to a target."""

    graph: Any
    inside: set[Node]
    end: Node

    @classmethod
    def of(cls, train: Any, target: str) -> Loops:
        graph = train.graph
        lit = lit_nodes(graph, source_nodes(train.elements))
        end = lit_target(train.elements, graph, lit, target)
        return cls(graph, upstream(graph, lit, end), end)

    def place(self) -> Node | None:
        """Where light comes together that every trip passes; None if there is no such place, or no loop.

        Directly behind a hole light ends at the rim; elsewhere its tails are followed as far as they matter.
        """
        if not self.loops():
            return None
        meeting = sorted(node for node in self.inside if len(self._before(node)) > 1)
        return next((node for node in (*self._holes(), *meeting) if not self.loops(node)), None)

    def _holes(self) -> list[Node]:
        edges = [(out, d) for into, out, d in self.graph.edges(data=True) if {into, out} <= self.inside]
        inner = [(out, d["passage"].laws) for out, d in edges if d["kind"] == "inside"]
        return sorted(out for out, laws in inner if any(has_hole(getattr(law, "stop", None)) for law in laws))

    def _before(self, node: Node) -> list[Node]:
        return [before for before in self.graph.predecessors(node) if before in self.inside]

    def loops(self, without: Node | None = None) -> bool:
        """Whether light goes round, also if it does not go on from a place."""
        left = self.inside - {without}
        before = {node: len(left.intersection(self._before(node))) for node in left}
        free = [node for node, count in before.items() if not count]
        while free:
            node = free.pop()
            left.remove(node)
            for ahead in left.intersection(self.graph.successors(node)):
                before[ahead] -= 1
                if not before[ahead]:
                    free.append(ahead)
        return bool(left)

    def ways(self, start: Node, place: Node) -> Ways | None:
        """All ways; None if there are too many."""
        there = self.end == place
        found = Ways(
            [] if there else self.walks(start, self.end, place), self.walks(start, place, place),
            self.walks(place, place, place), [(place,)] if there else self.walks(place, self.end, place),
        )  # fmt: skip
        lists = (found.direct, found.entries, found.rounds, found.exits)
        return None if max(map(len, lists)) > MOST_WAYS or not found.entries else found

    def walks(self, start: Node, end: Node, barred: Node) -> list[Walk]:
        """Walks of at least one step, none of which goes on from the barred place."""
        found, waiting = list[Walk](), list[Walk]([(start,)])
        while waiting and len(found) <= MOST_WAYS:
            walk = waiting.pop()
            for ahead in self.graph.successors(walk[-1]):
                if ahead == end:
                    found.append((*walk, ahead))
                elif ahead in self.inside and ahead != barred:
                    waiting.append((*walk, ahead))
        return found


def has_hole(stop: Stop | None) -> bool:
    """Whether a stop bounds the light on all sides."""
    return stop is not None and closed(stop)
