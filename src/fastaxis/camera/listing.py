"""An exposure in words: a line a setting, and the signs."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from fastaxis.camera.mounting import Mounting
from fastaxis.camera.photons import time_words

if TYPE_CHECKING:
    from fastaxis.camera.exposure import Exposure, Row

__all__ = ["listing"]

_STEPS = ((1.0, "W"), (1e-3, "mW"), (1e-6, "uW"), (1e-9, "nW"))


def listing(shots: Exposure) -> str:
    """Power, lobes and the angle of a bright lobe for each setting, closed by the line of signs."""
    rows = shots.table()
    width = max(len(row.label) for row in rows)
    head = ", ".join(word for word in (shots.name, shots.target) if word) or "exposure"
    mounted = Mounting(shots.orientation).words if shots.pixel is not None else ""
    notes = [f"  picture {mounted}; states, and angles of lobes in the beam's frame"] if mounted else []
    lines = (f"  {row.label:<{width}}  {_words(row, shots.dark_below)}" for row in rows)
    return "\n".join([head, *lines, *notes, *_filled(shots), shots.stamp])


def _filled(shots: Exposure) -> list[str]:
    """How full the brightest pixel of all settings gets, where the camera says what it holds."""
    if shots.sensor is None or not math.isfinite(after := shots.saturates_after):
        return []
    full = f"  the brightest pixel is full after {time_words(after)}"
    time = shots.exposure_time
    if time is None:
        return [full]
    held = f"holds {time / after:.3g} of that" if time <= after else "is saturated"
    return [f"{full}; at {time_words(time)} it {held}"]


def _words(row: Row, dark_below: float) -> str:
    if row.kind == "dark":
        return f"{'dark':>9}" if not 0 < row.power < dark_below < math.inf else f"dark: < {_watts(dark_below).strip()}"
    if row.kind == "beside":
        x, y = (f"{1e3 * place:.3g}" for place in row.centroid)
        return f"{_watts(row.power)}  round about ({x}, {y}) mm"
    if row.lobes == 0:
        return _watts(row.power)
    return f"{_watts(row.power)}  {row.lobes} lobe{'s' * (row.lobes > 1)} at {math.degrees(row.angle):.1f}°"


def _watts(power: float) -> str:
    scale, unit = next((step for step in _STEPS if power >= step[0]), _STEPS[-1])
    return f"{power / scale:9.4g} {unit:<2}"
