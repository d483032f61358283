"""The parameters of a part as they are spoken of in the lab: degrees and waves, millimetres, milliwatts, percent."""

from __future__ import annotations

from collections.abc import Iterator
from math import log, pi, sqrt
from typing import Any

from fastaxis.conventions import View
from fastaxis.elements import Element
from fastaxis.maths import Pattern, Scalar, is_symbolic
from fastaxis.report.prefix import readable

__all__ = ["degrees", "echoed", "length", "percent", "waves"]

FWHM = sqrt(2 * log(2))  # full width at half maximum of a Gaussian irradiance, in units of w


def degrees(angle: Scalar) -> str:
    """An angle [rad] in degrees.

    >>> degrees(pi / 8), degrees(-pi / 2)
    ('22.5 deg', '-90 deg')
    """
    # Nine digits hide the rounding of 22.5*pi/180*180/pi and show every angle somebody sets.
    return str(angle) if is_symbolic(angle) else f"{round(angle * 180 / pi, 9) + 0.0:g} deg"


def waves(phase: Scalar) -> str:
    """A retardance or phase [rad] in degrees and waves.

    >>> waves(pi / 2)
    '90 deg (0.250 waves)'
    """
    return str(phase) if is_symbolic(phase) else f"{degrees(phase)} ({phase / (2 * pi):.3f} waves)"


def length(value: Scalar) -> str:
    """A length [m] in a unit that fits.

    >>> length(0.8e-3), length(0)
    ('0.800 mm', '0 m')
    """
    if is_symbolic(value) or not 1e-4 <= abs(value) < 1e-3:
        return str(value) if is_symbolic(value) else readable(float(value), "m")
    return f"{value * 1e3:.3f} mm"  # beams and stops are spoken of in millimetres down to a tenth


def percent(share: Scalar) -> str:
    """A share of power.

    >>> percent(1.0), percent(0.0076), percent(1e-5)
    ('100 %', '0.76 %', '0.001 %')
    """
    return str(share) if is_symbolic(share) else f"{100 * share:.4g} %"


def _waist(value: Scalar) -> str:
    if is_symbolic(value):
        return str(value)
    if abs(value * 1e5 - round(value * 1e5)) < 1e-6:  # whole hundredths of a millimetre: no more digits than were set
        return f"w = {value * 1e3:.2f} mm (FWHM {FWHM * value * 1e3:.2f} mm)"
    return f"w = {length(value)} (FWHM {length(FWHM * value)})"


def _place(value: tuple[Scalar, Scalar]) -> str:
    if is_symbolic(value[0]) or is_symbolic(value[1]):
        return f"({length(value[0])}, {length(value[1])})"
    # Both in one unit: "0 m" beside micrometres reads like a mistake.
    unit, factor = ("mm", 1e3) if max(map(abs, value)) * (1 + 1e-9) >= 1e-4 else ("µm", 1e6)
    return f"({value[0] * factor:.4g}, {value[1] * factor:.4g}) {unit}"


def _extinction(value: Scalar) -> str:
    return str(value) if is_symbolic(value) else ("ideal" if value == float("inf") else f"{value:g} : 1")


def _tilt(value: Scalar) -> str:
    return str(value) if is_symbolic(value) else readable(value, "rad")


def _index(value: complex) -> str:
    """n, or n + ik of what absorbs."""
    value = complex(value)
    return f"{value.real:g}" if value.imag == 0 else f"{value.real:g} + {value.imag:g}i"


def _power(value: Scalar) -> str:
    return str(value) if is_symbolic(value) else readable(value, "W")


def _nanometres(value: Scalar) -> str:
    return str(value) if is_symbolic(value) else f"{value * 1e9:.6g} nm"


def _cells(pattern: Pattern) -> str:
    if callable(pattern.source):
        return "varies over the plate (a function of x and y)"
    ny, nx = pattern.source.shape
    return f"varies over the plate ({ny} x {nx} cells of {length(pattern.pixel)})"


def _state(value: Any, view: View) -> str:
    """A state by its name, or by its ellipse."""
    if hasattr(value, "parts"):
        return value.label or f"mixture of {len(value.parts)} states"
    return view.rename(value.label) or f"azimuth {degrees(value.azimuth)}, ellipticity {degrees(value.ellipticity)}"


def _temperature(value: Scalar) -> str:
    return str(value) if is_symbolic(value) else f"{value:g} K ({value - 273.15:.4g} °C)"


def _seconds(value: float) -> str:
    return readable(value, "s")


def _drift(value: Scalar) -> str:
    return str(value) if is_symbolic(value) else f"{value:g} per K"


def _mode(value: Any) -> str:
    """A mode by its kind, its orders and its size."""
    orders = [f"{name} = {getattr(value, name)}" for name in ("p", "l", "m", "n") if hasattr(value, name)]
    sizes = [f"{name} {length(getattr(value, name))}" for name in ("waist", "radius") if hasattr(value, name)]
    return ", ".join([type(value).__name__, *orders, *sizes])


def _beam(value: Any, view: View) -> str:
    """The terms of a coherent sum, one a line."""
    return "\n".join(
        f"{f'{term.amplitude:.3g}'.strip('()')} x {_mode(term.mode)}, {_state(term.state, view)}"
        if isinstance(term.amplitude, complex)
        else f"{term.amplitude} x {_mode(term.mode)}, {_state(term.state, view)}"
        for term in value.terms
    )


def _parts(value: Any) -> str:
    return f"{len(value)} parts of {', '.join(percent(part[0]) for part in value)}"


def _rows_and_columns(value: tuple[int, int]) -> str:
    return f"{value[0]} x {value[1]} (rows x columns)"


SPOKEN = (
    (degrees, "fast slow axis offset angle incidence base roll"),
    (waves, "retardance phase phase_p phase_s phase_t phase_r phase_tp phase_ts phase_rp phase_rs"),
    (length, "focal radius inner outer width height distance pixel waist_at"),
    (percent, "transmission reflectance transmittance Rp Rs Tp Ts"),
    (_waist, "waist"),
    (_place, "centre"),
    (_extinction, "extinction"),
    (_tilt, "x y wedge"),
    (_power, "power"),
    (_index, "index layer"),
    (_nanometres, "design"),
    (_temperature, "temperature design_temperature"),
    (_drift, "drift"),
    (_seconds, "exposure_time"),
    (_mode, "mode"),
    (_parts, "incoherent"),
    (_rows_and_columns, "shape"),
)
_SAID_BY = {parameter: speak for speak, parameters in SPOKEN for parameter in parameters.split()}


def _spoken(parameter: str, value: Any, view: View) -> str:
    if isinstance(value, Pattern):
        return _cells(value)
    if parameter in ("state", "beam", "expects"):
        return _beam(value, view) if parameter == "beam" else _state(value, view)
    if parameter in _SAID_BY:
        return str(_SAID_BY[parameter](value))
    if isinstance(value, bool):
        return "yes" if value else "no"
    return f"{value:g}" if isinstance(value, int | float) else str(value)


# What goes without saying unless it was changed.
USUAL: dict[str, Any] = {
    "transmission": 1.0, "order": 0, "centre": (0.0, 0.0), "waist_at": 0.0, "x": 0.0, "y": 0.0, "wedge": 0.0,
    "orientation": "upright", "temperature": 293.15, "design_temperature": 293.15, "drift": 0.0,
    "phase_p": 0.0, "phase_s": 0.0, "phase_t": 0.0, "phase_tp": 0.0, "phase_ts": 0.0,
    "phase_r": pi / 2, "phase_rp": pi / 2, "phase_rs": pi / 2,
}  # fmt: skip


def echoed(element: Element, view: View = View.RECEIVER) -> Iterator[tuple[str, str]]:
    """Name and spoken value of each parameter that is set to something of its own."""
    for parameter, value in element.parameters().items():
        patterned = isinstance(value, Pattern)
        if value is not None and (patterned or parameter not in USUAL or value != USUAL[parameter]):
            yield parameter, _spoken(parameter, value, view)
