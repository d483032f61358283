"""What stands under a part in a drawing: its setting in lab units, a few words."""

from __future__ import annotations

import math
from collections.abc import Callable
from fractions import Fraction
from typing import Any

from fastaxis.conventions import View
from fastaxis.maths import Pattern, is_symbolic
from fastaxis.report.prefix import readable

__all__ = ["detail", "in_degrees", "in_lab_units"]


def in_degrees(angle: Any) -> str:
    """An angle as it is set on a mount; letters stay letters.

    >>> import math
    >>> in_degrees(math.pi / 8)
    '22.5°'
    """
    if isinstance(angle, Pattern):
        return "patterned"
    return str(angle) if is_symbolic(angle) else f"{math.degrees(angle):.4g}°"


def in_lab_units(length: Any) -> str:
    """A length in m, mm, µm or nm without trailing zeros; beams and stops are spoken of in mm down to a tenth.

    >>> in_lab_units(0.5), in_lab_units(0.8e-3), in_lab_units(3.45e-6)
    ('500 mm', '0.8 mm', '3.45 µm')
    """
    if is_symbolic(length):
        return str(length)
    if abs(length) * (1 + 1e-9) >= 1e-4 and abs(length) < 1e-3:
        return f"{length * 1e3:.4g} mm"
    shown = readable(length, "m", digits=4)
    number, unit = shown.split(" ")
    return f"{float(number):g} {unit}"


def _place(place: Any) -> str:
    """Both coordinates of a place in one unit."""
    if any(is_symbolic(x) for x in place):
        return ", ".join(in_lab_units(x) for x in place)
    unit, factor = ("mm", 1e3) if max(map(abs, place)) * (1 + 1e-9) >= 1e-4 else ("µm", 1e6)
    return f"({', '.join(f'{x * factor:.4g}' for x in place)}) {unit}"


def _plain(value: Any) -> str:
    return str(value) if is_symbolic(value) else str(Fraction(value).limit_denominator(100))


def _share(value: Any) -> str:
    return "patterned" if isinstance(value, Pattern) else str(value) if is_symbolic(value) else f"{value:.3g}"


def _index(value: Any) -> str:
    value = complex(value)
    return f"{value.real:.4g}" if value.imag == 0 else f"{value.real:.3g}+{value.imag:.3g}i"


WORDS: dict[str, tuple[str, Callable[[Any], str]]] = {
    "fast": ("fast", in_degrees),
    "slow": ("slow", in_degrees),
    "axis": ("axis", in_degrees),
    "q": ("q", _plain),
    "offset": ("offset", in_degrees),
    "focal": ("f", in_lab_units),
    "distance": ("", in_lab_units),
    "charge": ("charge", _plain),
    "radius": ("radius", in_lab_units),
    "inner": ("inner", in_lab_units),
    "outer": ("outer", in_lab_units),
    "width": ("width", in_lab_units),
    "height": ("height", in_lab_units),
    "angle": ("turn", in_degrees),
    "phase": ("phase", in_degrees),
    "reflectance": ("R", _share),
    "Tp": ("Tp", _share),
    "Rs": ("Rs", _share),
    "index": ("n", _index),
    "incidence": ("at", in_degrees),
    "roll": ("roll", in_degrees),
    "density": ("density", _share),
    "pixel": ("pixel", in_lab_units),
    "retardance": ("δ", in_degrees),
    "power": ("", lambda power: str(power) if is_symbolic(power) else readable(power, "W")),
    "waist": ("w", in_lab_units),
    "mode": ("", lambda mode: type(mode).__name__),
    "beam": ("", lambda beam: f"sum of {len(beam.terms)} modes"),
    "state": ("", lambda state: str(getattr(state, "label", ""))),
    "fold": ("fold", str),
    "orientation": ("", str),
    "centre": ("at", _place),
}
NOT_SHOWN: dict[
    tuple[str, str], float | str
] = {  # what goes without saying: an ordinary half- or quarter-wave plate, a part on the axis
    ("HalfWavePlate", "retardance"): math.pi,
    ("QuarterWavePlate", "retardance"): math.pi / 2,
    ("QPlate", "retardance"): math.pi,
    ("Mirror", "fold"): "horizontal",
    ("Camera", "orientation"): "upright",
    ("Mirror", "Rs"): 1.0,
    ("PolarizingBeamSplitter", "Rs"): 1.0,
    ("PolarizingBeamSplitter", "Tp"): 1.0,
}


def detail(element: Any, *, most: int = 3, view: View = View.RECEIVER) -> str:
    """The main settings of a part, one a line; R and L named as ``view`` names them.

    >>> from fastaxis.elements.retarder import HalfWavePlate, Retarder
    >>> print(detail(Retarder(slow=0, retardance=1.5)))
    slow 0°
    δ 85.94°
    >>> print(detail(HalfWavePlate(fast=0.5)))
    fast 28.65°
    """
    lines = []
    for parameter, (word, shown) in WORDS.items():
        value = getattr(element, parameter, None) if parameter in element.parameters() else None
        if value is None or _goes_without_saying(element, parameter, value):
            continue
        text = shown(value)
        lines.append(f"{word} {view.rename(text) if parameter == 'state' else text}".strip())
    return "\n".join([line for line in lines if line][:most])


def _goes_without_saying(element: Any, parameter: str, value: Any) -> bool:
    if parameter == "centre":
        return not any(is_symbolic(x) or x != 0 for x in value)
    usual = NOT_SHOWN.get((type(element).__name__, parameter))
    if isinstance(usual, str):
        return bool(value == usual)
    if usual is None or isinstance(value, Pattern) or is_symbolic(value):
        return False
    return math.isclose(value, usual)
