"""The table of an exposure: one row a setting."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Iterator
from typing import Any

from rich import box
from rich.table import Table

from fastaxis.camera.mounting import Mounting
from fastaxis.report.prefix import readable

__all__ = ["exposure_table", "remarks", "rows_of"]

MANY = 12  # lines about single settings
MISSED = 1e-4  # of the light at the sensor: what a digit shown would hide


def rows_of(shots: Any, each: Callable[[], object] = lambda: None) -> list[Any]:
    """The rows of the table; ``each`` is called after each: counting lobes takes its time."""
    rows = []
    for k in range(len(shots)):
        rows.append(shots.row(k))
        each()
    return rows


def exposure_table(shots: Any, rows: Iterable[Any]) -> Table:
    """Power, its share, brightest pixel, and lobes, rings or place of the picture, for each setting.

    Parameters
    ----------
    shots : the exposure.
    rows : its rows, from :func:`rows_of`.
    """
    table = Table(box=box.SIMPLE_HEAD, title=f"{shots.name}, {shots.target}", title_justify="left")
    table.add_column("setting")  # long names give way, numbers don't
    pictured = shots.pixel is not None
    for name in ("power", "share", *(("peak", "picture", "bright angle") if pictured else ())):
        table.add_column(name, justify="right", no_wrap=True)
    for row in rows:
        picture = (_peak(row), _picture(row), _angle(row)) if pictured else ()
        table.add_row(row.label, _power(row, shots), _share(row, shots), *picture)
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
        return f"ring, r = {_metres(row.ring)}" if row.ring > 0 else "round"
    return {"beside": "round, off axis", "other": "uneven"}.get(row.kind, row.kind or "-")


def _place(row: Any) -> str:
    """Where a picture is that has no lobes about the axis, or where its dark ring is; "" for others."""
    if row.kind in ("beside", "other"):
        x, y = (f"{round(place * 1e3, 3) + 0.0:.3f}" for place in row.centroid)
        return f"{row.label}: centre of gravity at ({x}, {y}) mm"
    return "" if math.isnan(row.dark_ring) else f"{row.label}: first dark ring at r = {_metres(row.dark_ring)}"


def _metres(radius: float) -> str:
    return f"{radius * 1e6:.1f} µm" if radius < 1e-3 else f"{radius * 1e3:.3f} mm"


def _angle(row: Any) -> str:
    return "-" if math.isnan(row.angle) else f"{math.degrees(row.angle):.1f}°"


def remarks(shots: Any, rows: Iterable[Any]) -> Iterator[str]:
    """What the table leaves unsaid: what shares are of, what misses the sensor, how the camera is mounted."""
    yield "share: of the light on the sensor, no analyzer in front of it"
    if shots.pixel is None:
        return
    places = [place for row in rows if (place := _place(row))]
    yield from places[:MANY]
    if len(places) > MANY:
        yield f"... and {len(places) - MANY} more"
    on, at = shots.total_power, shots.arrived
    if at and on < (1 - MISSED) * at:
        told = f"on the sensor {readable(on, 'W', digits=4)} of {readable(at, 'W', digits=4)}"
        yield f"{told}; {(at - on) / at:.2%} falls beside it"
    if words := Mounting(shots.orientation).words:
        yield f"picture {words}; states, angles and places are named in the beam's own frame"
