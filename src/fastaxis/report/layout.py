"""Where the parts of a train stand on paper: a schematic, not to scale, that keeps every fold."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from itertools import combinations, product
from typing import Any

from fastaxis.report.align import align, astray
from fastaxis.report.walk import Node, branches, joined, port, step

__all__ = ["Layout", "Link", "Place", "Stub", "arrange"]

Vector = tuple[int, int]
RIGHT: Vector = (1, 0)
WIDE = 10.0  # [steps]; a straight run longer than this goes on in the next row
ROW = 2.2
MOST_TURNS = 6  # so many folds are tried on both sides: 64 drawings at most
CLEAR = 0.95  # least distance of two parts on one beam
ASIDE, APART = 1.6, 1.3  # and of others, along and across the rows: their labels stand between them


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
        return known[heading] if heading in known else _back(known[_back(heading)])


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
class Layout:
    """Places of all parts, the joints between them, and the open ends.

    ``choices`` says for each fold, in the order they are met, whether it takes its first side or its second.
    """

    places: dict[str, Place] = field(default_factory=dict)
    exits: dict[tuple[str, str], Vector] = field(default_factory=dict)
    links: list[Link] = field(default_factory=list)
    stubs: list[Stub] = field(default_factory=list)
    unlit: tuple[str, ...] = ()
    choices: tuple[int, ...] = ()
    turns: int = 0

    def free(self, x: float, y: float) -> bool:
        """Whether a part set down at (x, y) would be clear of all others and of their labels."""
        return all(_clear(abs(p.x - x), abs(p.y - y)) for p in self.places.values())

    @property
    def bounds(self) -> tuple[float, float, float, float]:
        """(left, right, bottom, top) of the places of the parts."""
        xs, ys = [p.x for p in self.places.values()], [p.y for p in self.places.values()]
        return min(xs), max(xs), min(ys), max(ys)


def _clear(dx: float, dy: float) -> bool:
    near = 1e-6
    if dy < near:
        return dx > CLEAR - near
    if dx < near:
        return dy > CLEAR - near
    return dx >= ASIDE or dy >= APART


def arrange(train: Any) -> Layout:
    """Follow the light from every laser and set each part down where it is first met.

    Light runs to the right; reflected light turns up, and after a fold back to the right. Where that would lead a beam
    through a part, other sides are tried, and the drawing with the fewest crossings on the least paper is taken.
    Parts that no light reaches come in a row of their own, below.
    """
    first = _arranged(train, ())
    if not first.turns:
        return first
    trials = (_arranged(train, choices) for choices in product((0, 1), repeat=min(first.turns, MOST_TURNS)))
    return min(trials, key=_cost)


def _arranged(train: Any, choices: tuple[int, ...]) -> Layout:
    layout, graph = Layout(choices=choices), train.graph
    for source in train.sources:
        top = min((p.y for p in layout.places.values()), default=ROW) - ROW
        layout.places[source] = Place(0.0, top)
        out = (source, train.elements[source].exit or "out", "out")
        layout.exits[out[:2]] = RIGHT
        _follow(layout, train, graph, out)
    if astray(layout):
        align(layout, train)
    _set_down_unlit(layout, train)
    return layout


def _cost(layout: Layout) -> float:
    """Beams through parts count most, then stray and crossing beams, light that runs left, the size of the paper."""
    at = {
        port: layout.places[port.partition(".")[0]] for link in layout.links for port in (link.out_port, link.in_port)
    }
    ends = [(at[link.out_port], at[link.in_port]) for link in layout.links]
    struck = sum(_strikes(here, there, part) for here, there in ends for part in layout.places.values())
    crossed = sum(_cross(one, other) for one, other in combinations(ends, 2))
    left, right, bottom, top = layout.bounds
    leftward = sum(place.heading == (-1, 0) for place in layout.places.values())
    return 100 * struck + 50 * astray(layout) + 10 * crossed + leftward + (right - left + 2) * (top - bottom + 2) / 10


def _strikes(here: Place, there: Place, part: Place) -> bool:
    """Whether the beam from here to there runs through another part."""
    if part in (here, there):
        return False
    x_in = min(here.x, there.x) - 0.3 < part.x < max(here.x, there.x) + 0.3
    y_in = min(here.y, there.y) - 0.3 < part.y < max(here.y, there.y) + 0.3
    return x_in and y_in


def _cross(one: tuple[Place, Place], other: tuple[Place, Place]) -> bool:
    """Whether an upright and a level beam cross between their ends."""
    flat = [pair for pair in (one, other) if pair[0].y == pair[1].y]
    upright = [pair for pair in (one, other) if pair[0].x == pair[1].x]
    if len(flat) != 1 or len(upright) != 1:
        return False
    (a, b), (c, d) = flat[0], upright[0]
    return min(a.x, b.x) < c.x < max(a.x, b.x) and min(c.y, d.y) < a.y < max(c.y, d.y)


def _follow(layout: Layout, train: Any, graph: Any, out: Node) -> None:
    waiting, seen = [out], set[Node]()
    while waiting:
        leaving = waiting.pop(0)
        heading = layout.exits[leaving[:2]]
        entering = joined(graph, leaving)
        if entering is None:
            layout.stubs.append(Stub(port(leaving), heading))
            continue
        wrapped = entering[0] not in layout.places and _set_down(layout, train, leaving, entering)
        layout.links.append(Link(port(leaving), port(entering), wrapped))
        if entering not in seen:
            seen.add(entering)
            arriving = RIGHT if wrapped else heading
            waiting.extend(_ways_on(layout, graph, entering, arriving, leaving))


def _ways_on(layout: Layout, graph: Any, entering: Node, heading: Vector, came_from: Node) -> list[Node]:
    """The ports left from here, straight ones first, each given the direction in which light leaves it."""
    name = entering[0]
    if entering[:2] in layout.exits:  # seen before from the other side: it is met against that direction
        heading = _back(layout.exits[entering[:2]])
    layout.exits.setdefault(entering[:2], _back(heading))
    ways = sorted(branches(graph, entering), key=lambda way: bool(way[1]))
    for leaving, reflected in ways:
        if not reflected:
            layout.exits.setdefault(leaving[:2], heading)
            continue
        turned = layout.places[name].reflected(heading) or _turn(layout, graph, leaving, heading, came_from)
        if layout.places[name].reflects is None:
            layout.places[name] = replace(layout.places[name], heading=heading, reflects=turned)
        if leaving[1] == entering[1]:  # a mirror: in and out by the same face
            layout.exits[leaving[:2]] = turned
        else:
            layout.exits.setdefault(leaving[:2], turned)
    return [leaving for leaving, _ in ways]


def _back(heading: Vector) -> Vector:
    return -heading[0], -heading[1]


def _turn(layout: Layout, graph: Any, leaving: Node, heading: Vector, came_from: Node) -> Vector:
    """Where reflected light goes: straight back to where it came from, or to the chosen side."""
    entering = joined(graph, leaving)
    if entering is not None and entering[:2] == came_from[:2]:
        return _back(heading)
    sides: tuple[Vector, Vector] = ((0, 1), (0, -1)) if heading[0] else ((1, 0), (-1, 0))
    layout.turns += 1
    return sides[layout.choices[layout.turns - 1] if layout.turns <= len(layout.choices) else 0]


def _set_down(layout: Layout, train: Any, leaving: Node, entering: Node) -> bool:
    """Give a part the first free place ahead; True if that is at the start of a new row."""
    before, name, heading = layout.places[leaving[0]], entering[0], layout.exits[leaving[:2]]
    pair = (train.elements[leaving[0]], train.elements[name])
    gap = sum(step(element, upright=not heading[0]) for element in pair) / 2
    if heading == RIGHT and before.x + gap > WIDE and _may_wrap(layout, train.graph, entering, before.y):
        layout.places[name] = Place(0.0, before.y - ROW)
        return True
    while not layout.free(before.x + heading[0] * gap, before.y + heading[1] * gap):
        gap += 0.5
    layout.places[name] = Place(before.x + heading[0] * gap, before.y + heading[1] * gap, heading)
    return False


def _may_wrap(layout: Layout, graph: Any, entering: Node, row: float) -> bool:
    """Only a drawing that is one straight line so far, and stays one, is broken into rows."""
    folded = any(place.reflects for place in layout.places.values())
    lowest = min(place.y for place in layout.places.values())
    return not folded and not layout.stubs and lowest >= row and _straight(graph, entering)


def _straight(graph: Any, entering: Node) -> bool:
    node: Node | None = entering
    while node is not None:
        ways = branches(graph, node)
        if not ways:
            return True
        if len(ways) > 1 or ways[0][1]:
            return False
        node = joined(graph, ways[0][0])
    return True


def _set_down_unlit(layout: Layout, train: Any) -> None:
    layout.unlit = tuple(name for name in train.elements if name not in layout.places)
    row = min((p.y for p in layout.places.values()), default=ROW) - ROW
    for k, name in enumerate(layout.unlit):
        layout.places[name] = Place(1.2 * k, row)
