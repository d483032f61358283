"""A polarization, from its Jones vector, in words."""

from __future__ import annotations

from math import pi
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.conventions import View
from fastaxis.light import ellipse, stokes
from fastaxis.report.echo import percent

__all__ = ["azimuth_text", "named"]

# States that differ by less than this are called by the name of the ideal one; a tenth of a degree is told apart.
SAME = 1e-9
LETTERS = {0: "H", 45: "D", 90: "V", -45: "A", -90: "V", 135: "A"}


def azimuth_text(azimuth: float) -> str:
    """A linear state by its azimuth [rad].

    >>> azimuth_text(-pi / 4)
    'linear at -45 deg (A)'
    """
    turned = round((azimuth * 180 / pi + 90 - 1e-9) % 180 - 90 + 1e-9, 6) + 0.0
    letter = LETTERS.get(turned)  # type: ignore[call-overload]  # a float that is whole finds its key
    return f"linear at {turned:g} deg" + (f" ({letter})" if letter else "")


def named(field: NDArray[Any], view: View = View.RECEIVER) -> str:
    """The state of a Jones vector and, if it is below 1, its power.

    >>> named(np.array([1, -1j]) / 2)
    'R, 50 % of the power'
    """
    s = stokes(np.asarray(field, complex))
    power = float(s[0])
    if power < SAME:
        return "dark"
    share = "" if abs(power - 1) < SAME else f", {percent(power)} of the power"
    azimuth, ellipticity = (float(angle) for angle in ellipse(s))
    # Near the pole 1 - |s3| goes as the square of the angle, so the size of the linear part is compared.
    if np.hypot(s[1], s[2]) < SAME * power:
        return view.circular_name(-1 if s[3] > 0 else 1) + share
    if abs(s[3]) < SAME * power:
        return azimuth_text(azimuth) + share
    hand = {"R": "right", "L": "left"}[view.circular_name(-1 if ellipticity > 0 else 1)]
    turned = round(azimuth * 180 / pi, 4) + 0.0
    narrow = round(abs(ellipticity) * 180 / pi, 4)
    return f"{hand}-handed ellipse at {turned:g} deg, ellipticity {narrow:g} deg{share}"
