"""Checks of parameters, shared by parts, modes and states: each raises one sentence with rule, got and fix."""

from __future__ import annotations

import math
from typing import Any

from fastaxis.errors import ParameterError
from fastaxis.maths import Pattern, Scalar, Value, is_symbolic

__all__ = [
    "angle",
    "centre",
    "fraction",
    "half_integer",
    "length",
    "number",
    "wavelength",
]

LARGEST_ANGLE = 4 * math.pi  # two turns: a bare 22.5, 45 or 90 lies beyond


def _got(part: str, parameter: str, value: object) -> str:
    return f"{part}: {parameter} = {value!r}" if isinstance(value, str) else f"{part}: {parameter} = {value}"


def number(part: str, parameter: str, value: Any, *, fix: str) -> Scalar:
    """A finite real number, or a symbolic expression that may be real."""
    if is_symbolic(value):
        if getattr(value, "is_real", None) is False or getattr(value, "is_finite", None) is False:
            raise ParameterError(f"{parameter} must be real and finite", got=_got(part, parameter, value), fix=fix)
        return value
    try:
        real = float(value) if not isinstance(value, bool | str) else math.nan
    except (TypeError, ValueError):
        real = math.nan
    if not math.isfinite(real):
        raise ParameterError(
            f"{parameter} must be one real, finite number or a symbol", got=_got(part, parameter, value), fix=fix
        )
    return real


def angle(part: str, parameter: str, value: Value, *, patterned: bool = False) -> Value:
    """An angle in radians; a bare number of degrees is caught."""
    if patterned and isinstance(value, Pattern):
        return value
    value = number(part, parameter, value, fix=f"{parameter}=22.5*deg")
    if not is_symbolic(value) and abs(value) > LARGEST_ANGLE:
        raise ParameterError(
            f"{parameter} is in radians and {value:g} rad is {value / (2 * math.pi):.1f} turns: write degrees as 45*deg",
            got=_got(part, parameter, value),
            fix=f"{parameter}={value:g}*deg",
        )
    return value


def length(
    part: str, parameter: str, value: Any, *, least: float = 0.0, most: float = math.inf, zero: bool = False, fix: str
) -> Scalar:
    """A length in metres, positive (or zero where ``zero``), at most ``most``."""
    value = number(part, parameter, value, fix=fix)
    if is_symbolic(value):
        return value
    if value < least or (value == 0 and not zero):
        raise ParameterError(
            f"{parameter} must be {'zero or more' if zero else 'positive'}", got=_got(part, parameter, value), fix=fix
        )
    if value > most:
        raise ParameterError(
            f"{parameter} is in metres and {value:g} m is beyond {most:g} m: its unit is probably missing",
            got=_got(part, parameter, value),
            fix=fix,
        )
    return value


def wavelength(part: str, parameter: str, value: Any) -> Scalar:
    """A vacuum wavelength in metres, between 10 nm and 1 mm."""
    fix = (
        f"{parameter}={value:g}*nm" if isinstance(value, int | float) and 10 <= value <= 1e6 else f"{parameter}=532*nm"
    )
    value = number(part, parameter, value, fix=fix)
    if not is_symbolic(value) and not 1e-8 <= value <= 1e-3:
        raise ParameterError(
            f"{parameter} is in metres and must lie between 10 nm and 1 mm", got=_got(part, parameter, value), fix=fix
        )
    return value


def fraction(part: str, parameter: str, value: Value, *, fix: str, patterned: bool = False) -> Value:
    """A share of power between 0 and 1."""
    if patterned and isinstance(value, Pattern):
        return value
    value = number(part, parameter, value, fix=fix)
    if not is_symbolic(value) and not 0 <= value <= 1:
        raise ParameterError(
            f"{parameter} is a share of power and must lie between 0 and 1: a passive part has no gain",
            got=_got(part, parameter, value),
            fix=fix,
        )
    return value


def half_integer(part: str, parameter: str, value: Any) -> Scalar:
    """A multiple of 1/2, or a symbol."""
    value = number(part, parameter, value, fix=f"{parameter}=0.5")
    if not is_symbolic(value) and (2 * value) != round(2 * value):
        nearest = max(round(2 * abs(value)), 1) / 2 * (1 if value >= 0 else -1)
        raise ParameterError(
            f"{parameter} must be a multiple of 1/2 (0.5, 1, 1.5 ...): any other value leaves a cut in the plate",
            got=_got(part, parameter, value),
            fix=f"{parameter}={nearest:g}",
        )
    return value


def centre(part: str, value: Any) -> tuple[Scalar, Scalar]:
    """A place (x, y) in the plane of a part [m]."""
    try:
        x, y = value
    except (TypeError, ValueError):
        raise ParameterError(
            "centre must be a pair (x, y) in metres", got=_got(part, "centre", value), fix="centre=(0.1*mm, 0*mm)"
        ) from None
    fix = "centre=(0.1*mm, 0*mm)"
    return (
        length(part, "centre x", x, least=-math.inf, most=1.0, zero=True, fix=fix),
        length(part, "centre y", y, least=-math.inf, most=1.0, zero=True, fix=fix),
    )
