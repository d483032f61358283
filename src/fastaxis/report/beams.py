"""The beams of a bench drawing: joints with their ports and powers, and the ends that are open."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

from matplotlib.axes import Axes

from fastaxis.report.boxes import Point
from fastaxis.report.layout import Layout
from fastaxis.report.lines import PART, Line, comes_in, returning, stub_line
from fastaxis.report.prefix import readable
from fastaxis.report.style import SOFT, WARN
from fastaxis.report.walk import is_space
from fastaxis.report.writing import Sheet, Words

__all__ = ["BEAM", "DARK", "draw_lines", "draw_stubs", "is_dark", "write_ports", "write_powers", "write_stubs"]

BEAM = "#3c8d5a"
DARK = 1e-9  # of the laser's power; an ideal port that should be dark is, to roundings
SMALL = 5.8  # [pt]
ARROWS = {(1, 0): "→", (-1, 0): "←", (0, 1): "↑", (0, -1): "↓"}

Powers = Mapping[str, float]


def is_dark(powers: Powers, port: str) -> bool:
    """Whether a port is known to carry no light beyond roundings."""
    return port in powers and powers[port] <= DARK * max(powers.values())


def draw_lines(axes: Axes, lines: Sequence[Line], train: Any, powers: Powers) -> None:
    """Draw every beam with its arrows: both ways on one line where light runs both ways."""
    for line in lines:
        ports = [link.out_port for link in (line.there, line.back) if link]
        colour = SOFT if all(is_dark(powers, port) for port in ports) else BEAM
        xs, ys = zip(*line.points, strict=True)
        style: Any = (0, (4, 2)) if line.there.wrapped else (0, (1, 1.2)) if colour == SOFT else "-"
        axes.plot(xs, ys, color=colour, lw=1.3, ls=style, zorder=1, solid_capstyle="round", solid_joinstyle="round")
        start, end = line.longest
        for link, ends in ((line.there, (start, end)), (line.back, (end, start))):
            # Through empty space one arrow is enough, where the light arrives.
            if link and (line.bent or not is_space(train.elements[_part(link.in_port)])):
                part = 0.56 if line.back is None else 0.7
                _arrow_head(axes, *ends, part, SOFT if is_dark(powers, link.out_port) else BEAM)


def _part(port: str) -> str:
    return port.partition(".")[0]


def _arrow_head(axes: Axes, start: Point, end: Point, part: float, colour: str) -> None:
    dx, dy = end[0] - start[0], end[1] - start[1]
    length = (dx * dx + dy * dy) ** 0.5 or 1.0
    at = (start[0] + part * dx, start[1] + part * dy)
    before = (at[0] - 0.02 * dx / length, at[1] - 0.02 * dy / length)
    axes.annotate(
        "", at, before, arrowprops={"arrowstyle": "-|>", "color": colour, "lw": 0, "mutation_scale": 9}, zorder=2
    )


def draw_stubs(axes: Axes, plan: Layout, powers: Powers) -> None:
    """Draw every open end: amber where power leaves, grey where it is dark."""
    for stub in plan.stubs:
        colour = SOFT if is_dark(powers, stub.port) else WARN
        start, end = stub_line(plan, stub)
        axes.plot(*zip(start, end, strict=True), color=colour, lw=1.3, ls=(0, (2, 1.5)), zorder=2)
        tip = (end[0] + 0.08 * stub.heading[0], end[1] + 0.08 * stub.heading[1])
        _arrow_head(axes, end, tip, 1.0, colour)


def write_stubs(sheet: Sheet, plan: Layout, powers: Powers) -> None:
    """Name every open port, with its power where that is known."""
    for stub in plan.stubs:
        dark, known = is_dark(powers, stub.port), stub.port in powers
        amount = ", dark" if dark else f"\n{readable(powers[stub.port], 'W')}" if known else ""
        text = f"{'back out' if comes_in(plan, stub) else 'open'}: {stub.port}{amount}"
        words = Words(text, SMALL, SOFT if dark else WARN)
        start, end = stub_line(plan, stub)
        if comes_in(plan, stub):
            sheet.at_line(words, start, end, (0.8, 0.6, 1.0))
        else:
            sheet.ahead(words, end, stub.heading)


def write_ports(sheet: Sheet, plan: Layout, lines: Sequence[Line], train: Any) -> None:
    """Name the faces of each part that has more than a front and a back, where light takes them."""
    back = returning(plan, lines)
    for port in sorted({port for link in plan.links for port in (link.out_port, link.in_port)}):
        name, _, face = port.partition(".")
        if len(train.elements[name].faces) > 2:
            place, words = plan.places[name], Words(face, 5.5)
            wx, wy = back.get(port) or plan.exits[name, face]
            room = words.extent[0 if wx else 1] + 0.04
            start = (place.x + wx * PART / 2, place.y + wy * PART / 2)
            sheet.at_line(words, start, (start[0] + wx * room, start[1] + wy * room), (0.5, 0.8, 1.1))


def write_powers(sheet: Sheet, lines: Sequence[Line], train: Any, powers: Powers) -> None:
    """Write the power at each beam, once between two parts; with an arrow each where light runs both ways."""
    for line in lines:
        start, end = line.longest
        told = [
            (link.out_port, _arrow(*ends))
            for link, ends in ((line.there, (start, end)), (line.back, (end, start)))
            if link and link.out_port in powers and not is_space(train.elements[_part(link.out_port)])
        ]
        both = line.back is not None
        texts = [f"{arrow} {_amount(powers, port)}" if both else _amount(powers, port) for port, arrow in told]
        colour = SOFT if all(is_dark(powers, port) for port, _ in told) else BEAM
        if texts:
            sheet.at_line(Words("\n".join(texts), SMALL, colour), start, end, (0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8))


def _amount(powers: Powers, port: str) -> str:
    return "dark" if is_dark(powers, port) else readable(powers[port], "W")


def _arrow(start: Point, end: Point) -> str:
    dx, dy = end[0] - start[0], end[1] - start[1]
    way = (int(dx > 0) - int(dx < 0), 0) if abs(dx) > abs(dy) else (0, int(dy > 0) - int(dy < 0))
    return ARROWS[way]
