"""Numbers for a numeric plan: exact numbers become floats, letters without a value are refused."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import fields, is_dataclass, replace
from typing import Any

from fastaxis.errors import SymbolError
from fastaxis.maths import Pattern, free_symbols, is_symbolic

__all__ = ["bound", "refuse_letters"]


def _children(value: Any) -> Iterator[Any]:
    if is_dataclass(value) and not isinstance(value, type | Pattern):
        yield from (getattr(value, field.name) for field in fields(value))
    elif isinstance(value, tuple | list):
        yield from value


def _letters(value: Any) -> set[Any]:
    if is_symbolic(value):
        return free_symbols([value])
    return set().union(*(_letters(child) for child in _children(value)))


def refuse_letters(name: str, parameters: dict[str, Any]) -> None:
    """Raise a SymbolError for the first parameter of an element that still has letters in it.

    >>> import sympy
    >>> refuse_letters("hwp", {"fast": sympy.Symbol("theta")})
    Traceback (most recent call last):
    ...
    fastaxis.errors.SymbolError: hwp.fast = theta has no value; a numeric answer needs a number for every letter \
(fix: train.with_values({"theta": 0.3}))
    """
    for parameter, value in parameters.items():
        letters = sorted(str(letter) for letter in _letters(value))
        if letters:
            values = ", ".join(f'"{letter}": 0.3' for letter in letters)
            raise SymbolError(
                "a numeric answer needs a number for every letter",
                got=f"{name}.{parameter} = {value} has no value",
                fix=f"train.with_values({{{values}}})",
            )


def bound(value: Any) -> Any:
    """The same data with every exact number made a float; the very same object if there is none."""
    if is_symbolic(value):
        return float(value)
    if isinstance(value, tuple):
        new = tuple(bound(item) for item in value)
        return value if all(a is b for a, b in zip(new, value, strict=True)) else new
    if is_dataclass(value) and not isinstance(value, type | Pattern):
        changes = {f.name: bound(getattr(value, f.name)) for f in fields(value) if f.init}
        changes = {key: item for key, item in changes.items() if item is not getattr(value, key)}
        return replace(value, **changes) if changes else value
    return value
