"""Cameras and detectors that are joined but get no light."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.inspect.bench import DARK, Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import watts

__all__ = ["dark"]


def dark(bench: Bench) -> Iterator[Finding]:
    """One finding for each end of a path where next to nothing arrives; dumps may be dark."""
    ends: dict[str, float] = {}
    for visit in bench.visits:
        if not visit.left and type(visit.element).__name__ != "BeamDump":
            ends[visit.name] = ends.get(visit.name, 0.0) + bench.arriving(visit)
    for name, power in ends.items():
        if power <= DARK * bench.total:
            yield Finding(
                severity=Severity.MEDIUM,
                check="dark port",
                element=name,
                rule="a camera or detector that is joined gets light, unless a null is what it is there for",
                got=f"{name}: {watts(power)} arrives of {watts(bench.total)}",
                fix=f"print(train.route('{name}')), and look where the polarization is blocked",
            )
