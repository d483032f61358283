"""The beams of a bench drawing: joints with their ports and powers, and the ends that are open."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from matplotlib.axes import Axes

from fastaxis.report.layout import Layout, Place, Stub
from fastaxis.report.prefix import readable
from fastaxis.report.style import SOFT, WARN
from fastaxis.report.walk import is_space

__all__ = ["DARK", "draw_beams"]

BEAM = "#3c8d5a"
STUB = 0.62
LANE = 0.05  # two beams on one line, there and back, keep this far from its middle
DARK = 1e-9  # of the laser's power; an ideal port that should be dark is, to roundings


def draw_beams(axes: Axes, plan: Layout, train: Any, powers: Mapping[str, float]) -> None:
    """Draw every joint that light takes and every open end; ``powers`` [W] by the port that is left."""
    pairs = {(_part(link.out_port), _part(link.in_port)) for link in plan.links}
    for link in plan.links:
        here, there = plan.places[_part(link.out_port)], plan.places[_part(link.in_port)]
        shared = (_part(link.in_port), _part(link.out_port)) in pairs
        if link.wrapped:
            _draw_wrapped(axes, here, there)
        else:
            _draw_link(axes, here, there, lane=LANE if shared else 0.0)
        if link.out_port in powers and not is_space(train.elements[_part(link.out_port)]):
            _write_power(axes, here, there, readable(powers[link.out_port], "W"), wrapped=link.wrapped, shared=shared)
    entered = {link.in_port for link in plan.links}
    for stub in plan.stubs:
        _draw_stub(axes, plan.places[_part(stub.port)], stub, powers, returns=stub.port in entered)
    for port in sorted({port for link in plan.links for port in (link.out_port, link.in_port)}):
        _write_port(axes, plan, train, port)


def _part(port: str) -> str:
    return port.partition(".")[0]


def _unit(here: Place, there: Place) -> tuple[float, float]:
    dx, dy = there.x - here.x, there.y - here.y
    length = (dx * dx + dy * dy) ** 0.5 or 1.0
    return dx / length, dy / length


def _draw_link(axes: Axes, here: Place, there: Place, *, lane: float) -> None:
    ux, uy = _unit(here, there)
    # Each beam keeps to its own right, so the two of a double pass lie side by side.
    x, y = lane * uy, -lane * ux
    axes.plot(
        [here.x + x, there.x + x], [here.y + y, there.y + y], color=BEAM, lw=1.3, zorder=1, solid_capstyle="round"
    )
    tip = 0.56
    at = (here.x + tip * (there.x - here.x) + x, here.y + tip * (there.y - here.y) + y)
    _arrow_head(axes, at, (ux, uy))


def _arrow_head(axes: Axes, at: tuple[float, float], way: tuple[float, float], colour: str = BEAM) -> None:
    start = (at[0] - 0.02 * way[0], at[1] - 0.02 * way[1])
    axes.annotate(
        "", at, start, arrowprops={"arrowstyle": "-|>", "color": colour, "lw": 0, "mutation_scale": 9}, zorder=2
    )


def _draw_wrapped(axes: Axes, here: Place, there: Place) -> None:
    end, start, between = here.x + 0.55, there.x - 0.55, (here.y + there.y) / 2 + 0.1
    xs = [here.x, end, end, start, start, there.x]
    ys = [here.y, here.y, between, between, there.y, there.y]
    axes.plot(xs, ys, color=BEAM, lw=1.0, ls=(0, (4, 2)), zorder=1)
    _arrow_head(axes, ((end + start) / 2, between), (-1.0, 0.0))
    axes.text(
        (end + start) / 2, between + 0.05, "goes on in the next row", size=5.5, color=SOFT, ha="center", va="bottom"
    )


def _write_port(axes: Axes, plan: Layout, train: Any, port: str) -> None:
    """Name a face of a part that has more than a front and a back."""
    name, _, face = port.partition(".")
    if len(train.elements[name].faces) > 2:
        _face_name(axes, plan.places[name], plan.exits[name, face], face)


def _face_name(axes: Axes, place: Place, way: tuple[int, int], face: str, colour: str = SOFT) -> None:
    if way[0]:
        axes.text(place.x + 0.3 * way[0], place.y + 0.06, face, size=5.5, color=colour, va="bottom",
                  ha="left" if way[0] > 0 else "right")  # fmt: skip
    else:
        axes.text(place.x + 0.06, place.y + 0.33 * way[1], face, size=5.5, color=colour, ha="left",
                  va="bottom" if way[1] > 0 else "top")  # fmt: skip


def _write_power(axes: Axes, here: Place, there: Place, power: str, *, wrapped: bool, shared: bool) -> None:
    if wrapped:
        axes.text(here.x + 0.6, here.y, power, size=5.8, color=BEAM, va="center")
        return
    # Of a beam there and back, each power stands on the side of its own lane.
    ux, uy = _unit(here, there)
    middle = ((here.x + there.x) / 2, (here.y + there.y) / 2)
    if abs(ux) > abs(uy):
        below = not shared or ux > 0
        axes.text(middle[0], middle[1] + (-0.09 if below else 0.19), power, size=5.8, color=BEAM, ha="center",
                  va="top" if below else "bottom")  # fmt: skip
    else:
        left = not shared or uy < 0
        axes.text(middle[0] + (-0.09 if left else 0.09), middle[1], power, size=5.8, color=BEAM,
                  ha="right" if left else "left", va="center")  # fmt: skip


def _draw_stub(axes: Axes, place: Place, stub: Stub, powers: Mapping[str, float], *, returns: bool) -> None:
    """An open end: amber where power leaves, grey where it is dark; ``returns`` if light also comes in there."""
    power, way = powers.get(stub.port), stub.heading
    dark = power is not None and power <= DARK * max(powers.values())
    colour = SOFT if dark else WARN
    x, y = place.x + (LANE * way[1] if returns else 0), place.y + (-LANE * way[0] if returns else 0)
    reach = STUB + (0.35 if returns else 0)
    end = (x + reach * way[0], y + reach * way[1])
    axes.plot([x, end[0]], [y, end[1]], color=colour, lw=1.3, ls=(0, (2, 1.5)), zorder=2)
    _arrow_head(axes, (end[0] + 0.08 * way[0], end[1] + 0.08 * way[1]), way, colour)
    amount = "" if power is None else ", dark" if dark else f"\n{readable(power, 'W')}"
    words = f"{'back out' if returns else 'open'}: {stub.port}{amount}"
    if way[0]:
        axes.text(end[0], end[1] + (0.42 if returns else 0.1), words, size=5.8, color=colour, va="bottom", ha="center")
    else:
        axes.text(end[0] + 0.09, end[1], words, size=5.8, color=colour, va="center", ha="left")
