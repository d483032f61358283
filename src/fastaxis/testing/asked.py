"""Checks of what an assertion expects, so that a slip in the test does not pass for one on the bench."""

from __future__ import annotations

from typing import Any

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.maths import is_symbolic

__all__ = ["an_angle", "at_least", "real", "slack"]


def real(assertion: str, parameter: str, value: Any, *, fix: str) -> float:
    """A finite number.

    >>> real("port_power", "power", 2, fix="power=2*mW")
    2.0
    """
    found = checks.number(assertion, parameter, value, fix=fix)
    if is_symbolic(found):
        raise ParameterError(f"{parameter} must be a number", got=f"{assertion}: {parameter} = {value}", fix=fix)
    return float(found)


def an_angle(assertion: str, parameter: str, value: Any) -> float:
    """An angle [rad]; degrees without their unit are caught as those of a part are."""
    found = real(assertion, parameter, value, fix=f"{parameter}=22.5*deg")
    checks.angle(assertion, parameter, found)
    checks.degrees_missed(assertion, parameter, value)
    return found


def at_least(assertion: str, parameter: str, value: Any, least: float, *, fix: str) -> float:
    """A finite number that is not too small."""
    found = real(assertion, parameter, value, fix=fix)
    if found < least:
        raise ParameterError(
            f"{parameter} must be {least:g} or more", got=f"{assertion}: {parameter} = {value}", fix=fix
        )
    return found


def slack(assertion: str, value: Any) -> float:
    """How far off an angle may be [rad]."""
    found = an_angle(assertion, "within", value)
    if not found > 0:
        raise ParameterError("within must be positive", got=f"{assertion}: within = {value}", fix="within=0.5*deg")
    return found
