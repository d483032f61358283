"""Which plane a camera shows, and where the image of a plane lies, by ray matrices."""

from __future__ import annotations

import math
from dataclasses import dataclass

from fastaxis.elements.free_space import FreeSpace
from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Visit, ray_matrix
from fastaxis.inspect.words import length, mm
from fastaxis.laws import TravelLaw

__all__ = [
    "NEARLY",
    "SHARP",
    "Image",
    "image_of",
    "image_words",
    "last_distance",
    "magnification_words",
    "moved",
    "plane_shown",
]

SHARP = 25.0  # Fresnel number from which a picture shows its own plane rather than diffraction
NEARLY = 0.18  # of the way from the last lens to a focus or an image: a camera so near was probably meant to be there
FLAT = 1e-3  # [1/m]; a kilometre of radius
SAME = 1e-6  # [m]; closer planes are one


@dataclass(frozen=True)
class Image:
    """The image of a part's plane on the way to a camera.

    Parameters
    ----------
    beyond : how far behind the camera it lies [m]; negative before it, infinite where light is collimated.
    magnification : of the image; negative for one turned by 180 degrees.
    fresnel : Fresnel number of the beam at the part as the camera sees it; infinite on the image.
    focus : focal length of the way from the part to the camera [m]; infinite without one.
    real : whether the image lies behind the last lens.
    far : whether the camera shows the far field of the part.
    nearly : whether the camera misses the image by so little that it was meant to be on it.
    bend : curvature [1/m] that flat phase fronts at the part have on the image.
    """

    beyond: float
    magnification: float
    fresnel: float
    focus: float
    real: bool
    far: bool
    nearly: bool
    bend: float

    @property
    def sharp(self) -> bool:
        """Whether the camera shows the plane rather than its diffraction."""
        return self.fresnel >= SHARP


def last_distance(camera: Visit) -> float:
    """Distance from the last lens, or from the laser, to the camera [m]."""
    lenses = [visit.distance for visit in camera.chain() if isinstance(visit.element, Lens)]
    return camera.distance - (lenses[-1] if lenses else 0.0)


def moved(visit: Visit, by: float) -> str:
    """Code that moves a part, and all behind it, along the beam, where a space of its own before it has the room."""
    space = visit.previous
    if space is not None and isinstance(space.element, FreeSpace) and not _passed_again(space):
        distance = float(space.element.distance) + by
        if distance >= 0:
            return f'train.with_changes({{"{space.name}.distance": {distance * 1e3:.5g}*mm}})'
    return f"move {visit.name} by {'+' if by > 0 else '-'}{mm(abs(by))} along the beam"


def _passed_again(space: Visit) -> bool:
    return sum(visit.name == space.name for visit in space.chain()) > 1


def image_of(part: Visit, camera: Visit) -> Image:
    """Where the plane just behind a part is imaged.

    From the matrix (a, b; c, d) of the way to the camera: at -b/d behind it, with magnification 1/d there.
    """
    chain = camera.chain()
    section = ray_matrix(chain[next(k for k, visit in enumerate(chain) if visit is part) + 1 : -1])
    a, b, c, d = (float(value) for value in (section.a, section.b, section.c, section.d))
    scale = part.radius**2 / part.widest.wavelength
    beyond = -b / d if d else math.inf
    fresnel = scale * abs(a) / abs(b) if b else math.inf
    last = last_distance(camera)
    lenses = any(isinstance(visit.element, Lens) for visit in chain if visit.distance >= part.distance)
    real = lenses and -last < beyond < math.inf
    return Image(
        beyond=beyond,
        magnification=a if b == 0 else (1 / d if d else math.inf),
        fresnel=fresnel,
        focus=1 / abs(c) if c else math.inf,
        real=real,
        far=abs(a) < 1e-6 and c != 0,
        nearly=real and fresnel < SHARP and 0 < abs(beyond) < NEARLY * (last + beyond),
        bend=c * d,
    )


def magnification_words(magnification: float) -> str:
    """A magnification and what it does to the picture.

    >>> magnification_words(-0.5)
    'magnification -0.5 (turned by 180°)'
    """
    return f"magnification {magnification:+.3g}{' (turned by 180°)' if magnification < 0 else ''}"


def image_words(part: Visit, camera: Visit) -> str:
    """Where the image of a part lies, for a person."""
    image = image_of(part, camera)
    if image.sharp:
        bent = (
            f", flat phase fronts bent to a radius of {length(1 / abs(image.bend))}" if abs(image.bend) > FLAT else ""
        )
        return f"{camera.name} shows {part.name}, {magnification_words(image.magnification)}{bent}"
    if not image.real:
        return f"{part.name} has no real image behind the last lens"
    side = "behind" if image.beyond > 0 else "before"
    return (
        f"the image of {part.name} lies {length(abs(image.beyond))} {side} {camera.name}, "
        f"{magnification_words(image.magnification)}"
    )


def plane_shown(camera: Visit) -> str:
    """The plane that is imaged on a camera through its lenses, for a person; "" where none is.

    The one farthest downstream: with it, all its images further up are shown.
    """
    section, through_lens = TravelLaw(), False
    chain = camera.chain()
    for index in range(len(chain) - 2, -1, -1):
        visit = chain[index]
        if isinstance(visit.element, FreeSpace) and through_lens and section.a:
            before, reach = -float(section.b / section.a), float(visit.element.distance)
            if -SAME < before < reach + SAME:
                return f"{_place(chain, index, before)}, {magnification_words(float(section.a))}"
        section = ray_matrix((visit,)).then(section)
        through_lens = through_lens or isinstance(visit.element, Lens)
    return ""


def _place(chain: tuple[Visit, ...], index: int, before: float) -> str:
    """A plane a distance before the end of a stretch of free space, told from the part next to it."""
    behind = float(chain[index].element.distance) - before
    if before < SAME:
        return f"the plane of {chain[index + 1].name}"
    if behind < SAME:
        return f"the plane of {chain[index - 1].name if index else chain[0].source}"
    return f"the plane {length(before)} before {chain[index + 1].name}"
