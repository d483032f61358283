"""The table of an exposure: one row a setting."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from typing import Any

from rich import box
from rich.table import Table

from fastaxis.camera.mounting import Mounting
from fastaxis.report.prefix import readable

__all__ = ["exposure_table", "remarks"]

MISSED = 1e-4  # of the light at the sensor: what a digit shown would hide


def exposure_table(shots: Any, *, each: Callable[[], object] = lambda: None) -> Table:
    """Power, its share, brightest pixel, and lobes, rings or place of the picture, for each setting.

    Parameters
    ----------
    shots : the exposure.
    each : called after each row; counting lobes takes its time.
    """
    table = Table(box=box.SIMPLE_HEAD, title=f"{shots.name}, {shots.target}", title_justify="left")
    table.add_column("setting", no_wrap=True)
    pictured = shots.pixel is not None
    for name in ("power", "share", *(("peak", "picture", "bright angle") if pictured else ())):
        table.add_column(name, justify="right", no_wrap=True)
    for k in range(len(shots)):
        row = shots.row(k)
        picture = (_peak(row), _picture(row), _angle(row)) if pictured else ()
        table.add_row(row.label, _power(row, shots), _share(row, shots), *picture)
        each()
    return table


def _power(row: Any, shots: Any) -> str:
    if row.kind != "dark" or row.power == 0:
        return readable(row.power, "W", digits=4)
    # What is there are roundings: their sum is no power.
    return "0 W" if math.isinf(shots.dark_below) else f"< {readable(shots.dark_below, 'W', digits=1)}"


def _share(row: Any, shots: Any) -> str:
    total = shots.total_power
    return f"{row.power / total:.2%}" if total > 0 and not math.isinf(shots.dark_below) else "-"


def _peak(row: Any) -> str:
    return "-" if row.kind == "dark" else readable(row.peak, "W/m²")


def _picture(row: Any) -> str:
    if row.kind == "lobes":
        return f"{row.lobes} lobe{'s' * (row.lobes > 1)}"
    if row.kind == "round":
        bright = f"ring, r = {_metres(row.ring)}" if row.ring > 0 else "round"
        return bright if math.isnan(row.dark_ring) else f"{bright}, dark at {_metres(row.dark_ring)}"
    if row.kind in ("beside", "other"):
        x, y = (f"{place * 1e3:.3f}" for place in row.centroid)
        return f"{'round' if row.kind == 'beside' else 'uneven'} about ({x}, {y}) mm"
    return row.kind or "-"


def _metres(radius: float) -> str:
    return f"{radius * 1e6:.1f} µm" if radius < 1e-3 else f"{radius * 1e3:.3f} mm"


def _angle(row: Any) -> str:
    return "-" if math.isnan(row.angle) else f"{math.degrees(row.angle):.1f}°"


def remarks(shots: Any) -> Iterator[str]:
    """What the table leaves unsaid: what shares are of, what misses the sensor, how the camera is mounted."""
    yield "share: of the light on the sensor, no analyzer in front of it"
    if shots.pixel is None:
        return
    on, at = shots.total_power, shots.arrived
    if at and on < (1 - MISSED) * at:
        told = f"on the sensor {readable(on, 'W', digits=4)} of {readable(at, 'W', digits=4)}"
        yield f"{told}; {(at - on) / at:.2%} falls beside it"
    if words := Mounting(shots.orientation).words:
        yield f"picture {words}; states, angles and places are named in the beam's own frame"
