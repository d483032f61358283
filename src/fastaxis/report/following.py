"""The light of one laser followed through the graph: which way it runs at every part, and where it is open."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from typing import Any

from fastaxis.report.walk import Node, branches, joined, port

__all__ = ["RIGHT", "Followed", "Link", "Place", "Stub", "Vector", "follow"]

Vector = tuple[int, int]
RIGHT: Vector = (1, 0)


@dataclass(frozen=True)
class Place:
    """Where a part stands, how the light first meets it and where it sends what it reflects."""

    x: float
    y: float
    heading: Vector = RIGHT
    reflects: Vector | None = None

    def reflected(self, heading: Vector) -> Vector | None:
        """Where light of any heading goes when it is reflected here: the mirror that takes heading to reflects."""
        if self.reflects is None:
            return None
        known = {self.reflects: self.heading, self.heading: self.reflects}
        # A mirror at right angles to the beam leaves the other two directions alone.
        return known.get(heading) or _back(known.get(_back(heading), _back(heading)))


@dataclass(frozen=True)
class Link:
    """A joint that light takes; ``wrapped`` if it goes on in the next row."""

    out_port: str
    in_port: str
    wrapped: bool = False


@dataclass(frozen=True)
class Stub:
    """A port that light leaves towards nothing."""

    port: str
    heading: Vector


@dataclass
class Followed:
    """Directions only: the places are still to be found.

    ``exits`` and ``enters`` say for (part, face) in which direction light leaves there, and enters. ``choices`` says
    for each fold, in the order they are met, whether it takes its first side or its second.
    """

    choices: tuple[int, ...] = ()
    places: dict[str, Place] = field(default_factory=dict)
    exits: dict[tuple[str, str], Vector] = field(default_factory=dict)
    enters: dict[tuple[str, str], Vector] = field(default_factory=dict)
    links: list[Link] = field(default_factory=list)
    stubs: list[Stub] = field(default_factory=list)
    turns: int = 0

    @property
    def straight(self) -> bool:
        """Whether all is one line without a fold, an open end or a way back."""
        once = len(self.links) == len(self.places) - 1
        return once and not self.stubs and not any(place.reflects for place in self.places.values())


def follow(train: Any, source: str, choices: tuple[int, ...]) -> Followed:
    """All ways of the light of a laser, which starts to the right."""
    found, graph = Followed(choices), train.graph
    out: Node = (source, train.elements[source].exit or "out", "out")
    found.places[source], found.exits[out[:2]] = Place(0.0, 0.0), RIGHT
    waiting, seen = [out], set[Node]()
    while waiting:
        leaving = waiting.pop(0)
        heading = found.exits[leaving[:2]]
        entering = joined(graph, leaving)
        if entering is None:
            if leaving not in seen:
                found.stubs.append(Stub(port(leaving), heading))
                seen.add(leaving)
            continue
        if entering not in seen:
            seen.add(entering)
            found.places.setdefault(entering[0], Place(0.0, 0.0, heading))
            found.links.append(Link(port(leaving), port(entering)))
            waiting.extend(_ways_on(found, graph, entering, heading, leaving))
    return found


def _ways_on(found: Followed, graph: Any, entering: Node, heading: Vector, came_from: Node) -> list[Node]:
    """The ports left from here, straight ones first, each given the direction in which light leaves it."""
    name = entering[0]
    if entering[:2] in found.exits:  # seen before from the other side: it is met against that direction
        heading = _back(found.exits[entering[:2]])
    else:  # a splitter stands as it was met first, so another of its faces says where light has to come from
        straight = [out[:2] for out, reflected in branches(graph, entering) if not reflected]
        heading = next((found.exits[out] for out in straight if out in found.exits), heading)
    found.exits.setdefault(entering[:2], _back(heading))
    found.enters[entering[:2]] = heading
    ways = sorted(branches(graph, entering), key=lambda way: bool(way[1]))
    for leaving, reflected in ways:
        if not reflected:
            found.exits.setdefault(leaving[:2], heading)
            continue
        turned = found.places[name].reflected(heading) or _turn(found, graph, leaving, heading, came_from)
        if found.places[name].reflects is None:
            found.places[name] = replace(found.places[name], heading=heading, reflects=turned)
        if leaving[1] == entering[1]:  # a mirror: in and out by the same face
            found.exits[leaving[:2]] = turned
        else:
            found.exits.setdefault(leaving[:2], turned)
    return [leaving for leaving, _ in ways]


def _back(heading: Vector) -> Vector:
    return -heading[0], -heading[1]


def _turn(found: Followed, graph: Any, leaving: Node, heading: Vector, came_from: Node) -> Vector:
    """Where reflected light goes: straight back to where it came from, or to the chosen side."""
    entering = joined(graph, leaving)
    if entering is not None and entering[:2] == came_from[:2]:
        return _back(heading)
    sides: tuple[Vector, Vector] = ((0, 1), (0, -1)) if heading[0] else ((1, 0), (-1, 0))
    found.turns += 1
    return sides[found.choices[found.turns - 1] if found.turns <= len(found.choices) else 0]
