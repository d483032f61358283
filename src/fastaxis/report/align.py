"""Closing the sides of a drawing whose beams meet again: parts on one beam share a row or a column."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace
from typing import TYPE_CHECKING, Any

from fastaxis.report.walk import step

if TYPE_CHECKING:
    from fastaxis.report.layout import Layout, Link, Vector

__all__ = ["align", "astray"]

Run = tuple[str, str, float]
"""(part before, part behind, least distance) along one axis."""


def astray(layout: Layout) -> int:
    """How many beams do not run in the direction in which they leave their part."""
    return sum(not link.wrapped and _strays(layout, link) for link in layout.links)


def _strays(layout: Layout, link: Link) -> bool:
    here, there = layout.places[_part(link.out_port)], layout.places[_part(link.in_port)]
    way = _way(layout, link)
    ahead = (there.x - here.x) * way[0] + (there.y - here.y) * way[1]
    aside = abs((there.x - here.x) * way[1]) + abs((there.y - here.y) * way[0])
    return ahead <= 0 or aside > 1e-6


def _way(layout: Layout, link: Link) -> Vector:
    name, _, face = link.out_port.partition(".")
    return layout.exits[name, face]


def align(layout: Layout, train: Any) -> None:
    """Set all parts anew so that every beam is straight, where the directions of the beams allow it.

    A level beam puts its two parts into one row and keeps their columns apart, an upright one the other way round.
    What remains are differences with a least size; the smallest drawing that keeps them is taken. Where they contradict
    each other, or two parts would stand on one place, the layout stays as it was.
    """
    level: list[Run] = []
    upright: list[Run] = []
    for link in layout.links:
        here, there = _part(link.out_port), _part(link.in_port)
        way = _way(layout, link)
        pair = (train.elements[here], train.elements[there])
        gap = sum(step(element, upright=not way[0]) for element in pair) / 2
        run = (here, there, gap) if sum(way) > 0 else (there, here, gap)
        (level if way[0] else upright).append(run)
    xs, ys = _solve(layout.places, level, upright), _solve(layout.places, upright, level)
    if xs is None or ys is None or _crowded(xs, ys):
        return
    for name, place in layout.places.items():
        layout.places[name] = replace(place, x=xs[name], y=ys[name])


def _part(port: str) -> str:
    return port.partition(".")[0]


def _solve(names: Iterable[str], apart: list[Run], together: list[Run]) -> dict[str, float] | None:
    """Least coordinates from 0 up with all runs ``apart`` kept and parts ``together`` equal; None if impossible."""
    group = {name: name for name in names}
    for one, other, _ in together:
        joined, old = group[one], group[other]
        group = {name: joined if held == old else held for name, held in group.items()}
    found = dict.fromkeys(group, 0.0)
    # Each round settles at least one more group, unless the runs contradict each other.
    for _ in range(len(group) + 1):
        settled = True
        for before, behind, gap in apart:
            least = found[group[before]] + gap
            if found[group[behind]] < least - 1e-9:
                found[group[behind]], settled = least, False
        if settled:
            return {name: found[held] for name, held in group.items()}
    return None


def _crowded(xs: dict[str, float], ys: dict[str, float]) -> bool:
    names = list(xs)
    return any(
        abs(xs[one] - xs[other]) < 0.8 and abs(ys[one] - ys[other]) < 0.8
        for k, one in enumerate(names)
        for other in names[k + 1 :]
    )
