"""Letters in the values of parts: finding them at any depth, and putting numbers in their place."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import fields, is_dataclass, replace
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.errors import SymbolError
from fastaxis.maths import is_symbolic
from fastaxis.train.ports import closest

__all__ = ["as_symbols", "letters", "substituted", "substituted_element"]


def letters(value: object) -> set[Any]:
    """All letters in a value: in tuples, in states, modes and terms inside it."""
    if is_symbolic(value):
        return set(value.free_symbols)  # type: ignore[attr-defined]  # is_symbolic saw it
    if isinstance(value, tuple | list):
        return set().union(*(letters(item) for item in value))
    if is_dataclass(value) and not isinstance(value, type):
        return set().union(*(letters(getattr(value, f.name)) for f in fields(value)))
    return set()


def as_symbols(known: set[Any], values: Mapping[Any, Any]) -> dict[Any, Any]:
    """The same values keyed by the letters themselves; a name stands for every letter written so.

    Raises
    ------
    SymbolError : no such letter.
    """
    found: dict[Any, Any] = {}
    for key, value in values.items():
        matching = [letter for letter in known if letter == key or str(letter) == key]
        if not matching:
            names = sorted(str(letter) for letter in known)
            raise SymbolError(
                f"the letters are {', '.join(names)}" if names else "all values are numbers already",
                got=f"{key}: no such letter in the train",
                fix=f'train.with_values({{"{closest(str(key), names)}": {value}}})' if names else "train.copy()",
            )
        found |= dict.fromkeys(matching, value)
    return found


def substituted(value: Any, values: Mapping[Any, Any]) -> Any:
    """The value with numbers for letters; an expression left without letters becomes a plain number.

    Exact sympy values stay exact, so that a formula may be asked at pi/8 and give sqrt(2).
    """
    if not letters(value) & values.keys():
        return value
    if is_symbolic(value):
        return _plain(value.subs(values), exact=any(is_symbolic(v) for v in values.values()))
    if isinstance(value, tuple | list):
        return type(value)(substituted(item, values) for item in value)
    new = {f.name: substituted(getattr(value, f.name), values) for f in fields(value) if f.init}
    if {str(letter) for letter in values} & set(re.findall(r"\w+", str(new.get("label", "")))):
        new["label"] = ""  # linear(alpha) is labelled by its letter, which is gone
    return replace(value, **new)


def _plain(value: Any, *, exact: bool) -> Any:
    if exact or not is_symbolic(value) or value.free_symbols:
        return value
    if value.is_Integer:
        return int(value)
    number = complex(value)
    return number if number.imag else number.real


def substituted_element(element: Element, values: Mapping[Any, Any]) -> Element:
    """The part with numbers for letters; its own checks apply to them."""
    old = element.parameters()
    new = {name: substituted(value, values) for name, value in old.items()}
    changes = {name: value for name, value in new.items() if value is not old[name]}
    return element.changed(**changes) if changes else element
