"""Checks of parameters, shared by parts, modes and states: each raises one sentence with rule, got and fix."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from fastaxis.errors import FastaxisWarning, ParameterError, SlipWarning, caution
from fastaxis.maths import Pattern, Scalar, Value, is_symbolic

__all__ = [
    "angle",
    "at_least",
    "centre",
    "degrees_missed",
    "extinction",
    "fraction",
    "half_integer",
    "length",
    "long_exposure",
    "near_design",
    "number",
    "pattern",
    "real",
    "usual",
    "wavelength",
    "whole",
    "whole_radians",
]

# Places [m] at which a function is tried out.
TRIED = (np.array([[-1e-4, 2e-4, 3e-4], [1e-4, 2e-4, -3e-4]]), np.array([[-5e-5, 1e-4, 1.5e-4], [5e-5, 1e-4, -1.5e-4]]))
LARGEST_ANGLE = 4 * math.pi  # two turns: a bare 22.5, 45 or 90 lies beyond


def _got(part: str, parameter: str, value: object) -> str:
    shown = repr(value) if isinstance(value, str) else str(value)
    return f"{part}: {parameter} = {type(value).__name__ if chr(10) in shown else shown}"


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


def real(part: str, parameter: str, value: Any, *, fix: str) -> float:
    """A finite number, where a letter has no meaning.

    >>> real("port_power", "power", 2, fix="power=2*mW")
    2.0
    """
    found = number(part, parameter, value, fix=fix)
    if is_symbolic(found):
        raise ParameterError(f"{parameter} must be a number", got=f"{part}: {parameter} = {value}", fix=fix)
    return float(found)


def at_least(part: str, parameter: str, value: Any, least: float, *, fix: str, rule: str = "") -> float:
    """A finite number that is not too small; ``rule`` says why, where there is more to it."""
    found = real(part, parameter, value, fix=fix)
    if found < least:
        rule = rule or f"{parameter} must be {least:g} or more"
        raise ParameterError(rule, got=f"{part}: {parameter} = {value}", fix=fix)
    return found


def angle(part: str, parameter: str, value: Value, *, patterned: bool = False) -> Value:
    """An angle in radians; a bare number of degrees is caught."""
    if patterned and isinstance(value, Pattern):
        return value
    value = number(part, parameter, value, fix=f"{parameter}=22.5*deg")
    if not is_symbolic(value) and abs(value) > LARGEST_ANGLE:
        degrees = abs(value) <= math.degrees(LARGEST_ANGLE)
        turns = f"{value / (2 * math.pi):{'.1f' if degrees else '.3g'}}"
        meant = "write degrees as 45*deg" if degrees else "pairs of whole turns change nothing and are left out"
        raise ParameterError(
            f"{parameter} is in radians and {value:g} rad is {turns} turns: {meant}",
            got=_got(part, parameter, value),
            fix=f"{parameter}={value:g}*deg" if degrees else f"{parameter}={math.fmod(value, LARGEST_ANGLE):g}",
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


def _extremes(cells: Pattern) -> tuple[float, float]:
    """Smallest and largest value of a pattern of cells."""
    ends = [cells.scale * float(end) + cells.shift for end in (cells.source.min(), cells.source.max())]  # type: ignore[union-attr]  # an array
    return min(ends), max(ends)


def fraction(part: str, parameter: str, value: Value, *, fix: str, patterned: bool = False) -> Value:
    """A share of power between 0 and 1."""
    if patterned and isinstance(value, Pattern):
        if isinstance(value.source, Watched):
            value = replace(value, source=replace(value.source, share=True))
            value.source(*TRIED)
        elif not 0 <= _extremes(value)[0] <= _extremes(value)[1] <= 1:
            low, high = _extremes(value)
            raise ParameterError(
                f"{parameter} is a share of power and must lie between 0 and 1: a passive part has no gain",
                got=f"{part}: {parameter} runs from {low:g} to {high:g}",
                fix=fix,
            )
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


def whole(part: str, parameter: str, value: Any, *, least: int | None = None) -> Scalar:
    """A whole number, or a symbol."""
    value = number(part, parameter, value, fix=f"{parameter}={1 if least is None else max(1, least)}")
    if is_symbolic(value):
        return value
    if value != round(value) or (least is not None and value < least):
        nearest = round(value) if least is None else max(round(value), least)
        raise ParameterError(
            f"{parameter} must be a whole number{'' if least is None else f', {least} or more'}",
            got=_got(part, parameter, value),
            fix=f"{parameter}={nearest}",
        )
    return int(value)


def pattern(part: str, parameter: str, value: Any, pixel: Any, *, fix: str) -> Value:
    """A number, a symbol, or what varies over the plate: a Pattern, a function f(x, y) or an array of cells."""
    if isinstance(value, Pattern):
        tried = callable(value.source)
        return replace(value, source=_function(part, parameter, value.source).source) if tried else value
    if callable(value) and not is_symbolic(value):
        return _function(part, parameter, value)
    if hasattr(value, "shape") and value.shape != ():
        return _cells(part, parameter, value, pixel)
    return number(part, parameter, value, fix=fix)


def _function(part: str, parameter: str, function: Any) -> Pattern:
    """A function of the place, tried out on a small array so that a slip shows here and not in an engine."""
    watched = Watched(function, part, parameter)
    try:
        watched(*TRIED)
    except (TypeError, ValueError) as error:
        if isinstance(error, ParameterError):
            raise
        raise watched.refusal(f"stops with {type(error).__name__} ({error})") from None
    return Pattern(watched)


@dataclass(frozen=True)
class Watched:
    """A function of the place that is looked at whenever it is asked: a real, finite number everywhere.

    Parameters
    ----------
    function : f(x, y) on arrays [m].
    part, parameter : what it is the value of.
    share : whether it gives a share of power.
    """

    function: Callable[[Any, Any], Any]
    part: str
    parameter: str
    share: bool = False

    def __call__(self, x: Any, y: Any) -> Any:
        with np.errstate(all="ignore"):  # what comes of it is looked at
            values = np.asarray(self.function(x, y))
        shape = np.broadcast_shapes(np.shape(x), np.shape(y))
        if values.shape != shape or values.dtype.kind not in "fiub":
            raise self.refusal(f"gives {values.dtype} of shape {values.shape} at places of shape {shape}")
        if not np.isfinite(values).all():
            self._refuse(~np.isfinite(values), values, x, y)
        if self.share and values.min(initial=0.0) < 0:
            self._refuse(values < 0, values, x, y)
        return values

    def _refuse(self, bad: Any, values: Any, x: Any, y: Any) -> None:
        first = int(np.argmax(bad))
        across, down = (np.broadcast_to(place, bad.shape).flat[first] * 1e3 for place in (x, y))
        value = values.flat[first]
        raise self.refusal(
            f"gives {'NaN' if np.isnan(value) else f'{value:g}'} at {np.count_nonzero(bad)} of {bad.size} samples "
            f"(first at x = {across:.4g} mm, y = {down:.4g} mm)"
        )

    def refusal(self, got: str) -> ParameterError:
        """What is wrong with the function, and one that would do."""
        kind = "real, finite array of the same shape" + (", shares of power from 0 to 1" if self.share else "")
        return ParameterError(
            f"{self.parameter} as a function takes arrays x, y [m] and gives a {kind}",
            got=f"{self.part}: the function {self.parameter} {got}",
            fix=f"{self.parameter}=lambda x, y: " + ("0.5 + 0*x*y" if self.share else "90*deg * x / mm"),
        )


def _cells(part: str, parameter: str, cells: Any, pixel: Any) -> Pattern:
    """An array of cells with its pixel."""
    if pixel is None:
        raise ParameterError(
            f"{parameter} as an array needs the side of its cells", got=f"{part}: pixel is not given", fix="pixel=8*um"
        )
    cells = np.asarray(cells)
    if cells.ndim != 2 or cells.dtype.kind not in "fiub" or not np.isfinite(cells).all():
        raise ParameterError(
            f"{parameter} as an array is 2-D (ny, nx), real and finite",
            got=f"{part}: {parameter} has shape {cells.shape} and type {cells.dtype}",
            fix=f"{parameter}=lambda x, y: 0*x*y",
        )
    return Pattern(cells.astype(float), length(part, "pixel", pixel, most=0.01, fix="pixel=8*um"))


def usual(
    part: str, parameter: str, value: Any, most: float, *, fix: str, unit: str = "metres"
) -> list[FastaxisWarning]:
    """A caution for a length or a time that is possible but so large that its unit may be missing."""
    if is_symbolic(value) or abs(value) <= most:
        return []
    return [
        SlipWarning(
            f"{parameter} is in {unit} and rarely beyond {most:g} {unit[0]}: its unit may be missing",
            got=_got(part, parameter, value),
            fix=fix,
        )
    ]


def long_exposure(part: str, time: float) -> list[FastaxisWarning]:
    """A caution for an exposure of many seconds: with a laser on a camera 20 was meant in milliseconds."""
    return usual(part, "exposure_time", time, 1.0, fix=f"exposure_time={time:g}*ms", unit="seconds")


def whole_radians(part: str, parameter: str, value: Any, *, least: float = 0.0) -> list[FastaxisWarning]:
    """A caution for an angle of 3, 5, 10 ... radians exactly: small enough to pass, but it was meant in degrees.

    Angles up to ``least`` [rad] are taken as they are.
    """
    whole = isinstance(value, int | float) and not isinstance(value, bool) and value == round(value)
    return [_degrees_meant(part, parameter, value)] if whole and least < abs(value) <= LARGEST_ANGLE else []


def degrees_missed(part: str, parameter: str, value: Any) -> None:
    """The same caution said at once, for what no train asks for its cautions."""
    for warning in () if is_symbolic(value) else whole_radians(part, parameter, value):
        caution(warning)


def _degrees_meant(part: str, parameter: str, value: float) -> SlipWarning:
    return SlipWarning(
        f"{parameter} is in radians and {value:g} rad is {math.degrees(value):.1f} deg: degrees are written 10*deg",
        got=_got(part, parameter, value),
        fix=f"{parameter}={value:g}*deg",
    )


def near_design(part: str, design: Scalar | None, wavelength: Scalar) -> list[FastaxisWarning]:
    """A caution for a plate used more than a tenth away from the wavelength it was made for."""
    if design is None or is_symbolic(design) or is_symbolic(wavelength) or abs(wavelength / design - 1) <= 0.1:
        return []
    return [
        SlipWarning(
            f"a plate made for {design * 1e9:.4g} nm is far off its nominal values at {wavelength * 1e9:.4g} nm",
            got=f"{part}: design = {design * 1e9:.6g}*nm",
            fix=f"design={wavelength * 1e9:.6g}*nm",
        )
    ]


def extinction(part: str, value: Any) -> Scalar:
    """A ratio T1/T2 of passed powers above 1; infinite for an ideal polarizer."""
    if not is_symbolic(value) and value == math.inf:
        return math.inf
    value = number(part, "extinction", value, fix="extinction=1e5")
    if not is_symbolic(value) and value <= 1:
        raise ParameterError(
            "extinction is the ratio T1/T2 of the powers passed along and across the axis, above 1",
            got=_got(part, "extinction", value),
            fix=f"extinction={1 / value:.6g}" if 0 < value < 1 else "extinction=1e5",
        )
    return value
