"""Cameras and detectors that are joined but get no light, or whose light cancels."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator

from fastaxis.elements.detector import BeamDump
from fastaxis.inspect.bench import DARK, Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import watts

__all__ = ["dark"]


def dark(bench: Bench) -> Iterator[Finding]:
    """One finding for each end of a path where next to nothing arrives; dumps may be dark."""
    ends: dict[str, list[Visit]] = defaultdict(list)
    for visit in bench.visits:
        if not visit.left and not isinstance(visit.element, BeamDump):
            ends[visit.name].append(visit)
    for name, visits in ends.items():
        power = bench.arriving_together(visits)
        if power <= DARK * bench.total:
            alone = sum(visit.power > DARK * bench.total for visit in visits)
            yield (
                _cancelled(bench, name, alone)
                if alone > 1
                else Finding(
                    severity=Severity.MEDIUM,
                    check="dark port",
                    element=name,
                    rule="a camera or detector that is joined gets light, unless a null is what it is there for",
                    got=f"{name}: {watts(power)} arrives of {watts(bench.total)}",
                    fix=f"print(train.route('{name}')), and look where the polarization is blocked",
                )
            )


def _cancelled(bench: Bench, name: str, paths: int) -> Finding:
    return Finding(
        severity=Severity.LOW,
        check="dark port",
        element=name,
        rule="an interferometer as drawn stands at some fringe, here at a dark one, which a phase in one arm shifts",
        got=f"{name}: {paths} paths with light end here and cancel, of {watts(bench.total)}",
        fix="fa.PhaseShift(phase=90*deg) in one of the arms",
    )
