"""Patterned plates and masks made of cells: does the beam stay inside the array?"""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length
from fastaxis.maths import Pattern

__all__ = ["patterns"]


def patterns(bench: Bench) -> Iterator[Finding]:
    """A beam of which 1.5 w (all but 1 % of a Gaussian) reaches past the outermost cells."""
    for visit in bench.visits:
        if visit.widest.spread.infinite or not bench.lit(visit):
            continue
        edges = [_edge(value) for law in visit.laws for value in law.values if isinstance(value, Pattern)]
        half = min((edge for edge in edges if edge is not None), default=None)
        if half is None:
            continue
        reach = 1.5 * visit.radius + _apart(visit)
        if reach > half:
            yield Finding(
                severity=Severity.HIGH if visit.radius + _apart(visit) > half else Severity.MEDIUM,
                check="pattern too small",
                element=visit.name,
                rule="beyond the array its outermost cells are carried on, which no real plate does",
                got=f"{visit.name}: the array reaches {length(half)} from its middle, the beam {length(reach)} (1.5 w)",
                fix="more cells, larger cells (pixel=), or a smaller beam",
            )


def _edge(pattern: Pattern) -> float | None:
    """Half the shorter side of an array of cells [m]; None for a function."""
    if callable(pattern.source) or pattern.pixel is None:
        return None
    return float(min(pattern.source.shape) * pattern.pixel) / 2


def _apart(visit: Visit) -> float:
    """How far the middle of the beam is from the middle of the part [m]."""
    x, y = visit.widest.spread.offset
    cx, cy = getattr(visit.element, "centre", (0.0, 0.0))
    return max(abs(x - float(cx)), abs(y - float(cy)))
