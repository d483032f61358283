"""Names of parts: given by the user, or stem and number."""

from __future__ import annotations

import re
from dataclasses import replace
from itertools import count

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.train.ports import Elements

__all__ = ["free_name", "with_name"]

FORBIDDEN = re.compile(r'[./\\:"*?<>|\x00-\x1f]')


def free_name(elements: Elements, stem: str) -> str:
    """The first of stem1, stem2 ... that no part has."""
    return next(name for number in count(1) if (name := f"{stem}{number}") not in elements)


def with_name(elements: Elements, element: object) -> Element:
    """The part, named and fit to join the others."""
    if not isinstance(element, Element):
        kind = element.__name__ if isinstance(element, type) else type(element).__name__
        raise WiringError(
            "a train takes parts, and names of parts it already has",
            got=f"{kind} in place of a part",
            fix=_part_meant(element),
        )
    if not element.name:
        return replace(element, name=free_name(elements, element.stem))
    _check_name(element.name)
    if element.name in elements:
        same = elements[element.name] == element
        raise WiringError(
            "every part has a name of its own"
            + ("; a part that is met a second time is written as its name" if same else ""),
            got=f"{element.name}: a part of this name is already in the train",
            fix=f'"{element.name}"' if same else f'name="{free_name(elements, element.name.rstrip("0123456789"))}"',
        )
    return element


def _part_meant(thing: object) -> str:
    """A length was meant as free space; beyond 2 m its unit is missing."""
    if isinstance(thing, int | float) and thing > 0:
        return f"fa.FreeSpace({thing:g}{'*mm' if thing > 2 else ''})"
    return 'fa.HalfWavePlate(fast=22.5*deg, name="hwp")'


def _check_name(name: str) -> None:
    if FORBIDDEN.search(name) or name != name.strip() or name == "wavelength":
        plain = FORBIDDEN.sub("_", name.replace('"', "")).strip().replace("wavelength", "wavelength_part")
        raise WiringError(
            "a name is a word without dots, slashes and quotes, and not 'wavelength': ports and changes are written "
            "name.face, and files are called by it",
            got=f"{name!r} as the name of a part",
            fix=f'name="{plain}"',
        )
