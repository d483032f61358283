"""Beams beside the middle of parts whose middle matters."""

from __future__ import annotations

import math
from collections.abc import Iterator

from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length
from fastaxis.laws import AxisLaw, ScalarLaw

__all__ = ["centring"]

# At 0.1 w the centre of a ring moves by a tenth of the beam and one lobe of two is about 20 % brighter.
NOTICED, LARGE = 0.1, 1.0


def centring(bench: Bench) -> Iterator[Finding]:
    """Distance of the beam's middle from a singular point, in beam radii."""
    for visit in bench.visits:
        if visit.widest.spread.infinite or not bench.lit(visit):
            continue
        for law in visit.laws:
            if (isinstance(law, AxisLaw) and law.order) or (isinstance(law, ScalarLaw) and law.charge):
                yield from _off(visit, law)


def _off(visit: Visit, law: AxisLaw | ScalarLaw) -> Iterator[Finding]:
    x, y = visit.widest.spread.offset
    apart = math.hypot(x - float(law.centre[0]), y - float(law.centre[1]))
    if apart <= NOTICED * visit.radius:
        return
    yield Finding(
        severity=Severity.HIGH if apart > LARGE * visit.radius else Severity.MEDIUM,
        check="off centre",
        element=visit.name,
        rule="a ring is even when the singular point stands in the middle of the beam, to a tenth of its radius",
        got=f"{visit.name}: singular point {length(apart)} or {apart / visit.radius:.2g} w beside the beam",
        fix=f'train.with_changes({{"{visit.name}.centre": ({x * 1e3:.4g}*mm, {y * 1e3:.4g}*mm)}})',
    )
