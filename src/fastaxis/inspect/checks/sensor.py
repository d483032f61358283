"""The beam on the camera: does it fit, and is it spread over enough pixels?"""

from __future__ import annotations

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
    """Light that misses the sensor, and spots of a few pixels."""
    for visit in bench.of_kind(Camera):
        if not visit.widest.spread.infinite:
            yield from _missed(visit)
            yield from _small(visit)


def _missed(visit: Visit) -> Iterator[Finding]:
    camera = visit.element
    ny, nx = camera.seen
    width, height = nx * camera.pixel, ny * camera.pixel
    spread = visit.widest.spread
    lost = 1 - passed(Rectangle(width, height), camera.centre, spread)
    if lost <= 1e-3:
        return
    x, y = spread.offset
    yield Finding(
        severity=Severity.HIGH if lost > 0.5 else Severity.MEDIUM if lost > 0.02 else Severity.LOW,
        check="sensor too small",
        element=visit.name,
        rule=f"what falls beside a sensor of {length(width)} x {length(height)} is in no frame",
        got=f"{visit.name}: beam radius {length(visit.radius)}, middle at ({length(x)}, {length(y)}), "
        f"about {percent(lost)} beside the sensor",
        fix=f"focus the beam, or move the sensor: centre=({x * 1e3:.4g}*mm, {y * 1e3:.4g}*mm)",
    )


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
