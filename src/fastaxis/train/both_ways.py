"""Paths that light takes both ways: an arm to a mirror and back, a loop run round in both senses."""

from __future__ import annotations

from collections.abc import Sequence

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.maths import Scalar
from fastaxis.train.graph import Joints
from fastaxis.train.joining import checked_joint
from fastaxis.train.path import joined_along
from fastaxis.train.ports import Elements, named

__all__ = ["joined_both_ways", "looped"]


def joined_both_ways(
    elements: Elements, joints: Joints, wavelength: Scalar, items: Sequence[Element | str]
) -> tuple[dict[str, Element], Joints]:
    """Parts and joints with a path added, and the same path taken backwards.

    Mirrors on the way become two-way, so that the two beams on each can be told apart; the first and the last item,
    where the path turns round or ends, stay as they are.
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
        back = (*back, checked_joint(parts, back, wavelength, in_port, out_port))
    return parts, back


def _two_way(parts: dict[str, Element], item: Element | str, part: Element) -> Element | str:
    changed = part.changed(two_way=True)
    if isinstance(item, str):
        parts[item] = changed
        return item
    return changed


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
    return joined_both_ways(elements, joints, wavelength, items)
