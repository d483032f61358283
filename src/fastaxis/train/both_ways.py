"""Paths that light takes both ways: an arm to a mirror and back, a loop run round in both senses."""

from __future__ import annotations

from collections.abc import Sequence

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.maths import Scalar
from fastaxis.train.graph import Joints, build, is_source, lit_nodes, port_of, source_nodes
from fastaxis.train.joining import checked_joint
from fastaxis.train.path import joined_along
from fastaxis.train.ports import Elements, named, split
from fastaxis.train.suggest import open_out

__all__ = ["joined_both_ways", "looped", "returned"]


def joined_both_ways(
    elements: Elements, joints: Joints, wavelength: Scalar, items: Sequence[Element | str]
) -> tuple[dict[str, Element], Joints]:
    """Parts and joints with a path added, and the same path taken backwards.

    Mirrors on the way become two-way, so that the two beams on each can be told apart; the first and the last item,
    where the path turns round or ends, stay as they are. Nothing is sent back into a laser: the port before it is open.
    """
    parts, path = dict(elements), list(items)
    for index in range(1, len(path) - 1):
        item = path[index]
        part = named(parts, item) if isinstance(item, str) and "." not in item else item
        if isinstance(part, Element) and getattr(part, "two_way", True) is False:
            path[index] = _two_way(parts, item, part)
    parts, there = joined_along(parts, joints, wavelength, path)
    back: Joints = there
    for out_port, in_port in reversed(there[len(joints) :]):
        if not is_source(parts[split(out_port)[0]]):
            back = (*back, checked_joint(parts, back, wavelength, in_port, out_port))
    return parts, back


def _two_way(parts: dict[str, Element], item: Element | str, part: Element) -> Element | str:
    changed = part.changed(two_way=True)
    if isinstance(item, str):
        parts[item] = changed
        return item
    return changed


def returned(
    elements: Elements, joints: Joints, wavelength: Scalar, items: Sequence[Element | str]
) -> tuple[dict[str, Element], Joints]:
    """Parts and joints with an arm added that light runs out along and comes back through.

    Raises
    ------
    WiringError : the arm starts at no port and no laser, or its last part does not turn the light round.
    """
    start = items[0] if items else None
    if len(items) < 2 or not (isinstance(start, str) or is_source(start)):
        told = start if isinstance(start, str) else getattr(start, "label", "nothing")
        raise WiringError(
            "an arm starts at a port that light leaves, or at the laser, and ends at a mirror",
            got=f"retro: {told} {'alone' if len(items) < 2 else 'at the start'}",
            fix=_arm(elements, joints, wavelength),
        )
    # Wired one way first: it tells by which face light comes to the last part.
    parts, there = joined_along(elements, joints, wavelength, items)
    name, face = split(there[-1][1])
    if (face, face) not in parts[name].passages(wavelength):
        raise WiringError(
            "the last part of an arm turns the light round, as a mirror does",
            got=f"retro: light that enters {name}.{face} ({type(parts[name]).__name__}) does not come back from there",
            fix=_arm(elements, joints, wavelength),
        )
    return joined_both_ways(elements, joints, wavelength, items)


def _arm(elements: Elements, joints: Joints, wavelength: Scalar) -> str:
    graph = build(elements, joints, wavelength)
    free = open_out(graph, lit_nodes(graph, source_nodes(elements)))
    start = f'"{port_of(free[0])}"' if free else "fa.Laser(waist=1*mm)"
    return f"train.retro({start}, fa.FreeSpace(100*mm), fa.Mirror())"


def looped(
    elements: Elements, joints: Joints, wavelength: Scalar, items: Sequence[Element | str]
) -> tuple[dict[str, Element], Joints]:
    """Parts and joints with a loop added between two ports, which light runs round in both senses.

    Raises
    ------
    WiringError : the first or the last item is no port.
    """
    for end in (items[0], items[-1]) if items else (None, None):
        if not (isinstance(end, str) and "." in end):
            name = end if isinstance(end, str) else getattr(end, "label", "nothing")
            raise WiringError(
                "a loop starts at a port of a splitter and ends at a port of the same or of another one",
                got=f"loop: {name} at an end",
                fix='train.loop("pbs.transmitted", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "pbs.reflected")',
            )
    if items[0] == items[-1]:
        raise WiringError(
            "a loop ends at another port than it starts from; light that comes back to the same one runs along an arm",
            got=f"loop: {items[0]} at both ends",
            fix=f'train.retro("{items[0]}", fa.Mirror())',
        )
    return joined_both_ways(elements, joints, wavelength, items)
