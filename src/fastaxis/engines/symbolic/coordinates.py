"""The plane's own letters, and the check that the user's letters are none of them."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

import sympy as sp

from fastaxis.errors import SymbolError

__all__ = ["PHI", "R", "X", "Y", "check_asked", "check_letters"]

R = sp.Symbol("r", positive=True)
PHI = sp.Symbol("phi", real=True)
X, Y = R * sp.cos(PHI), R * sp.sin(PHI)

TAKEN = {"r": "the distance from the axis", "phi": "the azimuth in the plane"}


def check_letters(letters: Iterable[Any]) -> None:
    """Refuse letters that are not real or stand for the plane's own coordinates.

    Raises
    ------
    SymbolError : a letter called r or phi; two different letters of one name; a letter that is declared not real.
    """
    seen: dict[str, Any] = {}
    for letter in sorted(letters, key=str):
        name = str(letter)
        if name in TAKEN:
            raise SymbolError(
                f"{name} is {TAKEN[name]} in every form; a parameter needs another letter",
                got=f"the letter {name} in the train",
                fix=f'sympy.Symbol("{name}_0", real=True)',
            )
        if letter.is_real is False:
            raise SymbolError(
                "parameters are real quantities", got=f"the letter {name}", fix=f'sympy.Symbol("{name}", real=True)'
            )
        if name in seen:
            raise SymbolError(
                "two letters of one name, declared with different assumptions, cannot be told apart in a form",
                got=f"the letter {name}",
                fix=f'{name} = sympy.Symbol("{name}", real=True)',
            )
        seen[name] = letter


def check_asked(letters: Iterable[Any], *asked: Any) -> None:
    """Refuse a letter in a question that looks like one of the form's and is another.

    Raises
    ------
    SymbolError : a letter of the same name with different assumptions.
    """
    known = {str(letter): letter for letter in (*letters, PHI, R)}
    for expression in asked:
        for letter in getattr(expression, "free_symbols", ()):
            if known.get(str(letter), letter) != letter:
                own = "positive=True" if known[str(letter)].is_positive else "real=True"
                raise SymbolError(
                    "two letters of one name, declared with different assumptions, cannot be told apart in a form",
                    got=f"the letter {letter}",
                    fix=f'{letter} = sympy.Symbol("{letter}", {own})',
                )
