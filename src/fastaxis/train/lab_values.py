"""Values of parts in the units of the lab, short enough for a listing."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import MISSING, fields, is_dataclass
from math import pi
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.maths import Pattern, Scalar, is_symbolic

__all__ = ["lab_length", "lab_parameters"]

ANGLES = frozenset({
    "angle", "axis", "azimuth", "base", "ellipticity", "fast", "incidence", "offset", "phase", "phase_p", "phase_r",
    "phase_rp", "phase_rs", "phase_s", "phase_t", "phase_tp", "phase_ts", "retardance", "roll", "slow", "wedge",
    "x", "y",  # the angles by which a wedge turns the beam
})  # fmt: skip
LONGEST = 60  # characters of one value in a listing
MANY_TERMS = 2  # modes named one by one
LENGTHS = frozenset({
    "centre", "design", "distance", "focal", "height", "inner", "outer", "pixel", "radius", "waist", "waist_at",
    "width",
})  # fmt: skip

PREFIXES = {"": 1.0, "m": 1e-3, "µ": 1e-6, "n": 1e-9}
LENGTH_STEPS = ((1.0, ""), (1e-4, "m"), (1e-6, "µ"), (1e-10, "n"))  # a waist is 0.8 mm and not 800 µm
TIME_STEPS = ((1.0, ""), (1e-3, "m"), (1e-6, "µ"))
POWER_STEPS = ((0.1, ""), (1e-4, "m"), (1e-7, "µ"), (1e-13, "n"))


def _scaled(value: float, unit: str, steps: tuple[tuple[float, str], ...]) -> str:
    for least, prefix in steps:
        # The last digits of 5.32e-07/1e-09 are rounding: six digits show every number somebody types.
        if abs(value) >= least * (1 - 1e-9):
            return f"{value / PREFIXES[prefix]:.6g} {prefix}{unit}"
    return f"{value:.6g} {unit}"


def lab_length(value: Scalar) -> str:
    """A length [m] in the unit it is spoken of.

    >>> lab_length(5.32e-7), lab_length(0.0034), lab_length(0.0)
    ('532 nm', '3.4 mm', '0 m')
    """
    return str(value) if is_symbolic(value) else _scaled(value, "m", LENGTH_STEPS)


def _lab(parameter: str, value: Any) -> str:
    if isinstance(value, Pattern):
        return "patterned"
    if isinstance(value, tuple):
        return f"({', '.join(_lab(parameter, item) for item in value)})"
    if is_dataclass(value) and not isinstance(value, type):
        return _object(value)
    return _number(parameter, value) if isinstance(value, float) else str(value)


def _number(parameter: str, value: float) -> str:
    if parameter in ANGLES:
        return f"{value * 180 / pi:.6g}°"
    if parameter in LENGTHS:
        return lab_length(value)
    if parameter == "exposure_time":
        return _scaled(value, "s", TIME_STEPS)
    return _scaled(value, "W", POWER_STEPS) if parameter == "power" else f"{value:.6g}"


def _object(value: Any) -> str:
    """A state or mode: its label if it has one, else its kind and values."""
    if label := getattr(value, "label", ""):
        return str(label)
    if hasattr(value, "terms"):
        return f"sum of {_terms(value.terms)}"
    told = (f"{f.name} {_lab(f.name, getattr(value, f.name))}" for f in fields(value) if f.name != "label")
    return f"{type(value).__name__}({', '.join(told)})"


def _terms(terms: Any) -> str:
    """A coherent sum by the kinds and states of its modes, or by their number where there are many."""
    if len(terms) > MANY_TERMS:
        return f"{len(terms)} modes"
    return " and ".join(f"{type(term.mode).__name__} {getattr(term.state, 'label', '')}".strip() for term in terms)


def _short(text: str) -> str:
    return text if len(text) <= LONGEST else text[: LONGEST - 3] + "..."


def _told(element: Element) -> Iterator[tuple[str, Any]]:
    """Parameters that were set, and the principal one in any case."""
    first = True
    for field in fields(element):
        value = getattr(element, field.name)
        if field.name == "name" or value is None:
            continue
        # Identity first: values may be arrays, whose comparison is no yes or no.
        usual = value is field.default or (field.default is not MISSING and repr(value) == repr(field.default))
        if first or not usual:
            yield field.name, value
        first = False


def lab_parameters(element: Element) -> str:
    """The parameters of a part that were set, in lab units.

    >>> from fastaxis.elements.retarder import Retarder
    >>> lab_parameters(Retarder(fast=0.39269908169872414, retardance=1.5707963267948966, design=6.328e-7))
    'fast 22.5°, retardance 90°, design 632.8 nm'
    """
    return ", ".join(f"{name} {_short(_lab(name, value))}" for name, value in _told(element))
