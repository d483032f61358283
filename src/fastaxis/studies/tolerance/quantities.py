"""Figures of merit and parameters in the units of the lab."""

from __future__ import annotations

import math

from fastaxis.train.lab_values import ANGLES, LENGTHS, lab_length

__all__ = ["lab_quantity", "lab_step", "lab_value"]

PREFIXES = ((1.0, ""), (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p"))
SHORT = frozenset({"design", "wavelength"})  # lengths that move by nanometres


def lab_quantity(value: float, unit: str, *, digits: int = 4) -> str:
    """A figure of merit to so many digits: watts and metres with a prefix, radians as degrees.

    >>> lab_quantity(0.00250148, "W"), lab_quantity(8.94e-5, "m"), lab_quantity(-0.37, "rad"), lab_quantity(0.98, "")
    ('2.501 mW', '89.4 µm', '-21.2°', '0.98')
    """
    if unit == "rad":
        return f"{math.degrees(value):.{digits}g}°"
    if unit not in ("W", "m"):
        return f"{value:.{digits}g} {unit}".strip()
    factor, prefix = next((step for step in PREFIXES if abs(value) >= step[0]), PREFIXES[-1] if value else PREFIXES[0])
    return f"{value / factor:.{digits}g} {prefix}{unit}"


def lab_value(parameter: str, value: float) -> str:
    """A parameter of a part, or an error of it.

    >>> lab_value("fast", 0.017453292519943295), lab_value("centre_x", 5e-5), lab_value("extinction", 100.0)
    ('1°', '0.05 mm', '100')
    """
    kind = _kind(parameter)
    if kind == "angle":
        return f"{math.degrees(value):.4g}°"
    if kind == "length":
        return f"{value * 1e3:.4g} mm"
    return lab_length(value) if kind == "short" else f"{value:.4g}"


def lab_step(parameter: str) -> tuple[float, str]:
    """The step over which a slope is told, in the unit of the parameter, and its name.

    >>> lab_step("distance"), lab_step("wavelength"), lab_step("reflectance")
    ((0.001, 'mm'), (1e-09, 'nm'), (1.0, '1'))
    """
    return {"angle": (math.pi / 180, "°"), "length": (1e-3, "mm"), "short": (1e-9, "nm")}.get(
        _kind(parameter), (1.0, "1")
    )


def _kind(parameter: str) -> str:
    name = parameter.removesuffix("_x").removesuffix("_y")
    if name in SHORT:
        return "short"
    return "length" if name in LENGTHS else "angle" if name in ANGLES else ""
