"""The kinds that a saved train may hold: fastaxis' own parts and light, and nothing else unless asked."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import is_dataclass
from functools import cache
from importlib import import_module
from pkgutil import walk_packages
from types import ModuleType

from fastaxis.elements.base import Element
from fastaxis.maths import Pattern

__all__ = ["part_kinds", "value_kinds"]

PART_ROOMS = ("fastaxis.elements",)
LIGHT_ROOMS = ("fastaxis.light", "fastaxis.laws", "fastaxis.elements")


def _modules(room: str) -> Iterable[ModuleType]:
    package = import_module(room)
    yield package
    for found in walk_packages(package.__path__, f"{room}."):
        yield import_module(found.name)


def _classes(rooms: Iterable[str]) -> dict[str, type]:
    return {
        thing.__name__: thing
        for room in rooms
        for module in _modules(room)
        for thing in vars(module).values()
        if isinstance(thing, type) and thing.__module__.startswith(room)
    }


@cache
def _own_parts() -> dict[str, type]:
    return {name: kind for name, kind in _classes(PART_ROOMS).items() if issubclass(kind, Element)}


@cache
def _own_values() -> dict[str, type]:
    found = {
        name: kind
        for name, kind in _classes(LIGHT_ROOMS).items()
        if is_dataclass(kind) and not issubclass(kind, Element)
    }
    return {**found, "Pattern": Pattern}


def part_kinds(extra: Iterable[type[Element]] = ()) -> dict[str, type]:
    """Parts by class name; ``extra`` are parts of the user's own."""
    return {**_own_parts(), **{kind.__name__: kind for kind in extra}}


def value_kinds() -> dict[str, type]:
    """States, modes, terms, beams, sources, patterns, shapes of stops: dataclasses of fastaxis."""
    return _own_values()
