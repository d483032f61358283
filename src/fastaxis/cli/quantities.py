"""Numbers with units as they are typed on a command line: 22.5deg, 8mm, 532 nm."""

from __future__ import annotations

import re

from fastaxis import units
from fastaxis.errors import ParameterError

__all__ = ["assignment", "quantity"]

_NUMBER = re.compile(r"\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*\*?\s*([A-Za-zµ°]*)\s*")
_ALSO = {"": "m", "µm": "um", "µW": "uW", "°": "deg"}


def quantity(text: str) -> float:
    """A number with its unit, in SI; a bare number is taken as it is.

    >>> quantity("8mm"), round(quantity("22.5 deg"), 6), quantity("0.5")
    (0.008, 0.392699, 0.5)

    Raises
    ------
    ParameterError : not a number, or a unit that is not known.
    """
    match = _NUMBER.fullmatch(text)
    unit = _ALSO.get(match[2], match[2]) if match else ""
    if match is None or unit not in units.__all__:
        raise ParameterError(
            f"a quantity is a number and one of the units {', '.join(sorted(units.__all__))}",
            got=f"'{text}'",
            fix="22.5deg",
        )
    return float(match[1]) * float(getattr(units, unit))


def assignment(text: str) -> tuple[str, float]:
    """A letter and its value.

    >>> assignment("d=8mm")
    ('d', 0.008)

    Raises
    ------
    ParameterError : no equals sign, or a value that is no quantity.
    """
    letter, equals, value = text.partition("=")
    if not equals or not letter.strip():
        raise ParameterError("a letter is given its value as LETTER=VALUE", got=f"'{text}'", fix="theta=22.5deg")
    return letter.strip(), quantity(value)
