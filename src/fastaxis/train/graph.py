"""The train as a directed graph of port states, and the part of it that light reaches."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any, TypeAlias

from fastaxis.maths import Scalar
from fastaxis.train.ports import Elements, Way, in_faces, out_faces, split

__all__ = ["Joints", "Node", "build", "is_source", "lit_nodes", "port_of", "source_nodes"]

Joints: TypeAlias = tuple[tuple[str, str], ...]
Node: TypeAlias = tuple[str, str, Way]


def is_source(element: object) -> bool:
    """Whether a part sends out light of its own."""
    return hasattr(type(element), "source")


def port_of(node: Node) -> str:
    """The port string of a node.

    >>> port_of(("pbs", "reflected", "out"))
    'pbs.reflected'
    """
    return f"{node[0]}.{node[1]}"


def build(elements: Elements, joints: Joints, wavelength: Scalar) -> Any:
    """A frozen networkx.DiGraph on nodes (part, face, "in" | "out").

    Edges inside a part have ``kind="inside"`` and its ``passage``; edges between parts ``kind="join"``. A face that
    light may cross both ways is two nodes, so a double pass through a plate is a path and not a loop.
    """
    import networkx as nx  # noqa: PLC0415  # a train that is only declared never needs it

    graph: Any = nx.DiGraph()
    for name, element in elements.items():
        graph.add_nodes_from((name, face, "in") for face in in_faces(element, wavelength))
        graph.add_nodes_from((name, face, "out") for face in out_faces(element, wavelength))
        for (into, out), passage in element.passages(wavelength).items():
            graph.add_edge((name, into, "in"), (name, out, "out"), kind="inside", passage=passage)
    for out_port, in_port in joints:
        graph.add_edge((*split(out_port), "out"), (*split(in_port), "in"), kind="join")
    return nx.freeze(graph)


def source_nodes(elements: Elements) -> list[Node]:
    """The port states at which light begins."""
    return [(name, element.exit or "out", "out") for name, element in elements.items() if is_source(element)]


def lit_nodes(graph: Any, sources: Iterable[Node]) -> set[Node]:
    """All port states that light of these sources reaches."""
    lit: set[Node] = set()
    waiting = list(sources)
    while waiting:
        node = waiting.pop()
        if node not in lit:
            lit.add(node)
            waiting.extend(graph.successors(node))
    return lit
