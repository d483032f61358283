"""Small steps on the graph of a train: what a port is joined to, and the ways on from there."""

from __future__ import annotations

import math
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


def step(element: Any, *, upright: bool, room: tuple[float, float] = (0.0, 0.0), longest: float = 0.0) -> float:
    """Room a part takes along the beam.

    Parameters
    ----------
    upright : whether the beam runs up or down the page.
    room : (width, height) of what is written at the part.
    longest : the longest of all distances [m]; a longer distance is drawn longer, though not to scale.
    """
    if is_space(element):
        known = longest > 0 and isinstance(element.distance, int | float)
        return max(0.85 + (0.6 * math.sqrt(element.distance / longest) if known else 0.0), room[0] + 0.2)
    if upright:
        return max(1.2, room[1] + 0.3)
    # The faces of a splitter are named along the beam.
    return max(1.7 if len(getattr(element, "faces", ())) > 2 else 1.05, room[0] + 0.16)
