"""Plane bookkeeping: which plane a camera shows, how large, upright or inverted, in focus or nearly so."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.camera import Camera
from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.imaging import (
    NEARLY,
    Image,
    image_of,
    image_words,
    last_distance,
    magnification_words,
    moved,
    plane_shown,
)
from fastaxis.inspect.words import length

__all__ = ["planes", "waist_beyond"]


def planes(bench: Bench) -> Iterator[Finding]:
    """For each camera: the patterned planes it shows, and a focus or image that is missed by a little."""
    for visit in bench.of_kind(Camera):
        for part in visit.chain()[:-1]:
            if part.shapes:
                yield _shown(part, visit)
        yield from _focus(visit)


def _shown(part: Visit, camera: Visit) -> Finding:
    image = image_of(part, camera)
    if image.nearly:
        off = image.beyond
        return Finding(
            severity=Severity.MEDIUM,
            check="off the image",
            element=camera.name,
            rule=f"the image of {part.name} is sharp where B of the ray matrix vanishes",
            got=f"{camera.name}: {length(abs(off))} {'before' if off > 0 else 'behind'} the image of {part.name}, "
            f"{magnification_words(image.magnification)}{_instead(camera)}",
            fix=moved(camera, off),
        )
    return Finding(
        severity=Severity.NOTE,
        check="plane shown",
        element=camera.name,
        rule="a patterned plane is imaged where B of the ray matrix vanishes"
        if image.sharp
        else "away from its image a patterned plane is seen diffracted",
        got=_seen(part, camera, image),
        fix="nothing to mend",
    )


def _seen(part: Visit, camera: Visit, image: Image) -> str:
    if image.sharp:
        return f"{camera.name} shows the plane of {part.name}, {magnification_words(image.magnification)}"
    if image.far:
        return f"{camera.name}: {part.name} is seen in the far field, focal length {length(image.focus)}"
    told = f"{camera.name}: {part.name} is seen at a Fresnel number of {image.fresnel:.2g}"
    return f"{told}; {image_words(part, camera)}{_instead(camera)}" if image.real else told


def _instead(camera: Visit) -> str:
    plane = plane_shown(camera)
    return f"; {camera.name} shows {plane}" if plane else ""


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
    if not 0.5 * rayleigh < abs(ahead) < NEARLY * (last_distance(camera) + ahead):
        return
    yield Finding(
        severity=Severity.MEDIUM,
        check="off focus",
        element=camera.name,
        rule="a camera at the focus stands within half a Rayleigh distance of it",
        got=f"{camera.name}: {length(abs(ahead))} {'before' if ahead > 0 else 'behind'} the focus, "
        f"Rayleigh distance {length(rayleigh)}",
        fix=moved(camera, ahead),
    )
