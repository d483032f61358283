"""Plates and rotators that do nothing to the light they get."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.retarder import Retarder
from fastaxis.elements.rotator import Rotator
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import degree, state_in_words, total

__all__ = ["idle"]


def idle(bench: Bench) -> Iterator[Finding]:
    """Light whose polarization leaves as it came: an axis along it, or a rotator for circular light."""
    for visit in bench.of_kind(Retarder, Rotator):
        before, after = total(visit.before), total(visit.after)
        if visit.patterned or degree(before) < 0.1 or after[0] <= 0:
            continue
        overlap = float(after[1:] @ before[1:]) / (after[0] * before[0])
        if 1 - overlap / degree(before) ** 2 < 1e-6:
            yield Finding(
                severity=Severity.NOTE,
                check="idle plate",
                element=visit.name,
                rule="light along an axis of a plate, or circular light in a rotator, leaves as it came",
                got=f"{visit.name}: {state_in_words(visit.before)} light is not changed",
                fix="turn it, unless this setting is meant",
            )
