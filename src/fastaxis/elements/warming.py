"""How the retardance of a plate follows its temperature."""

from __future__ import annotations

from typing import Any

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["REFERENCE", "checked_temperatures", "warming"]

REFERENCE = 293.15  # [K]; 20 degrees Celsius, the reference temperature of ISO 1
COLDEST, HOTTEST = 150.0, 1000.0  # [K]; below lie degrees Celsius, above no plate
MOST = 0.1  # [1/K]; crystals have 1e-6 to 1e-3, liquid crystals some 1e-2 close to clearing


def warming(drift: Scalar, temperature: Scalar, design_temperature: Scalar) -> Scalar:
    """Factor 1 + drift (temperature - design_temperature) of the whole path difference of a plate."""
    if not is_symbolic(drift) and drift == 0:
        return 1  # whole, so that letters keep exact numbers
    return 1 + drift * (temperature - design_temperature)


def checked_temperatures(
    part: str, temperature: Scalar, design_temperature: Scalar, drift: Scalar
) -> dict[str, Scalar]:
    """The three values, looked at one by one.

    Raises
    ------
    ParameterError : a temperature in degrees Celsius; a drift above 10 % a kelvin.
    """
    return {
        "temperature": _kelvin(part, "temperature", temperature),
        "design_temperature": _kelvin(part, "design_temperature", design_temperature),
        "drift": _drift(part, drift),
    }


def _kelvin(part: str, parameter: str, value: Any) -> Scalar:
    value = checks.number(part, parameter, value, fix=f"{parameter}=293.15")
    if not is_symbolic(value) and not COLDEST <= value <= HOTTEST:
        raise ParameterError(
            f"{parameter} is in kelvin, {COLDEST:g} to {HOTTEST:g}",
            got=f"{part}: {parameter} = {value:g}",
            fix=f"{parameter}=273.15 + {value:g}" if abs(value) <= 100 else f"{parameter}=293.15",
        )
    return value


def _drift(part: str, value: Any) -> Scalar:
    value = checks.number(part, "drift", value, fix="drift=-1e-4")
    if not is_symbolic(value) and abs(value) > MOST:
        meant = value * 1e-6  # given in parts per million
        raise ParameterError(
            "drift is the share of its retardance that a plate gains in one kelvin, at most 0.1",
            got=f"{part}: drift = {value:g}",
            fix=f"drift={meant if abs(meant) <= MOST else -1e-4:g}",
        )
    return value
