"""The table of an exposure: one row a setting."""

from __future__ import annotations

import math
from typing import Any

from rich import box
from rich.table import Table

from fastaxis.report.prefix import readable

__all__ = ["exposure_table"]


def exposure_table(shots: Any) -> Table:
    """Power, its share of all light, brightest pixel, lobes and the angle of a bright lobe, for each setting."""
    table = Table(box=box.SIMPLE_HEAD, title=f"{shots.name}, {shots.target}", title_justify="left")
    table.add_column("setting", no_wrap=True)
    pictured = shots.pixel is not None
    for name in ("power", "share", *(("peak", "lobes", "bright angle") if pictured else ())):
        table.add_column(name, justify="right", no_wrap=True)
    total = shots.total_power
    for row in shots.table():
        share = f"{row.power / total:.2%}" if total > 0 else "-"
        picture = (readable(row.peak, "W/m²"), *_lobes(row)) if pictured else ()
        table.add_row(row.label, readable(row.power, "W", digits=4), share, *picture)
    return table


def _lobes(row: Any) -> tuple[str, str]:
    if row.lobes == 0:
        return "round", "-"
    return str(row.lobes), "-" if math.isnan(row.angle) else f"{math.degrees(row.angle):.1f}°"
