"""Small steps on the graph of a train: what a port is joined to, and the ways on from there."""

from __future__ import annotations

from typing import Any

__all__ = ["Node", "branches", "is_space", "joined", "port", "step"]

Node = tuple[str, str, str]


def port(node: Node) -> str:
    """The port string of a node, "pbs.reflected"."""
    return f"{node[0]}.{node[1]}"


def joined(graph: Any, leaving: Node) -> Node | None:
    """The port that light enters after leaving this one; None if it is open."""
    return next(iter(graph.successors(leaving)), None) if leaving in graph else None


def branches(graph: Any, entering: Node) -> list[tuple[Node, str]]:
    """(port left, how it was reflected) for light that enters here; empty where light ends."""
    return [(out, graph.edges[entering, out]["passage"].reflected) for out in graph.successors(entering)]


def is_space(element: object) -> bool:
    """Whether a part is empty space, drawn as a distance."""
    return type(element).__name__ == "FreeSpace"


def step(element: object, *, upright: bool) -> float:
    """Room a part takes along the beam; ``upright`` if that runs up or down the page."""
    if is_space(element):
        return 0.85
    if upright:
        return 1.2
    # The faces of a splitter are named along the beam.
    return 1.7 if len(getattr(element, "faces", ())) > 2 else 1.05
