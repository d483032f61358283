"""Numbers as a person reads them: an SI prefix and three digits."""

from __future__ import annotations

import math

__all__ = ["prefixed", "readable"]

PREFIXES = {-15: "f", -12: "p", -9: "n", -6: "µ", -3: "m", 0: "", 3: "k"}


def prefixed(largest: float, unit: str) -> tuple[float, str]:
    """The factor and the unit under which ``largest`` reads between 1 and 1000.

    >>> factor, unit = prefixed(2.5e-8, "W")
    >>> f"{2.5e-8 * factor:g} {unit}"
    '25 nW'
    """
    if not largest > 0 or not math.isfinite(largest):
        return 1.0, unit
    exponent = 3 * math.floor(math.log10(largest) / 3 + 1e-12)
    exponent = min(max(exponent, min(PREFIXES)), max(PREFIXES))
    return 10.0**-exponent, PREFIXES[exponent] + unit


def readable(value: float, unit: str, *, digits: int = 3) -> str:
    """A value with its prefix, to so many significant digits.

    >>> readable(0.00125, "W"), readable(0.00099999, "W"), readable(0, "W")
    ('1.25 mW', '1.00 mW', '0 W')
    """
    if value == 0 or not math.isfinite(value):
        return f"{value:.0f} {unit}"
    # Rounded before the prefix is chosen: 999.99 uW is 1.00 mW.
    value = float(f"{value:.{digits}g}")
    factor, name = prefixed(abs(value), unit)
    decimals = max(digits - 1 - math.floor(math.log10(abs(value * factor)) + 1e-12), 0)
    return f"{value * factor:.{decimals}f} {name}"
