"""Numbers as one says them at a bench."""

from __future__ import annotations

import math

__all__ = ["degrees", "microns", "watts"]


def watts(power: float) -> str:
    """A power with three digits.

    >>> watts(2.5e-4), watts(0.0)
    ('250 uW', '0 W')
    """
    for unit, factor in (("W", 1.0), ("mW", 1e-3), ("uW", 1e-6), ("nW", 1e-9)):
        if abs(power) >= factor:
            return f"{power / factor:.3g} {unit}"
    return f"{power:.3g} W"


def degrees(angle: float) -> str:
    """An angle in degrees.

    >>> degrees(math.pi / 8)
    '22.5 deg'
    """
    return f"{math.degrees(angle):.4g} deg"


def microns(length: float) -> str:
    """A length in micrometres.

    >>> microns(89.4e-6)
    '89.4 um'
    """
    return f"{length * 1e6:.4g} um"
