"""Ports that light leaves towards nothing, and light that runs back to its laser."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.inspect.bench import DARK, Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import percent, watts

__all__ = ["open_ports"]


def open_ports(bench: Bench) -> Iterator[Finding]:
    """One finding for each lit port that is joined to nothing."""
    fed = {into: out for out, into in bench.train.joints}
    for port in bench.train.open_ports():
        name, _, face = port.partition(".")
        power = _power(bench, name, face)
        if power <= DARK * bench.total:
            continue
        share = power / bench.total
        got = f"{port}: {watts(power)} ({percent(share)} of the laser) leaves"
        # The laser's own port is open only where nothing is joined to it.
        if port in fed:
            yield Finding(
                severity=Severity.MEDIUM if share > 1e-4 else Severity.NOTE,
                check="returning light",
                element=port,
                rule="light that runs back to a laser may disturb it: an isolator or a small tilt keeps it out",
                got=f"{got} back towards {fed[port]}",
                fix=f"put an isolator behind {fed[port].partition('.')[0]}",
            )
        else:
            yield Finding(
                severity=Severity.MEDIUM if share >= 1e-3 else Severity.LOW,
                check="open port",
                element=port,
                rule="every beam ends on a camera, a detector or a dump",
                got=got,
                fix=f'train.along("{port}", fa.BeamDump())',
            )


def _power(bench: Bench, name: str, face: str) -> float:
    if name in bench.train.sources:
        return float(bench.train.elements[name].source.power)
    visits = [visit for visit in bench.visits if (visit.name, visit.left) == (name, face)]
    return bench.leaving_together(visits) if visits else 0.0
