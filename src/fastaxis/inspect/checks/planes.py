"""Plane bookkeeping: which plane a camera shows, how large, upright or inverted, in focus or nearly so."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.camera import Camera
from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Bench, Visit, ray_matrix
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import length, mm
from fastaxis.laws import TravelLaw

__all__ = ["planes", "waist_beyond"]

SHARP = 25.0  # Fresnel number from which a picture shows its own plane rather than diffraction
NEARLY = 0.18  # of the way from the last lens to a focus or an image: a camera so near was probably meant to be there


def planes(bench: Bench) -> Iterator[Finding]:
    """For each camera: the patterned planes it shows, and a focus or image that is missed by a little."""
    for visit in bench.of_kind(Camera):
        chain = visit.chain()
        for index, part in enumerate(chain[:-1]):
            if part.shapes:
                yield from _shown(part, visit, ray_matrix(chain[index + 1 : -1]))
        yield from _focus(visit)


def _shown(part: Visit, camera: Visit, section: TravelLaw) -> Iterator[Finding]:
    a, b = float(section.a), float(section.b)
    scale = part.radius**2 / part.widest.wavelength
    number = scale * abs(a) / abs(b) if b else float("inf")
    off = -b / float(section.d) if section.d else float("inf")
    through_lens = any(isinstance(visit.element, Lens) for visit in camera.chain() if visit.distance >= part.distance)
    if number >= SHARP:
        yield Finding(
            severity=Severity.NOTE,
            check="plane shown",
            element=camera.name,
            rule="a patterned plane is imaged where B of the ray matrix vanishes",
            got=f"{camera.name} shows the plane of {part.name}, magnification {a:+.3g}"
            f"{' (turned by 180°)' if a < 0 else ''}",
            fix="nothing to mend",
        )
    elif through_lens and 0 < abs(off) < NEARLY * (_last_distance(camera) + off):
        yield Finding(
            severity=Severity.MEDIUM,
            check="off the image",
            element=camera.name,
            rule=f"the image of {part.name} is sharp where B of the ray matrix vanishes",
            got=f"{camera.name}: {length(abs(off))} {'before' if off > 0 else 'behind'} the image of {part.name}",
            fix=f"move {camera.name} by {'+' if off > 0 else '-'}{mm(abs(off))} along the beam",
        )
    else:
        yield Finding(
            severity=Severity.NOTE,
            check="plane shown",
            element=camera.name,
            rule="away from its image a patterned plane is seen diffracted",
            got=f"{camera.name}: {part.name} is seen in the far field, focal length {length(1 / abs(float(section.c)))}"
            if abs(a) < 1e-6 and section.c
            else f"{camera.name}: {part.name} is seen at a Fresnel number of {number:.2g}",
            fix="nothing to mend",
        )


def _last_distance(camera: Visit) -> float:
    """Distance from the last lens, or from the laser, to the camera [m]."""
    lenses = [visit.distance for visit in camera.chain() if isinstance(visit.element, Lens)]
    return camera.distance - (lenses[-1] if lenses else 0.0)


def waist_beyond(visit: Visit) -> tuple[float, float]:
    """(distance from here downstream to the beam's waist, its Rayleigh distance), both [m]."""
    spread = visit.widest.spread
    slope2 = (spread.curvature * spread.size) ** 2 + spread.angle**2
    return -spread.curvature * spread.size**2 / slope2, spread.size * spread.angle / slope2


def _focus(camera: Visit) -> Iterator[Finding]:
    if camera.widest.spread.infinite or not any(isinstance(visit.element, Lens) for visit in camera.chain()):
        return
    ahead, rayleigh = waist_beyond(camera)
    # Half a Rayleigh distance off, a spot is 12 % wider than at the focus.
    if not 0.5 * rayleigh < abs(ahead) < NEARLY * (_last_distance(camera) + ahead):
        return
    yield Finding(
        severity=Severity.MEDIUM,
        check="off focus",
        element=camera.name,
        rule="a camera at the focus stands within half a Rayleigh distance of it",
        got=f"{camera.name}: {length(abs(ahead))} {'before' if ahead > 0 else 'behind'} the focus, "
        f"Rayleigh distance {length(rayleigh)}",
        fix=f"move {camera.name} by {'+' if ahead > 0 else '-'}{mm(abs(ahead))} along the beam",
    )
