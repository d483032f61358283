"""Isolators on a bench: a Faraday rotator between two polarizers."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.free_space import FreeSpace
from fastaxis.elements.polarizer import Polarizer
from fastaxis.elements.rotator import FaradayRotator
from fastaxis.inspect.bench import Bench, Visit

__all__ = ["Isolator", "isolators_of"]

Isolator = tuple[Visit, Visit, Visit]


def isolators_of(bench: Bench) -> Iterator[Isolator]:
    """(input polarizer, rotator, output polarizer) where the three follow one another, with free space at most.

    Met on the way back they are there to block, and are not among these.
    """
    for visit in bench.of_kind(Polarizer):
        trio = _trio(visit)
        if trio is not None and not visit.returning:
            yield trio


def _trio(visit: Visit) -> Isolator | None:
    rotator = _part_before(visit)
    first = _part_before(rotator) if rotator is not None and isinstance(rotator.element, FaradayRotator) else None
    if rotator is None or first is None or not isinstance(first.element, Polarizer):
        return None
    return first, rotator, visit


def _part_before(visit: Visit) -> Visit | None:
    before = visit.previous
    while before is not None and isinstance(before.element, FreeSpace):
        before = before.previous
    return before
