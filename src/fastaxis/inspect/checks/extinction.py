"""How dark the dark can be: extinction of polarizers and of the ports of polarizing splitters."""

from __future__ import annotations

import math
from collections.abc import Iterator

from fastaxis.elements.polarizer import Polarizer
from fastaxis.elements.polarizing_beam_splitter import PolarizingBeamSplitter
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity

__all__ = ["extinction"]


def extinction(bench: Bench) -> Iterator[Finding]:
    """Extinction below 1000, and parts without any leak, which no drawer holds."""
    for visit in bench.first_visits():
        part = visit.element
        if isinstance(part, Polarizer):
            yield from _told(part.name, float(part.extinction), f'"{part.name}.extinction": 1e5')
            yield from _decibels(part.name, float(part.extinction))
        if isinstance(part, PolarizingBeamSplitter):
            ends = {into for into, _ in bench.train.joints} | {out for out, _ in bench.train.joints}
            ports = {
                "transmitted": (float(part.Tp), float(part.Ts), f'"{part.name}.Ts": 0.0005'),
                "reflected": (float(part.reflected_s), float(part.reflected_p), f'"{part.name}.Tp": 0.9995'),
            }
            for face, (passed, leak, fix) in ports.items():
                if f"{part.name}.{face}" in ends:
                    yield from _told(f"{part.name}.{face}", passed / leak if leak else math.inf, fix)


def _told(where: str, ratio: float, fix: str) -> Iterator[Finding]:
    if 1000 <= ratio < math.inf:
        return
    ideal = math.isinf(ratio)
    yield Finding(
        severity=Severity.NOTE if ideal else Severity.MEDIUM if ratio < 100 else Severity.LOW,
        check="extinction",
        element=where,
        rule="no real part is free of leaks: declare its extinction"
        if ideal
        else "the leak is the floor of every null",
        got=f"{where}: ideal" if ideal else f"{where}: extinction {ratio:.3g}:1, a null keeps {100 / ratio:.2g} %",
        fix=f"train.with_changes({{{fix}}})",
    )


def _decibels(name: str, ratio: float) -> Iterator[Finding]:
    if ratio < 100 and ratio == round(ratio):
        yield Finding(
            severity=Severity.MEDIUM,
            check="extinction slip",
            element=name,
            rule="extinction is a ratio of powers, not a number of decibels",
            got=f"{name}: extinction = {ratio:g}",
            fix=f'train.with_changes({{"{name}.extinction": 10 ** ({ratio:g} / 10)}})',
        )
