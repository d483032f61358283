"""The connection that was probably meant, as code to paste."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

from fastaxis.train.graph import Node, port_of
from fastaxis.train.ports import Elements

__all__ = ["feed_code", "join_code", "nearest", "open_out", "upstream_end"]


def join_code(out_port: str, in_port: str) -> str:
    """Code that makes one joint.

    >>> print(join_code("pbs.reflected", "cam.in"))
    train.join("pbs.reflected", "cam.in")
    """
    return f'train.join("{out_port}", "{in_port}")'


def open_out(graph: Any, lit: set[Node]) -> list[Node]:
    """Lit out-ports that are joined to nothing, in the order of the graph."""
    return [node for node in graph if node in lit and node[2] == "out" and graph.out_degree(node) == 0]


def nearest(elements: Elements, candidates: Iterable[Node], name: str) -> Node | None:
    """The candidate declared nearest to a part, before it rather than after it; a port of the part itself never."""
    place = {other: index for index, other in enumerate(elements)}
    here = place[name]

    def distance(node: Node) -> tuple[int, bool]:
        return abs(place[node[0]] - here), place[node[0]] > here

    return min((node for node in candidates if node[0] != name), key=distance, default=None)


def upstream_end(graph: Any, node: Node) -> Node:
    """The first in-port of the unlit stretch that leads to a node: where the light is missing."""
    seen = {node}
    while True:
        before = [other for other in graph.predecessors(node) if other not in seen]
        if not before:
            return node
        node = before[0]
        seen.add(node)


def feed_code(elements: Elements, graph: Any, lit: set[Node], node: Node) -> str:
    """Code that would bring light to a dark port state."""
    start = upstream_end(graph, node)
    if start[2] == "out":
        start = next((other for other in graph if other[0] == start[0] and other[2] == "in"), start)
    source = nearest(elements, open_out(graph, lit), start[0])
    if source is None:
        return 'train.add(fa.BeamSplitter(name="splitter"))'
    return join_code(port_of(source), port_of(start))
