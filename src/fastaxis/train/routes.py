"""Light paths: from a source, through the parts in order, to a port."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.laws import Flip, Law, Passage
from fastaxis.train.graph import Node, port_of
from fastaxis.train.ports import Elements, read_port
from fastaxis.train.suggest import feed_code

__all__ = ["Leg", "Route", "find_route", "find_routes", "lit_target", "target_node"]

MOST = 4096  # twelve interferometers in a row; beyond it nobody reads the list


@dataclass(frozen=True)
class Leg:
    """One part on a path: the face entered, the face left, and what happens between them."""

    element_name: str
    entered: str
    left: str
    passage: Passage


@dataclass(frozen=True)
class Route:
    """The path of light from a laser to a port.

    Parameters
    ----------
    source_name, laser : where the light comes from.
    legs : the parts in the order the light meets them; a part met twice is there twice.
    target : the port where it ends, "cam.in" or "qp.back".
    """

    source_name: str
    laser: Element
    legs: tuple[Leg, ...]
    target: str

    def steps(self) -> list[tuple[str, Law]]:
        """(name of the part, law) in the order the light meets them, frame changes at reflections included."""
        return [(leg.element_name, law) for leg in self.legs for law in leg.passage.steps()]

    @property
    def reflections(self) -> int:
        """How often the picture was reversed on the way, by a reflection or by a reversing prism."""
        return sum(isinstance(law, Flip) for _, law in self.steps())

    @property
    def parity(self) -> int:
        """+1 when the picture arrives as it left, -1 when it arrives mirrored."""
        return -1 if self.reflections % 2 else 1

    def __str__(self) -> str:
        return " -> ".join((self.source_name, *(leg.element_name for leg in self.legs), self.target))


def target_node(elements: Elements, graph: Any, lit: set[Node], target: str) -> Node:
    """The port state meant by a target: light that leaves the port if there is any, else light that arrives."""
    name, face = read_port(elements, target)
    element = elements[name]
    face = face or element.exit or element.entry or ""
    leaving: Node = (name, face, "out")
    arriving: Node = (name, face, "in")
    present = [node for node in (leaving, arriving) if node in graph]
    return next((node for node in present if node in lit), (present or [arriving])[0])


def lit_target(elements: Elements, graph: Any, lit: set[Node], target: str) -> Node:
    """The port state meant by a target, which light reaches.

    Raises
    ------
    WiringError : no light gets there.
    """
    node = target_node(elements, graph, lit, target)
    if node not in lit:
        raise WiringError(
            "no light gets there",
            got=f"{port_of(node)}: not on any path from a laser",
            fix=feed_code(elements, graph, lit, node),
        )
    return node


def find_route(elements: Elements, graph: Any, lit: set[Node], target: str) -> Route:
    """The one lit path to a target.

    Raises
    ------
    WiringError : no light gets there, or light by several paths.
    """
    end = lit_target(elements, graph, lit, target)
    node, back = end, [end]
    while before := _one_before(graph, lit, node, end):
        back.append(before)
        node = before
    return _route(elements, graph, tuple(reversed(back)))


def _one_before(graph: Any, lit: set[Node], node: Node, end: Node) -> Node | None:
    before = [other for other in graph.predecessors(node) if other in lit]
    if len(before) > 1:
        meeting = " and ".join(port_of(other) for other in before)
        raise WiringError(
            "light gets there by several paths, whose fields add up; each of them is a route of its own",
            got=f"{port_of(end)}: light by way of {meeting} meets in {node[0]}",
            fix=f'train.routes("{port_of(end)}")',
        )
    return before[0] if before else None


def find_routes(elements: Elements, graph: Any, lit: set[Node], target: str) -> tuple[Route, ...]:
    """All lit paths to a target that meet no port state twice: of a cavity, those without a whole round trip.

    Raises
    ------
    WiringError : no light gets there, or light by too many paths to list.
    """
    end = lit_target(elements, graph, lit, target)
    found: list[tuple[Node, ...]] = []
    waiting: list[tuple[Node, ...]] = [(end,)]
    while waiting:
        walk = waiting.pop()
        before = [other for other in graph.predecessors(walk[0]) if other in lit]
        if not before:
            found.append(walk)
        if len(found) > MOST:
            raise WiringError(
                f"more than {MOST} paths are not listed; plane waves need no list of them",
                got=f"{port_of(end)}: paths double at every pair of splitters",
                fix=f'train.power("{port_of(end)}", engine="uniform")',
            )
        waiting += [(other, *walk) for other in reversed(before) if other not in walk]
    return tuple(_route(elements, graph, walk) for walk in found)


def _route(elements: Elements, graph: Any, walk: tuple[Node, ...]) -> Route:
    legs = tuple(
        Leg(into[0], into[1], out[1], graph.edges[into, out]["passage"])
        for into, out in pairwise(walk)
        if graph.edges[into, out]["kind"] == "inside"
    )
    return Route(walk[0][0], elements[walk[0][0]], legs, port_of(walk[-1]))
