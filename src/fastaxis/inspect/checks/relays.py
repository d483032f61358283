"""Pairs of lenses that are nearly a relay, and relays with one of their three distances wrong."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from fastaxis.elements.camera import Camera
from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.imaging import image_of, image_words, moved, plane_shown
from fastaxis.inspect.words import length, mm
from fastaxis.laws import ScalarLaw

__all__ = ["relays"]

# Lens positions on a rail are good to about a millimetre in 300.
SET, NEARLY = 0.004, 0.15
PERHAPS = 0.35  # of the spacing of a relay that has one of its ends right
MEANT = 0.01  # of a focal length: a distance so close to it was chosen for it


@dataclass(frozen=True)
class _Relay:
    """Two lenses in a row, the last patterned part before them and a camera behind them, if there are.

    A relay images the plane f1 before its first lens to f2 behind its second, when the two stand f1 + f2 apart.
    """

    first: Visit
    second: Visit
    part: Visit | None
    camera: Visit | None

    @property
    def total(self) -> float:
        return float(self.first.element.focal) + float(self.second.element.focal)

    @property
    def apart(self) -> float:
        return self.second.distance - self.first.distance

    @property
    def object_off(self) -> float | None:
        """How much farther than f1 the part stands before the first lens [m]."""
        if self.part is None:
            return None
        return self.first.distance - self.part.distance - float(self.first.element.focal)

    @property
    def camera_off(self) -> float | None:
        """How much farther than f2 the camera stands behind the second lens [m]."""
        if self.camera is None:
            return None
        return self.camera.distance - self.second.distance - float(self.second.element.focal)

    def meant(self, off: float | None, lens: Visit) -> bool:
        return off is not None and abs(off) < MEANT * float(lens.element.focal)

    @property
    def picture(self) -> str:
        """What the camera sees of the part, and which plane it shows."""
        if self.part is None or self.camera is None:
            return ""
        image = image_of(self.part, self.camera)
        shown = "" if image.sharp else plane_shown(self.camera)
        return f"; {image_words(self.part, self.camera)}" + (f"; {self.camera.name} shows {shown}" if shown else "")


def relays(bench: Bench) -> Iterator[Finding]:
    """Distances of neighbouring lenses, of the part before and the camera behind them, against focal lengths."""
    cameras = list(bench.of_kind(Camera))
    told: set[tuple[str, str]] = set()
    for visit in bench.of_kind(Lens):
        first = _lens_before(visit)
        if first is None or float(first.element.focal) + float(visit.element.focal) <= 0:
            continue
        if (first.name, visit.name) not in told:
            told.add((first.name, visit.name))
            yield from _judged(_Relay(first, visit, _part_before(first), _camera_behind(visit, cameras)))


def _judged(relay: _Relay) -> Iterator[Finding]:
    off = abs(relay.apart / relay.total - 1)
    ends = relay.meant(relay.object_off, relay.first) + relay.meant(relay.camera_off, relay.second)
    if SET < off < NEARLY or (off >= NEARLY and ends == 2):
        yield _spacing(relay, Severity.MEDIUM)
    elif NEARLY <= off < PERHAPS and ends == 1:
        yield _spacing(relay, Severity.LOW)
    elif off <= SET:
        yield from _one_end(relay)


def _spacing(relay: _Relay, severity: Severity) -> Finding:
    first, second = relay.first.name, relay.second.name
    return Finding(
        severity=severity,
        check="relay spacing",
        element=second,
        rule="two lenses pass a collimated beam on as one, and phase fronts unbent, when they stand f1 + f2 apart",
        got=f"{first} and {second}: {length(relay.apart)} apart, f1 + f2 = {length(relay.total)}{relay.picture}",
        fix=moved(relay.second, relay.total - relay.apart),
    )


def _one_end(relay: _Relay) -> Iterator[Finding]:
    """Of a relay of the right spacing, one end at its focal plane and the other not."""
    part, camera = relay.part, relay.camera
    if part is None or camera is None or image_of(part, camera).sharp or image_of(part, camera).nearly:
        return  # on the image, or so near to it that the check of planes tells
    at_object, at_camera = relay.meant(relay.object_off, relay.first), relay.meant(relay.camera_off, relay.second)
    if at_object and not at_camera:
        yield _end(relay, camera, relay.second, by=-float(relay.camera_off or 0.0), severity=Severity.MEDIUM)
    elif at_camera and not at_object:
        # A part may stand where it does for reasons of its own; a camera stands where a picture is.
        yield _end(relay, part, relay.first, by=float(relay.object_off or 0.0), severity=Severity.LOW)


def _end(relay: _Relay, end: Visit, lens: Visit, *, by: float, severity: Severity) -> Finding:
    away = abs(end.distance - lens.distance)
    side = "behind" if end is relay.camera else "before"
    return Finding(
        severity=severity,
        check="relay spacing",
        element=end.name,
        rule="a relay of two lenses images the plane f1 before the first to f2 behind the second",
        got=f"{end.name}: {length(away)} {side} {lens.name}, f = {length(float(lens.element.focal))}{relay.picture}",
        fix=moved(end, by)
        if end is relay.camera
        else f"move {end.name} by {'+' if by > 0 else '-'}{mm(abs(by))} along the beam",
    )


def _lens_before(visit: Visit) -> Visit | None:
    before = visit.previous
    while before is not None and not isinstance(before.element, Lens):
        before = before.previous
    return before


def _part_before(first: Visit) -> Visit | None:
    """The last part that gives the beam a shape or stops some of it, with no lens on the way."""
    before = first.previous
    while before is not None and not isinstance(before.element, Lens):
        if before.shapes or any(isinstance(law, ScalarLaw) and law.stop is not None for law in before.laws):
            return before
        before = before.previous
    return None


def _camera_behind(second: Visit, cameras: list[Visit]) -> Visit | None:
    """The first camera with no lens on the way."""
    return next((camera for camera in cameras if _lens_before(camera) is second), None)
