"""Pairs of lenses that are nearly, but not quite, an afocal relay."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length, mm

__all__ = ["relays"]

# Lens positions on a rail are good to about a millimetre in 300.
SET, NEARLY = 0.004, 0.15


def relays(bench: Bench) -> Iterator[Finding]:
    """Distance of neighbouring lenses against the sum of their focal lengths."""
    for visit in bench.of_kind(Lens):
        first = _lens_before(visit)
        if first is None:
            continue
        total = float(first.element.focal) + float(visit.element.focal)
        apart = visit.distance - first.distance
        if total > 0 and SET < abs(apart / total - 1) < NEARLY:
            yield Finding(
                severity=Severity.MEDIUM,
                check="relay spacing",
                element=visit.name,
                rule="two lenses pass a collimated beam on as one when they stand f1 + f2 apart",
                got=f"{first.name} and {visit.name}: {length(apart)} apart, f1 + f2 = {length(total)}",
                fix=f"move {visit.name} by {'+' if total > apart else '-'}{mm(abs(total - apart))} along the beam",
            )


def _lens_before(visit: Visit) -> Visit | None:
    before = visit.previous
    while before is not None and not isinstance(before.element, Lens):
        before = before.previous
    return before
