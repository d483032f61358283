"""Multipliers that turn a number and its unit into SI: ``532*nm``, ``22.5*deg``, ``5*mW``.

Everything in fastaxis takes and returns metres, radians and watts, so a quantity is always written
as *number times unit*. The factors are plain floats and work with arrays and sympy symbols alike.

>>> from fastaxis.units import nm, deg
>>> round(532*nm, 12)
5.32e-07
>>> 180*deg
3.141592653589793
"""

import math

pm = 1e-12
nm = 1e-9
um = 1e-6
mm = 1e-3
cm = 1e-2
m = 1.0
km = 1e3

nW = 1e-9
uW = 1e-6
mW = 1e-3
W = 1.0

s = 1.0
ms = 1e-3
us = 1e-6

rad = 1.0
mrad = 1e-3
urad = 1e-6
deg = math.pi / 180
arcmin = deg / 60
turn = 2 * math.pi
waves = 2 * math.pi  # a retardance or phase of one wavelength

__all__ = [
    "W",
    "arcmin",
    "cm",
    "deg",
    "km",
    "m",
    "mW",
    "mm",
    "mrad",
    "ms",
    "nW",
    "nm",
    "pm",
    "rad",
    "s",
    "turn",
    "uW",
    "um",
    "urad",
    "us",
    "waves",
]  # fmt: skip
