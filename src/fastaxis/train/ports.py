"""Port strings such as "pbs.reflected": reading them, and the faces where light can go in or out of a part."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from difflib import get_close_matches
from typing import Literal, TypeAlias

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.maths import Scalar

__all__ = ["Elements", "Way", "alike", "closest", "in_faces", "named", "out_faces", "read_port", "split"]

Elements: TypeAlias = Mapping[str, Element]
Way: TypeAlias = Literal["in", "out"]


def split(port: str) -> tuple[str, str]:
    """Name and face of a port string; the face is "" when only the part is named.

    >>> split("pbs.reflected"), split("cam")
    (('pbs', 'reflected'), ('cam', ''))
    """
    name, _, face = port.partition(".")
    return name, face


def alike(word: str, known: Iterable[str]) -> str | None:
    """The known word that was most likely meant; None when none looks like it."""
    folded = {w.lower(): w for w in reversed(list(known))}
    match = get_close_matches(word.lower(), folded, n=1, cutoff=0.4)
    return folded[match[0]] if match else None


def closest(word: str, known: Iterable[str]) -> str | None:
    """The known word that was most likely meant, else the first; None when there is none at all."""
    words = list(known)
    return alike(word, words) or (words[0] if words else None)


def in_faces(element: Element, wavelength: Scalar) -> tuple[str, ...]:
    """Faces where light may enter."""
    open_faces = {into for into, _ in element.passages(wavelength)}
    if not open_faces and element.entry:
        return (element.entry,)
    return tuple(face for face in element.faces if face in open_faces)


def out_faces(element: Element, wavelength: Scalar) -> tuple[str, ...]:
    """Faces from which light may leave."""
    open_faces = {out for _, out in element.passages(wavelength)}
    if not open_faces and element.exit:
        return (element.exit,)
    return tuple(face for face in element.faces if face in open_faces)


def named(elements: Elements, name: str) -> Element:
    """The part of this name, or a WiringError with the name that was likely meant."""
    if name in elements:
        return elements[name]
    likely = alike(name, elements)
    instead = "print(train)" if elements else f'train.add(fa.FreeSpace(100*mm, name="{name}"))'
    raise WiringError(
        f"the train has the parts {', '.join(elements)}" if elements else "the train has no parts yet",
        got=f"'{name}': no part of this name",
        fix=f'"{likely}"' if likely else instead,
    )


def read_port(elements: Elements, port: str) -> tuple[str, str]:
    """Name and face of a port of this train; the face stays "" when the default is meant."""
    if not isinstance(port, str):
        raise _no_port(elements, port)
    name, face = split(port)
    element = named(elements, name)
    if face and face not in element.faces:
        raise WiringError(
            f"{type(element).__name__} has the faces {', '.join(element.faces)}",
            got=f"{port}: no face '{face}'",
            fix=f'"{name}.{closest(face, element.faces)}"',
        )
    return name, face


def _no_port(elements: Elements, given: object) -> WiringError:
    """What to say of something else in place of a port: of a part of the train, its name."""
    own = next((name for name, part in elements.items() if part is given), None)
    last = next(reversed(list(elements)), None)
    return WiringError(
        'a port is the name of a part, with a face where it has several ("pbs.reflected")',
        got=f"{type(given).__name__} in place of a port",
        fix=f'"{own or last}"' if elements else "print(train)",
    )
