"""Letters of a bench that get their values on the command line."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Iterator
from dataclasses import fields, is_dataclass
from difflib import get_close_matches
from typing import Any

from fastaxis.errors import FastaxisError, SymbolError
from fastaxis.maths import free_symbols
from fastaxis.train.lab_values import ANGLES, LENGTHS

__all__ = ["given", "typed", "with_letters"]

LIKELY = {"wavelength": "532nm", "design": "532nm", "waist": "0.5mm", "power": "1mW", "focal": "200mm",
          "distance": "200mm"}  # fmt: skip


def with_letters(train: Any, options: Namespace) -> Any:
    """The train with the values that were typed after --symbol.

    Raises
    ------
    SymbolError : the bench has no such letter.
    ParameterError : a part cannot have this value.
    """
    pairs = dict(options.symbol)
    names = sorted(map(str, train.symbols))
    for letter in pairs:
        if letter not in names:
            likely = get_close_matches(letter, names, 1) or names[:1]
            fix = f"--symbol {typed(train, likely[0])}" if likely else "leave out --symbol"
            has = f"the letters of this bench are {', '.join(names)}" if names else "this bench has no letters"
            raise SymbolError(has, got=f"{train.name}: --symbol {letter}", fix=fix)
    try:
        return train.with_values(pairs) if pairs else train
    except FastaxisError as error:
        fix = " ".join(f"--symbol {given(train, letter, value)}" for letter, value in pairs.items())
        raise type(error)(error.rule, got=error.got, fix=fix) from error


def given(train: Any, letter: str, value: float) -> str:
    """What was probably meant by a number that no part accepts: its unit was left out.

    Only a whole number is taken up; 0.8 of anything can be meant in many ways.
    """
    meant = typed(train, letter)
    unit = meant.partition("=")[2].lstrip("0123456789.")
    # A number typed with its unit has been scaled: only one that is bare can miss it.
    return f"{letter}={value:g}{unit}" if value == round(value) != 0 and unit else meant


def typed(train: Any, letter: str) -> str:
    """A letter with a likely value in the unit of the parameter it stands in: theta=30deg.

    >>> import sympy
    >>> import fastaxis as fa
    >>> f = sympy.Symbol("f", positive=True)
    >>> typed(fa.Train(wavelength=633e-9).along(fa.Laser(waist=1e-3), fa.Lens(focal=f)), "f")
    'f=200mm'
    """
    places = {name for name, value in _leaves(train) if letter in map(str, free_symbols([value]))}
    if named := next((LIKELY[name] for name in LIKELY if name in places), ""):
        return f"{letter}={named}"
    if places & ANGLES:
        return f"{letter}=30deg"
    return f"{letter}=2mm" if places & LENGTHS else f"{letter}=0.3"


def _leaves(train: Any) -> Iterator[tuple[str, Any]]:
    """(name, value) of every parameter, those of states and modes included."""
    yield "wavelength", train.wavelength
    for element in train.elements.values():
        for name, value in element.parameters().items():
            yield from _inside(name, value)


def _inside(name: str, value: Any) -> Iterator[tuple[str, Any]]:
    if isinstance(value, tuple | list):
        for one in value:
            yield from _inside(name, one)
    elif is_dataclass(value):
        for field in fields(value):
            yield from _inside(field.name, getattr(value, field.name))
    else:
        yield name, value
