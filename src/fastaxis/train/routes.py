"""Light paths: from a source, through the parts in order, to a port."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.laws import Flip, Law, Passage
from fastaxis.train.graph import Node, port_of
from fastaxis.train.ports import Elements, read_port
from fastaxis.train.suggest import feed_code

__all__ = ["Leg", "Route", "find_route", "target_node"]


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


def find_route(elements: Elements, graph: Any, lit: set[Node], target: str) -> Route:
    """The one lit path to a target.

    Raises
    ------
    WiringError : no light gets there, or light by two paths.
    """
    node = target_node(elements, graph, lit, target)
    if node not in lit:
        raise WiringError(
            "no light gets there",
            got=f"{port_of(node)}: not on any path from a laser",
            fix=feed_code(elements, graph, lit, node),
        )
    end, legs = node, []
    while before := _one_before(graph, lit, node):
        if graph.edges[before, node]["kind"] == "inside":
            legs.append(Leg(node[0], before[1], node[1], graph.edges[before, node]["passage"]))
        node = before
    return Route(node[0], elements[node[0]], tuple(reversed(legs)), port_of(end))


def _one_before(graph: Any, lit: set[Node], node: Node) -> Node | None:
    before = [other for other in graph.predecessors(node) if other in lit]
    if len(before) > 1:
        meeting = " and ".join(port_of(other) for other in before)
        feeding = next(graph.predecessors(before[0]), before[0])
        raise WiringError(
            "coherent joining of paths is not available yet, so a port is answered when one path leads to it; "
            "ask before they meet",
            got=f"{port_of(node)}: light by way of {meeting} meets in {node[0]}",
            fix=f'train.route("{port_of(feeding)}")',
        )
    return before[0] if before else None
