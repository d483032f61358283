"""Beams that meet by two paths: fringe period against pixel, path difference against coherence."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator
from itertools import combinations

from fastaxis.elements.camera import Camera
from fastaxis.elements.detector import Detector
from fastaxis.elements.free_space import FreeSpace
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.checks.arms import NO_FRINGES, agreement
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length, mm

__all__ = ["fringes", "period"]

UNHURT = 0.99  # visibility; the dark fringes keep half a percent of the bright ones, one level of an 8-bit camera


def fringes(bench: Bench) -> Iterator[Finding]:
    """Each pair of paths of one laser that ends on the same camera or detector."""
    arrivals: dict[tuple[str, str], list[Visit]] = defaultdict(list)
    for visit in bench.of_kind(Camera, Detector):
        arrivals[visit.name, visit.source].append(visit)
    for visits in arrivals.values():
        for one, other in combinations(visits, 2):
            if isinstance(one.element, Camera):
                yield from _against_pixel(one, other)
            yield from _path(bench, one, other)


def period(one: Visit, other: Visit) -> float:
    """Fringe period [m] of two beams by the angle between them: wavelength/angle."""
    (ax, ay), (bx, by) = one.widest.spread.slope, other.widest.spread.slope
    angle = math.hypot(ax - bx, ay - by)
    return one.widest.wavelength / angle if angle else math.inf


def _against_pixel(one: Visit, other: Visit) -> Iterator[Finding]:
    pixels = period(one, other) / one.element.pixel
    if pixels >= 4:
        return
    yield Finding(
        severity=Severity.HIGH if pixels < 2 else Severity.MEDIUM,
        check="fringe period",
        element=one.name,
        rule="fringes need two pixels a period to be seen and four to keep 90 % of their contrast",
        got=f"{one.name}: fringes of {length(period(one, other))}, {pixels:.2g} pixels",
        fix="a smaller angle between the beams, or a smaller pixel",
    )


def _path(bench: Bench, one: Visit, other: Visit) -> Iterator[Finding]:
    apart = abs(one.distance - other.distance)
    if apart < 1e-4:
        return
    line = bench.train.elements[one.source].line
    seen = float(abs(line.degree(apart)))
    if not line.sharp and seen > UNHURT:
        return
    told = f"{one.name}: the two paths differ by {length(apart)}"
    if not line.sharp:
        told = f"{told}, which leaves fringes a visibility of {seen:.3g}"
    # Paths of crossed polarizations may be meant to make no fringes.
    lost = seen < 0.05 and agreement(one, other) >= NO_FRINGES
    yield Finding(
        severity=Severity.HIGH if lost else Severity.MEDIUM if seen < 0.8 else Severity.LOW,
        check="path difference",
        element=one.name,
        rule="fringes need a coherence length well above the path difference"
        + (", and this laser is declared without a line width" if line.sharp else ""),
        got=told,
        fix=_lengthened(*sorted((one, other), key=lambda visit: visit.distance)),
    )


def _lengthened(shorter: Visit, longer: Visit) -> str:
    """Code that makes up for the difference in a space that only the shorter path has, however often it is passed."""
    apart = longer.distance - shorter.distance
    shared = {visit.name for visit in longer.chain()}
    spaces = [visit.element for visit in shorter.chain() if isinstance(visit.element, FreeSpace)]
    own = [space for space in spaces if space.name not in shared]
    if not own:
        return f"lengthen the shorter path by {mm(apart)}, or take a laser of narrower line"
    distance = float(own[-1].distance) + apart / own.count(own[-1])
    return f'train.with_changes({{"{own[-1].name}.distance": {round(distance * 1e3, 6):.9g}*mm}})'
