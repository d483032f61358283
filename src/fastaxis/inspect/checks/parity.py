"""Reflection parity: which cameras see the picture mirrored, and whether that shows."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator
from typing import Any

import numpy as np

from fastaxis.elements.camera import Camera
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import total
from fastaxis.light import FlatTop, Gaussian, PlaneWave

__all__ = ["parity", "symmetric"]

EVEN = 1e-9  # of the light, or of the beam's radius: roundings of what is symmetric


def parity(bench: Bench) -> Iterator[Finding]:
    """Reflections on the way to each camera, against the orientation its frames are declared with.

    Light by several paths that are reflected evenly often, or oddly, is told of once.
    """
    cameras: dict[tuple[str, bool], list[Visit]] = defaultdict(list)
    for visit in bench.of_kind(Camera):
        cameras[visit.name, sum(visit.flips) % 2 == 1].append(visit)
    for (name, odd), visits in cameras.items():
        if (name, not odd) not in cameras:  # pictures and mirror images that meet are told by the check of arms
            yield from _mirrored(bench, visits, odd=odd)
            yield from _turned(visits)
    mirrored = {name for name, odd in cameras if odd}
    upright = {name for name, odd in cameras if not odd} - mirrored
    if mirrored and upright:
        yield Finding(
            severity=Severity.LOW,
            check="parity of cameras",
            element=min(mirrored),
            rule="cameras of different parity see mirror pictures: flip one before frames are added or compared",
            got=f"{', '.join(sorted(mirrored))} mirrored, {', '.join(sorted(upright))} not",
            fix="frame[:, ::-1]",
        )


def _mirrored(bench: Bench, visits: list[Visit], *, odd: bool) -> Iterator[Finding]:
    camera = visits[0].element
    undone = camera.orientation.startswith("mirrored")
    if not odd and not undone:
        return
    # A round beam of H, V or unpolarized light on the axis is its own mirror image.
    worst = Severity.LOW if all(symmetric(bench, visit) for visit in visits) else Severity.MEDIUM
    if odd == undone:
        severity = Severity.NOTE
        rule = "the camera's orientation turns the picture back; the light itself keeps R and L exchanged"
    elif odd:
        severity = worst
        rule = (
            "an odd number of reflections mirrors the picture and exchanges R and L, and l and -l, in the light; the "
            "camera's orientation turns the picture back, only one more mirror the light"
        )
    else:
        severity, rule = worst, "the camera mirrors frames that arrive as they left"
    turn = camera.orientation.removeprefix("mirrored").strip(", ")
    wanted = ("mirrored" if turn in ("", "upright") else f"mirrored, {turn}") if odd else turn or "upright"
    yield Finding(
        severity=severity,
        check="mirrored picture",
        element=camera.name,
        rule=rule,
        got=f"{camera.name}: {_reflections(visits)}, orientation {camera.orientation!r}",
        fix="nothing to mend" if odd == undone else f'train.with_changes({{"{camera.name}.orientation": "{wanted}"}})',
    )


def _reflections(visits: list[Visit]) -> str:
    counts = sorted({sum(visit.flips) for visit in visits})
    return f"{' and '.join(map(str, counts))} reflection{'' if counts == [1] else 's'}"


def symmetric(bench: Bench, visit: Visit) -> bool:
    """Whether the light that arrives is its own mirror image: round, on the axis, H, V or unpolarized, no pattern."""
    (x, y), radius = visit.widest.spread.offset, visit.radius
    s0, _, s2, s3 = total(visit.before)
    return (
        not visit.patterned
        and bool(np.hypot(s2, s3) <= EVEN * s0)
        and max(abs(x), abs(y)) <= EVEN * radius
        and not any(before.shapes for before in visit.chain()[:-1])
        and all(_round(term.mode) for part in _source(bench, visit).components for term in part.beam.terms)
    )


def _source(bench: Bench, visit: Visit) -> Any:
    return bench.train.elements[visit.source].source


def _round(mode: Any) -> bool:
    return isinstance(mode, FlatTop | Gaussian | PlaneWave)


def _turned(visits: list[Visit]) -> Iterator[Finding]:
    turning = [visit.flips for visit in visits if visit.flips[0] % 2 and visit.flips[1] % 2]
    if turning and visits[0].element.orientation != "turned 180":
        x, y = turning[0]
        name = visits[0].name
        yield Finding(
            severity=Severity.LOW,
            check="turned picture",
            element=name,
            rule="a fold in the table plane and one out of it turn the picture by 180 deg",
            got=f"{name}: {x} fold{'' if x == 1 else 's'} in the table plane, {y} out of it",
            fix=f'train.with_changes({{"{name}.orientation": "turned 180"}})',
        )
