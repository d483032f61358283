"""Reflection parity: which cameras see the picture mirrored."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.camera import Camera
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity

__all__ = ["parity"]


def parity(bench: Bench) -> Iterator[Finding]:
    """Reflections on the way to each camera, against the orientation its frames are declared with."""
    cameras = list(bench.of_kind(Camera))
    mirrored = {visit.name: sum(visit.flips) % 2 == 1 for visit in cameras}
    for visit in cameras:
        yield from _mirrored(visit)
        yield from _turned(visit)
    if len(set(mirrored.values())) == 2:
        odd = [name for name, flipped in mirrored.items() if flipped]
        yield Finding(
            severity=Severity.LOW,
            check="parity of cameras",
            element=odd[0],
            rule="cameras of different parity see mirror pictures: flip one before frames are added or compared",
            got=f"{', '.join(odd)} mirrored, {', '.join(name for name in mirrored if name not in odd)} not",
            fix="frame[:, ::-1]",
        )


def _mirrored(visit: Visit) -> Iterator[Finding]:
    odd = sum(visit.flips) % 2 == 1
    undone = visit.element.orientation.startswith("mirrored")
    if not odd and not undone:
        return
    count = sum(visit.flips)
    told = f"{visit.name}: {count} reflection{'' if count == 1 else 's'}, orientation {visit.element.orientation!r}"
    if odd == undone:
        severity = Severity.NOTE
        rule = "the camera's orientation turns the picture back; the light itself keeps R and L exchanged"
    elif odd:
        severity = Severity.MEDIUM
        rule = (
            "an odd number of reflections mirrors the picture and exchanges R and L, and l and -l, in the light; the "
            "camera's orientation turns the picture back, only one more mirror the light"
        )
    else:
        severity, rule = Severity.MEDIUM, "the camera mirrors frames that arrive as they left"
    turn = visit.element.orientation.removeprefix("mirrored").strip(", ")
    wanted = ("mirrored" if turn in ("", "upright") else f"mirrored, {turn}") if odd else turn or "upright"
    yield Finding(
        severity=severity,
        check="mirrored picture",
        element=visit.name,
        rule=rule,
        got=told,
        fix=f'train.with_changes({{"{visit.name}.orientation": "{wanted}"}}), or one more mirror',
    )


def _turned(visit: Visit) -> Iterator[Finding]:
    x, y = visit.flips
    if x % 2 and y % 2:
        yield Finding(
            severity=Severity.LOW,
            check="turned picture",
            element=visit.name,
            rule="a fold in the table plane and one out of it turn the picture by 180 deg",
            got=f"{visit.name}: {x} folds in the table plane, {y} out of it",
            fix=f'train.with_changes({{"{visit.name}.orientation": "turned 180"}})',
        )
