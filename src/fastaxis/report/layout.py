"""Where the parts of a train stand on paper: a schematic, not to scale, that keeps every fold."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field, replace
from itertools import combinations, pairwise, product
from typing import Any

from fastaxis.report.following import RIGHT, Followed, Link, Place, Stub, Vector, follow
from fastaxis.report.settle import Beam, Settled, settle, sketched
from fastaxis.report.walk import is_space, step

__all__ = ["Layout", "Link", "Place", "Stub", "arrange"]

WIDE = 10.0  # [steps]; a straight run longer than this goes on in the next row
ROW = 2.2
MOST_TURNS = 5  # so many folds are tried on both sides together: 32 drawings; of more, one at a time
ROUNDS = 2
OPEN = 0.95  # room for an open end, from the middle of its part
APART = (1.5, 1.45)  # least distance of parts that are not neighbours, along and across: their labels stand between
SLIM = (0.85, 0.6)  # and of open ends and empty spaces

Room = Mapping[str, tuple[float, float]]


@dataclass
class Layout:
    """Places of all parts, the joints between them, and the open ends.

    Parameters
    ----------
    places : by name.
    exits, enters : (part, face) -> direction in which light leaves there, and enters.
    links : joints that light takes; ``bent`` those that no straight line could draw, by their port left.
    stubs : ports that light leaves towards nothing.
    unlit : names of the parts without light.
    """

    places: dict[str, Place] = field(default_factory=dict)
    exits: dict[tuple[str, str], Vector] = field(default_factory=dict)
    enters: dict[tuple[str, str], Vector] = field(default_factory=dict)
    links: list[Link] = field(default_factory=list)
    stubs: list[Stub] = field(default_factory=list)
    bent: frozenset[str] = frozenset()
    unlit: tuple[str, ...] = ()

    @property
    def bounds(self) -> tuple[float, float, float, float]:
        """(left, right, bottom, top) of the places of the parts."""
        xs, ys = [p.x for p in self.places.values()], [p.y for p in self.places.values()]
        return min(xs), max(xs), min(ys), max(ys)

    def ends(self, link: Link) -> tuple[Place, Place]:
        """The places of the two parts of a joint."""
        return self.places[_part(link.out_port)], self.places[_part(link.in_port)]


def arrange(train: Any, room: Room | None = None) -> Layout:
    """Follow the light from every laser and set each part down.

    Light runs to the right; reflected light turns up, and after a fold back to the right. Other sides are tried as
    well, and the drawing with the fewest bent and crossing beams on the least paper is taken. Parts that no light
    reaches come in a row of their own, below.

    Parameters
    ----------
    train : the train.
    room : (width, height) [steps] of what is written at each part.
    """
    layout, rooms = Layout(), room or {}
    seen: set[str] = set()
    for source in train.sources:
        if source not in seen:
            followed = _best(train, source, rooms)
            seen |= followed.places.keys()
            _stack(layout, followed, _set_down(train, followed, rooms))
    _set_down_unlit(layout, train, rooms)
    return layout


def _best(train: Any, source: str, rooms: Room) -> Followed:
    """The light of one laser, turned at every fold to the side that gives the plainest drawing."""
    first = follow(train, source, ())
    turns = first.turns
    if not turns:
        return first
    tried: dict[tuple[int, ...], tuple[float, Followed]] = {}

    def cost(choices: tuple[int, ...]) -> float:
        if choices not in tried:
            followed = follow(train, source, choices)
            tried[choices] = (_cost(train, followed, rooms), followed)
        return tried[choices][0]

    few = min(turns, MOST_TURNS)
    best = min((choices + (0,) * (turns - few) for choices in product((0, 1), repeat=few)), key=cost)
    for k in list(range(turns)) * ROUNDS if turns > few else ():
        best = min(best, (*best[:k], 1 - best[k], *best[k + 1 :]), key=cost)
    return tried[best][1]


def _cost(train: Any, followed: Followed, rooms: Room) -> float:
    """Bent beams count most, then beams through parts and crossing beams, light that runs left, size of the paper."""
    names, beams = _beams(train, followed, rooms)
    found = sketched(names, beams)
    bent = sum(_detour(followed, found, link) for link in _pairs(iter(followed.links)).values())
    straight = [beam for beam in beams if beam not in found.bent]
    points = [(found.x[name], found.y[name]) for name in names]
    near = sum(abs(a - c) < 0.7 and abs(b - d) < 0.7 for (a, b), (c, d) in combinations(points, 2))
    crossed = sum(_cross(found, one, other) for one, other in combinations(straight, 2))
    leftward = sum(place.heading == (-1, 0) for place in followed.places.values())
    paper = (max(found.x.values()) + 2) * (max(found.y.values()) + 2)
    return 40 * bent + 3 * near + 10 * crossed + leftward + paper / 10


def _detour(followed: Followed, found: Settled, link: Link) -> float:
    """0 for a straight beam; for a bent one 1, and more for a long one and for each end that looks the wrong way."""
    here, there = _part(link.out_port), _part(link.in_port)
    away, towards = followed.exits[_node(link.out_port)], followed.enters[_node(link.in_port)]
    dx, dy = found.x[there] - found.x[here], found.y[there] - found.y[here]
    ahead, on = dx * away[0] + dy * away[1], dx * towards[0] + dy * towards[1]
    if away == towards and ahead > 0 and abs(dx) + abs(dy) - ahead < 1e-6:
        return 0.0
    return 1 + 0.3 * (ahead <= 0) + 0.3 * (on <= 0) + (abs(dx) + abs(dy)) / 40


def _cross(found: Settled, one: Beam, other: Beam) -> bool:
    """Whether an upright and a level beam cross between their ends, or the end of one touches the other."""
    if one.axis == other.axis or {one.start, one.end} & {other.start, other.end}:
        return False
    flat, upright = (one, other) if one.axis == 0 else (other, one)
    left, right = sorted((found.x[flat.start], found.x[flat.end]))
    low, high = sorted((found.y[upright.start], found.y[upright.end]))
    return left <= found.x[upright.start] <= right and low <= found.y[flat.start] <= high


def _part(port: str) -> str:
    return port.partition(".")[0]


def _pairs(links: Iterator[Link]) -> dict[frozenset[str], Link]:
    """One joint for each pair of ports: light there and light back share a line."""
    found: dict[frozenset[str], Link] = {}
    for link in links:
        found.setdefault(frozenset((link.out_port, link.in_port)), link)
    return found


def _faces_it(followed: Followed, link: Link) -> bool:
    """Whether light enters a port in the direction in which it left the other."""
    return followed.exits[_node(link.out_port)] == followed.enters[_node(link.in_port)]


def _node(port: str) -> tuple[str, str]:
    name, _, face = port.partition(".")
    return name, face


def _longest(train: Any) -> float:
    lengths = [part.distance for part in train.elements.values() if is_space(part)]
    return max((float(length) for length in lengths if isinstance(length, int | float)), default=0.0)


def _beams(train: Any, followed: Followed, rooms: Room) -> tuple[list[str], list[Beam]]:
    """Parts and open ends, and the beams between them that can be straight."""
    names, beams, longest = list(followed.places), [], _longest(train)

    def length(name: str, *, upright: bool) -> float:
        return step(train.elements[name], upright=upright, room=rooms.get(name, (0.0, 0.0)), longest=longest)

    for link in _pairs(link for link in followed.links if _faces_it(followed, link)).values():
        here, there = _part(link.out_port), _part(link.in_port)
        way = followed.exits[_node(link.out_port)]
        gap = (length(here, upright=not way[0]) + length(there, upright=not way[0])) / 2
        beams.append(Beam(here, there, way, gap))
    for stub in followed.stubs:
        if followed.enters.get(_node(stub.port)) != (-stub.heading[0], -stub.heading[1]):
            names.append(f"{stub.port} open")
            beams.append(Beam(_part(stub.port), names[-1], stub.heading, OPEN))
    return names, beams


def _set_down(train: Any, followed: Followed, rooms: Room) -> Settled:
    names, beams = _beams(train, followed, rooms)
    neighbours = {frozenset((beam.start, beam.end)) for beam in beams}
    slim = {name for name in names if name not in train.elements or is_space(train.elements[name])}

    def need(one: str, other: str) -> tuple[float, float]:
        if one == other:
            return SLIM if one in slim else APART
        if frozenset((one, other)) in neighbours or one in slim or other in slim:
            return SLIM
        return APART

    return settle(names, beams, need)


def _stack(layout: Layout, followed: Followed, found: Settled) -> None:
    """Put the parts of one laser below all others; a long straight line goes on in further rows."""
    below = min((place.y for place in layout.places.values()), default=ROW) - ROW
    top = max(found.y.values())
    places = {
        name: replace(place, x=found.x[name], y=found.y[name] - top + below) for name, place in followed.places.items()
    }
    links = followed.links
    if not layout.places:
        # The laser stands at the origin, whatever is drawn above it.
        first = next(iter(places.values()))
        places = {name: replace(p, x=p.x - first.x, y=p.y - first.y) for name, p in places.items()}
    if followed.straight and max(found.x.values()) > WIDE:
        places, links = _in_rows(places, links)
    straight = {frozenset(pair) for pair in _straight_pairs(followed, found)}
    layout.bent |= {k.out_port for k in links if frozenset((k.out_port, k.in_port)) not in straight and not k.wrapped}
    layout.places |= places
    layout.exits |= followed.exits
    layout.enters |= followed.enters
    layout.links += links
    layout.stubs += followed.stubs


def _straight_pairs(followed: Followed, found: Settled) -> Iterator[tuple[str, str]]:
    given_up = {(beam.start, beam.end, beam.way) for beam in found.bent}
    for link in _pairs(iter(followed.links)).values():
        way = followed.exits[_node(link.out_port)]
        if _faces_it(followed, link) and (_part(link.out_port), _part(link.in_port), way) not in given_up:
            yield link.out_port, link.in_port


def _in_rows(places: dict[str, Place], links: list[Link]) -> tuple[dict[str, Place], list[Link]]:
    """A straight line broken where it gets too long; each row starts at the left."""
    broken, start, row = dict(places), 0.0, 0
    wrapped = set()
    for name, place in places.items():
        if place.x - start > WIDE:
            start, row = place.x, row + 1
            wrapped.add(name)
        broken[name] = replace(place, x=place.x - start, y=place.y - ROW * row)
    return broken, [replace(link, wrapped=_part(link.in_port) in wrapped) for link in links]


def _set_down_unlit(layout: Layout, train: Any, rooms: Room) -> None:
    layout.unlit = tuple(name for name in train.elements if name not in layout.places)
    row = min((p.y for p in layout.places.values()), default=ROW) - ROW
    x = 0.0
    for before, name in pairwise((None, *layout.unlit)):
        if before is not None:
            x += max(1.2, (rooms.get(before, (0, 0))[0] + rooms.get(str(name), (0, 0))[0]) / 2)
        layout.places[str(name)] = Place(x, row, RIGHT)
