"""Checks of a whole train before any light is sent."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.elements.detector import BeamDump
from fastaxis.errors import FastaxisWarning, WiringError, WiringWarning
from fastaxis.maths import Scalar
from fastaxis.train.graph import Joints, Node, is_source
from fastaxis.train.joining import checked_joint
from fastaxis.train.ports import Elements
from fastaxis.train.suggest import feed_code

__all__ = ["check_joints", "check_source", "findings"]


def check_joints(elements: Elements, joints: Joints, wavelength: Scalar) -> None:
    """Every joint once more, as if it was made anew: a part may have been exchanged for another since."""
    made: Joints = ()
    for out_port, in_port in joints:
        made = (*made, checked_joint(elements, made, wavelength, out_port, in_port))


def check_source(elements: Elements, name: str) -> None:
    """A WiringError when nothing sends out light."""
    if any(is_source(element) for element in elements.values()):
        return
    first = next((n for n, element in elements.items() if element.entry), None)
    ending = f', "{first}"' if first else ""
    raise WiringError(
        "a train needs a laser",
        got=f"{name}: no source among {', '.join(elements) or 'no parts'}",
        fix=f'train.along(fa.Laser(waist=0.8*mm, power=5*mW, state=fa.H, name="laser"){ending})',
    )


def _is_detecting(element: Element) -> bool:
    return element.exit is None and not isinstance(element, BeamDump)


def _upstream(graph: Any, node: Node) -> set[str]:
    names, waiting, seen = set(), [node], set()
    while waiting:
        current = waiting.pop()
        if current not in seen:
            seen.add(current)
            names.add(current[0])
            waiting.extend(graph.predecessors(current))
    return names


def _dark_parts(elements: Elements, graph: Any, lit: set[Node]) -> Iterator[WiringWarning]:
    """One warning for each camera or detector without light, and one for each other stretch without light."""
    reached = {name for name, *_ in lit}
    dark = [name for name in elements if name not in reached]
    told: set[str] = set()
    for name in sorted(dark, key=lambda n: not _is_detecting(elements[n])):
        if name in told or is_source(elements[name]):
            continue
        node = next(node for node in graph if node[0] == name)
        told |= _upstream(graph, node) | {other for other in dark if name in _upstream_of(graph, other)}
        kind = type(elements[name]).__name__
        yield WiringWarning(
            "nothing feeds it" if _is_detecting(elements[name]) else "no light reaches it",
            got=f"{name} ({kind})",
            fix=feed_code(elements, graph, lit, node),
        )


def _upstream_of(graph: Any, name: str) -> set[str]:
    return set().union(*(_upstream(graph, node) for node in graph if node[0] == name))


def findings(elements: Elements, graph: Any, lit: set[Node], wavelength: Scalar) -> Iterator[FastaxisWarning]:
    """What is possible but probably not meant."""
    yield from _dark_parts(elements, graph, lit)
    for element in elements.values():
        yield from element.cautions(wavelength)
