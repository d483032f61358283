"""Quantities as they are read at a bench."""

from __future__ import annotations

import math

from fastaxis.train.lab_values import lab_length

__all__ = ["degrees", "length", "many", "mm", "percent", "seconds", "watts"]

PREFIXES = ((1.0, ""), (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p"))


def watts(power: float) -> str:
    """A power to three digits.

    >>> watts(0.00125), watts(0.39e-3), watts(0.0)
    ('1.25 mW', '390 µW', '0 W')
    """
    return _prefixed(power, "W")


def seconds(time: float) -> str:
    """A time to three digits.

    >>> seconds(0.0025), seconds(math.inf)
    ('2.5 ms', 'inf s')
    """
    return _prefixed(time, "s")


def _prefixed(value: float, unit: str) -> str:
    for factor, prefix in PREFIXES if math.isfinite(value) else ():
        # Half of the last of three digits: 0.9996 mW is read as 1 mW.
        if abs(value) >= 0.9995 * factor:
            return f"{value / factor:.3g} {prefix}{unit}"
    return f"{value:.3g} {unit}"


def length(value: float) -> str:
    """A length to four digits, in the unit it is spoken of.

    >>> length(0.0012345), length(math.inf)
    ('1.234 mm', 'unbounded')
    """
    return "unbounded" if math.isinf(value) else lab_length(float(f"{value:.4g}"))


def degrees(angle: float) -> str:
    """An angle [rad] in degrees.

    >>> degrees(math.pi / 8)
    '22.5°'
    """
    return f"{round(math.degrees(angle), 9) + 0.0:.4g}°"


def percent(share: float) -> str:
    """A share in per cent; what is left of rounding is none.

    >>> percent(0.0076), percent(1e-7), percent(1e-16)
    ('0.76 %', '1e-05 %', '0 %')
    """
    return f"{100 * round(share, 14) + 0.0:.3g} %"


def mm(value: float) -> str:
    """A length as code.

    >>> mm(0.00254)
    '2.54*mm'
    """
    return f"{value * 1e3:.4g}*mm"


def many(number: float) -> str:
    """A large number to three digits.

    >>> many(78123.4), many(8.2e8), many(3.27)
    ('78100', '8.2e8', '3.27')
    """
    if abs(number) >= 1e6:
        mantissa, exponent = f"{number:.2e}".split("e")
        return f"{float(mantissa):g}e{int(exponent)}"
    return f"{float(f'{number:.3g}'):g}" if abs(number) < 1e4 else f"{float(f'{number:.3g}'):.0f}"
