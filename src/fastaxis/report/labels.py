"""Names, settings and distances of a bench drawing, set where no beam runs."""

from __future__ import annotations

from matplotlib.axes import Axes

from fastaxis.report.layout import Layout, Place
from fastaxis.report.style import INK, SOFT

__all__ = ["write_distance", "write_label"]

BELOW, BESIDE, ABOVE, LEFT = (0, -1), (1, 0), (0, 1), (-1, 0)
CORNERS = {BESIDE: (0.42, 0.0, "left"), LEFT: (-0.42, 0.0, "right"), None: (0.33, -0.45, "left")}


def write_distance(axes: Axes, place: Place, distance: str) -> None:
    """A distance, above or beside the beam that crosses it."""
    if place.heading[0]:
        axes.text(place.x, place.y + 0.13, distance, size=6.5, color=INK, ha="center", va="bottom", style="italic")
    else:
        axes.text(place.x + 0.1, place.y, distance, size=6.5, color=INK, ha="left", va="center", style="italic")


def write_label(axes: Axes, plan: Layout, name: str, lines: str) -> None:
    """The name of a part and its settings, on the first side of it that no beam uses."""
    place = plan.places[name]
    side = _free_side(plan, name, place)
    if side in {BELOW, ABOVE}:
        below = 0.36 if place.heading[0] else 0.42
        base = place.y - below if side == BELOW else place.y + 0.56 + 0.115 * (lines.count("\n") + 1 if lines else 0)
        axes.text(place.x, base, name, size=7.0, weight="bold", ha="center", va="top")
        axes.text(place.x, base - 0.17, lines, size=6.0, color=SOFT, ha="center", va="top", linespacing=1.15)
        return
    x, y, align = CORNERS[side]
    axes.text(place.x + x, place.y + y + 0.02, name, size=7.0, weight="bold", ha=align, va="bottom")
    axes.text(place.x + x, place.y + y - 0.02, lines, size=6.0, color=SOFT, ha=align, va="top", linespacing=1.15)


def _free_side(plan: Layout, name: str, place: Place) -> tuple[int, int] | None:
    """The side for a label; None when beams use all four, for the lower right corner."""
    used = {way for (part, _), way in plan.exits.items() if part == name}
    used.add((-place.heading[0], -place.heading[1]))
    return next((side for side in (BELOW, BESIDE, ABOVE, LEFT) if side not in used), None)
