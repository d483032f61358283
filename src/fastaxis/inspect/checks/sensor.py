"""The beam on the camera: does it fit, and is it spread over enough pixels?"""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator

from fastaxis.elements.camera import Camera
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.clear_area import passed
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length, percent
from fastaxis.laws import Rectangle

__all__ = ["sensor"]

FEWEST = 3  # pixels in a beam radius; below, a ring and its dark centre share a pixel


def sensor(bench: Bench) -> Iterator[Finding]:
    """Light that misses the sensor, and spots of a few pixels; of several paths to a camera the one that fits worst."""
    cameras: dict[str, list[Visit]] = defaultdict(list)
    for visit in bench.of_kind(Camera):
        if not visit.widest.spread.infinite:
            cameras[visit.name].append(visit)
    for visits in cameras.values():
        yield from _missed(max(visits, key=_lost))
        yield from _small(min(visits, key=lambda visit: visit.radius))


def _lost(visit: Visit) -> float:
    """Share of the light beside the sensor."""
    return 1 - passed(_area(visit.element), visit.element.centre, visit.widest.spread)


def _area(camera: Camera) -> Rectangle:
    ny, nx = camera.seen
    return Rectangle(nx * camera.pixel, ny * camera.pixel)


def _missed(visit: Visit) -> Iterator[Finding]:
    lost, area, spread = _lost(visit), _area(visit.element), visit.widest.spread
    if lost <= 1e-3:
        return
    x, y = (place + 0.0 for place in spread.offset)
    beside = passed(area, (x, y), spread) - (1 - lost)
    yield Finding(
        severity=Severity.HIGH if lost > 0.5 else Severity.MEDIUM if lost > 0.02 else Severity.LOW,
        check="sensor too small",
        element=visit.name,
        rule=f"what falls beside a sensor of {length(area.width)} x {length(area.height)} is in no frame: "
        + ("it stands beside the beam" if beside > lost / 2 else "it is small for the beam"),
        got=f"{visit.name}: beam radius {length(visit.radius)}, middle at ({length(x)}, {length(y)}), "
        f"about {percent(lost)} beside the sensor",
        fix=_moved(visit, x, y) if beside > lost / 2 else _larger(visit),
    )


def _moved(visit: Visit, x: float, y: float) -> str:
    """Code for a sensor in the middle of the beam."""
    return f'train.with_changes({{"{visit.name}.centre": ({x * 1e3:.4g}*mm, {y * 1e3:.4g}*mm)}})'


def _larger(visit: Visit) -> str:
    """Code for a sensor that holds a Gaussian beam to 2 w, all but 0.03 % of it."""
    camera, (x, y), (cx, cy) = visit.element, visit.widest.spread.offset, visit.element.centre
    apart = max(abs(x - float(cx)), abs(y - float(cy)))
    side = 2 * math.ceil((2 * visit.radius + apart) / camera.pixel)
    return f'train.with_changes({{"{visit.name}.shape": ({side}, {side})}})'


def _small(visit: Visit) -> Iterator[Finding]:
    pixels = visit.radius / visit.element.pixel
    if pixels >= FEWEST:
        return
    yield Finding(
        severity=Severity.MEDIUM,
        check="few pixels",
        element=visit.name,
        rule=f"lobes and rings want a beam radius of {FEWEST} pixels or more",
        got=f"{visit.name}: beam radius {length(visit.radius)} is {pixels:.2g} pixels",
        fix="a longer focal length before the camera, or a smaller pixel",
    )
