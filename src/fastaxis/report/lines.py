"""The lines of a bench drawing: one for each pair of joined ports, and one for each open end."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Any

from fastaxis.report.boxes import Box, Point, line_boxes
from fastaxis.report.layout import Layout, Link, Stub
from fastaxis.report.routing import bent_line
from fastaxis.report.walk import is_space

__all__ = ["PART", "Line", "comes_in", "lines_of", "part_boxes", "returning", "stub_line"]

PART = 0.72  # [steps] the square that a part and its outline need
WIDTH = 0.07
STUB = 0.62
BACK = 0.33  # light back out of a port is drawn longer, beside the light that comes in there
LANE = 0.1
ARROW = 0.12
ASIDE = 0.16
BACK_BY = ("front", "reflected")  # where light leaves that comes back: a plate, a space or the next mirror


@dataclass(frozen=True)
class Line:
    """A beam on paper.

    Parameters
    ----------
    points : its corners, from the port that light leaves first.
    there : the joint drawn from the first point to the last.
    back : the joint of the light that runs the same line the other way; None if there is none.
    bent : whether it had to be led around.
    """

    points: tuple[Point, ...]
    there: Link
    back: Link | None = None
    bent: bool = False

    @property
    def longest(self) -> tuple[Point, Point]:
        """The longest of its pieces."""
        return max(pairwise(self.points), key=lambda piece: _length(*piece))

    @property
    def boxes(self) -> list[Box]:
        return line_boxes(self.points, WIDTH)


def _length(a: Point, b: Point) -> float:
    return abs(a[0] - b[0]) + abs(a[1] - b[1])


def part_boxes(plan: Layout, train: Any) -> dict[str, Box]:
    """The square of each part that has a symbol, by name."""
    return {
        name: Box.about(place.x, place.y, PART, PART)
        for name, place in plan.places.items()
        if not is_space(train.elements[name])
    }


def lines_of(plan: Layout, train: Any) -> list[Line]:
    """All beams between parts; those that cannot be straight are led around everything else."""
    parts = list(part_boxes(plan, train).values())
    lines = [_line(plan, there, back) for there, back in _both_ways(plan) if there.out_port not in plan.bent]
    ends = [box for stub in plan.stubs for box in line_boxes(stub_line(plan, stub), WIDTH)]
    for there, back in _both_ways(plan):
        if there.out_port in plan.bent:
            taken = [box for line in lines for box in line.boxes] + ends
            lines.append(Line(tuple(_around(plan, there, parts, taken)), there, back, bent=True))
    return lines


def _both_ways(plan: Layout) -> Iterator[tuple[Link, Link | None]]:
    # Straight ones first: light that comes back along one needs no line of its own.
    links = sorted(plan.links, key=lambda link: link.out_port in plan.bent)
    pending = {(link.out_port, link.in_port): link for link in links}
    while pending:
        (out_port, in_port), link = next(iter(pending.items()))
        del pending[out_port, in_port]
        back = pending.get((in_port, out_port)) or next((o for o in pending.values() if _returns(plan, link, o)), None)
        if back:
            del pending[back.out_port, back.in_port]
        yield link, back


def _returns(plan: Layout, link: Link, other: Link) -> bool:
    """Whether light runs back along a straight line, by other faces of the same two parts.

    Light from between two mirrors comes back to the side of the first, the face that it left having two names.
    """
    way, back = plan.exits[_node(link.out_port)], plan.exits[_node(other.out_port)]
    parts = {_node(port)[0] for port in (link.out_port, link.in_port)}
    same = parts == {_node(port)[0] for port in (other.out_port, other.in_port)}
    straight = link.out_port not in plan.bent and not link.wrapped and not other.wrapped
    opposite = way == (-back[0], -back[1])
    return same and straight and (_between_mirrors(link, other) if other.out_port in plan.bent else opposite)


def _between_mirrors(link: Link, other: Link) -> bool:
    """Whether light comes back to the splitter it was let in by, straight from the next part or splitter."""
    face = _node(other.out_port)[1]
    return _node(link.out_port)[1] == "transmitted" and _node(other.in_port)[1] == "side" and face in BACK_BY


def returning(plan: Layout, lines: Sequence[Line]) -> dict[str, tuple[int, int]]:
    """The faces that light comes back from and to along the line it left by, with the way there from the part."""
    found: dict[str, tuple[int, int]] = {}
    for there, back in ((line.there, line.back) for line in lines):
        if back is not None and back.out_port in plan.bent:
            x, y = plan.exits[_node(there.out_port)]
            found |= {back.in_port: (x, y), back.out_port: (-x, -y)}
    return found


def _line(plan: Layout, there: Link, back: Link | None) -> Line:
    here, end = plan.ends(there)
    if not there.wrapped:
        return Line(((here.x, here.y), (end.x, end.y)), there, back)
    right, left, between = here.x + 0.55, end.x - 0.55, (here.y + end.y) / 2 + 0.1
    points = ((here.x, here.y), (right, here.y), (right, between), (left, between), (left, end.y), (end.x, end.y))
    return Line(points, there, back)


def _around(plan: Layout, link: Link, parts: Sequence[Box], taken: Sequence[Box]) -> list[Point]:
    here, there = plan.ends(link)
    leaving, entering = plan.exits[_node(link.out_port)], plan.enters[_node(link.in_port)]
    start = _aside(plan, link.out_port, (here.x, here.y), leaving)
    end = _aside(plan, link.in_port, (there.x, there.y), entering)
    return bent_line(start, leaving, end, entering, parts=parts, lines=taken)


def _aside(plan: Layout, port: str, middle: Point, way: tuple[int, int]) -> Point:
    """Where a bent line begins or ends: beside the middle where a straight beam takes the same face."""
    taken = False
    for link in (link for link in plan.links if link.out_port not in plan.bent):
        taken |= port == link.out_port and plan.exits[_node(port)] in {way, (-way[0], -way[1])}
        taken |= port == link.in_port and plan.enters[_node(port)] in {way, (-way[0], -way[1])}
    if not taken:
        return middle
    return middle[0] - ASIDE * way[1], middle[1] + ASIDE * way[0]


def _node(port: str) -> tuple[str, str]:
    name, _, face = port.partition(".")
    return name, face


def stub_line(plan: Layout, stub: Stub) -> tuple[Point, Point]:
    """The two ends of the line of an open port; beside the beam where light also comes in there."""
    place, way = plan.places[_node(stub.port)[0]], stub.heading
    if not comes_in(plan, stub):
        return (place.x, place.y), (place.x + STUB * way[0], place.y + STUB * way[1])
    x, y = place.x + LANE * way[1], place.y - LANE * way[0]
    reach = min(STUB + BACK, _free_length(plan, stub) - PART / 2 - ARROW)
    return (x, y), (x + reach * way[0], y + reach * way[1])


def _free_length(plan: Layout, stub: Stub) -> float:
    """How far it is to the part whose light comes in by an open port."""
    here, there = next(plan.ends(link) for link in plan.links if link.in_port == stub.port)
    return abs(here.x - there.x) + abs(here.y - there.y)


def comes_in(plan: Layout, stub: Stub) -> bool:
    """Whether light also enters on the line of an open port; at a folding mirror it enters on another."""
    return plan.enters.get(_node(stub.port)) == (-stub.heading[0], -stub.heading[1])
