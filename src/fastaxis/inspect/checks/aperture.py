"""Beam size against clear apertures: what lenses and stops cut off."""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import Any

from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.clear_area import passed
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length, mm, percent, watts
from fastaxis.laws import Annulus, Disc, Rectangle, ScalarLaw

__all__ = ["aperture"]

# A Gaussian of radius w loses exp(-2 a^2/w^2) at a clear radius a: 1 % at 1.5 w, 0.03 % at 2 w.
NOTICED = 1e-4
BESIDE = 0.1  # of the light, cut off by the place of a stop rather than by its size


def aperture(bench: Bench) -> Iterator[Finding]:
    """Parts that cut off more than 0.01 % of the light, and stops that cut off 10 % by where they stand."""
    for visit in bench.visits:
        if not bench.lit(visit):
            continue
        for law in visit.laws:
            if isinstance(law, ScalarLaw) and law.stop is not None and not visit.widest.spread.infinite:
                lost = 1 - passed(law.stop, law.centre, visit.widest.spread)
                if lost > NOTICED:
                    yield _finding(bench, visit, law, lost)
                    yield from _beside(visit, law, lost)


def _finding(bench: Bench, visit: Visit, law: ScalarLaw, lost: float) -> Finding:
    # The ledger knows the true shape of the beam; second moments stand in where it has no answer.
    arriving, leaving = bench.arriving(visit), bench.leaving(visit)
    exact = {(visit.name, visit.left)} <= set(bench.ledger) and arriving > 0
    lost = max(0.0, 1 - leaving / arriving) if exact else lost
    got = (
        f"{visit.name}: beam radius {length(visit.radius)} (1/e²), {percent(lost)} or {watts(lost * arriving)} cut off"
    )
    if isinstance(visit.element, Lens):
        return Finding(
            severity=_of_optic(lost),
            check="clipped beam",
            element=visit.name,
            rule=f"a clear radius of 2 w keeps all but 0.03 % of a Gaussian beam, and here it is {_extent(law.stop)}",
            got=got,
            fix=f'train.with_changes({{"{visit.name}.radius": {mm(2 * visit.radius)}}})',
        )
    return Finding(
        severity=Severity.HIGH if lost > 0.999 else Severity.MEDIUM if lost > 0.5 else Severity.NOTE,
        check="clipped beam",
        element=visit.name,
        rule="a stop that takes nearly all light may be too small, off centre, or have a diameter for a radius"
        if lost > 0.5
        else "a stop takes what it is there to take",
        got=got,
        fix=f"compare the beam with the clear area: {_extent(law.stop)}",
    )


def _beside(visit: Visit, law: ScalarLaw, lost: float) -> Iterator[Finding]:
    """A stop with a middle that would cut off less if it stood in the middle of the beam; edges and slits are moved."""
    x, y = visit.widest.spread.offset
    by_place = lost - (1 - passed(law.stop, (x, y), visit.widest.spread))
    if isinstance(visit.element, Lens) or not isinstance(law.stop, Disc | Annulus | Rectangle) or by_place <= BESIDE:
        return
    apart = math.hypot(x - float(law.centre[0]), y - float(law.centre[1]))
    yield Finding(
        severity=Severity.MEDIUM,
        check="off centre",
        element=visit.name,
        rule="a stop in the middle of the beam cuts off as little as its size allows",
        got=f"{visit.name}: middle {length(apart)} beside the beam, which cuts off {percent(by_place)} more",
        fix=f'train.with_changes({{"{visit.name}.centre": ({x * 1e3:.4g}*mm, {y * 1e3:.4g}*mm)}})',
    )


def _of_optic(lost: float) -> Severity:
    """A lens is not there to clip: above 5 % the beam is another beam, with rings and a wider focus."""
    if lost > 0.05:
        return Severity.HIGH
    return Severity.MEDIUM if lost > 1e-3 else Severity.LOW


def _extent(stop: Any) -> str:
    kind = type(stop).__name__.lower()
    if isinstance(stop, Disc):
        return f"radius {length(float(stop.radius))}"
    return f"{kind} {' x '.join(length(float(v)) for n, v in vars(stop).items() if n in EXTENTS)}"


EXTENTS = ("inner", "outer", "width", "height")
