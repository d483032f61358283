"""Checks of what an assertion expects, so that a slip in the test does not pass for one on the bench."""

from __future__ import annotations

from typing import Any

from fastaxis import checks
from fastaxis.checks import at_least, real
from fastaxis.errors import ParameterError

__all__ = ["a_place", "an_angle", "at_least", "positive", "real", "slack", "whole"]


def an_angle(assertion: str, parameter: str, value: Any) -> float:
    """An angle [rad]; degrees without their unit are caught as those of a part are."""
    found = real(assertion, parameter, value, fix=f"{parameter}=22.5*deg")
    checks.angle(assertion, parameter, found)
    checks.degrees_missed(assertion, parameter, value)
    return found


def positive(assertion: str, parameter: str, value: Any, *, fix: str) -> float:
    """A finite number above zero: how far off something may be, or a length."""
    found = real(assertion, parameter, value, fix=fix)
    if not found > 0:
        raise ParameterError(f"{parameter} must be positive", got=f"{assertion}: {parameter} = {value}", fix=fix)
    return found


def whole(assertion: str, parameter: str, value: Any, *, fix: str) -> int:
    """A whole number.

    >>> whole("charge", "charge", -1.0, fix="charge=-1")
    -1
    """
    found = real(assertion, parameter, value, fix=fix)
    if found != round(found):
        raise ParameterError(f"{parameter} must be a whole number", got=f"{assertion}: {parameter} = {value}", fix=fix)
    return int(found)


def a_place(assertion: str, value: Any) -> tuple[float, float]:
    """A place (x, y) [m]."""
    try:
        x, y = value
    except (TypeError, ValueError):
        raise ParameterError(
            "centre is a place (x, y) in metres", got=f"{assertion}: centre = {value!r}", fix="centre=(0.1*mm, 0)"
        ) from None
    first, second = (real(assertion, "centre", one, fix="centre=(0.1*mm, 0)") for one in (x, y))
    return first, second


def slack(assertion: str, value: Any) -> float:
    """How far off an angle may be [rad]."""
    found = an_angle(assertion, "within", value)
    if not found > 0:
        raise ParameterError("within must be positive", got=f"{assertion}: within = {value}", fix="within=0.5*deg")
    return found
