"""Floats read as the exact numbers they stand for: 0.39269908169872414 is pi/8, 0.97 is 97/100."""

from __future__ import annotations

import math
from fractions import Fraction
from functools import lru_cache

__all__ = ["exact", "pi_multiple"]

EPS = 2.0**-52
LARGEST_PI_DENOMINATOR = 72_000  # 0.0025 deg; chance hits lie 1/72000**2 apart, a million times wider than the test
LARGEST_DENOMINATOR = 10_000


@lru_cache(maxsize=4096)
def pi_multiple(value: float) -> Fraction | None:
    """The simple fraction f with value = f pi to within rounding, or None.

    >>> pi_multiple(0.39269908169872414)
    Fraction(1, 8)
    >>> pi_multiple(0.3) is None
    True
    """
    ratio = value / math.pi
    found = Fraction(ratio).limit_denominator(LARGEST_PI_DENOMINATOR)
    # 45*deg carries the rounding of pi/180, of the product and of later sums: 4 eps.
    if abs(float(found) - ratio) <= 4 * EPS * abs(ratio):
        return found
    return None


@lru_cache(maxsize=4096)
def exact(value: float) -> Fraction:
    """The simplest fraction within a rounding of a float, else the decimal number it prints as.

    >>> exact(0.97), exact(1/3), exact(0.123456789)
    (Fraction(97, 100), Fraction(1, 3), Fraction(123456789, 1000000000))
    """
    simple = Fraction(value).limit_denominator(LARGEST_DENOMINATOR)
    if abs(float(simple) - value) <= EPS * abs(value):
        return simple
    return Fraction(repr(float(value)))
