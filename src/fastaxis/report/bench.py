"""The bench drawing: every part, fold, distance and port, and where power leaves."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from matplotlib.axes import Axes
from matplotlib.figure import Figure

from fastaxis.conventions import View
from fastaxis.errors import FastaxisError
from fastaxis.report.beams import DARK, draw_beams
from fastaxis.report.details import detail, in_lab_units
from fastaxis.report.labels import write_distance, write_label
from fastaxis.report.layout import Layout, arrange
from fastaxis.report.style import footer, new_figure, styled
from fastaxis.report.symbols import draw_symbol
from fastaxis.report.walk import is_space

__all__ = ["SAFETY", "draw_bench", "reflections_in_words"]

UNIT = 0.86  # [inch] a step of the drawing
LEAST_WIDTH = 7.2  # [inch]
SAFETY = (
    "Laser power leaves the bench here: block it, keep beams below eye level and enclosed, wear the eyewear "
    "prescribed. Your local rules and your laser safety officer have the last word."
)


@styled
def draw_bench(
    train: Any, *, powers: Mapping[str, float] | None = None, title: str | None = None, view: View = View.RECEIVER
) -> Figure:
    """A schematic of the train, not to scale: light starts at the left and every fold is kept.

    Parameters
    ----------
    train : the train; letters stay letters.
    powers : power [W] that leaves each port, by port string; written beside the beam where given.
    title : above all; None for the train's name.
    view : whose naming of R and L the laser's state and the stamp follow.
    """
    plan, powers = arrange(train), powers or {}
    left, right, bottom, top = plan.bounds
    up = any(stub.heading == (0, 1) for stub in plan.stubs)
    left, right, bottom, top = left - 0.9, right + 1.0, bottom - 1.05, top + (1.05 if up else 0.75)
    missing = max(LEAST_WIDTH / UNIT - (right - left), 0) / 2
    figure = new_figure((right - left + 2 * missing) * UNIT, (top - bottom) * UNIT + 0.65)
    axes = figure.subplots()
    axes.set(xlim=(left - missing, right + missing), ylim=(bottom, top), aspect="equal")
    axes.set_axis_off()
    draw_beams(axes, plan, train, powers)
    for name in train.elements:
        _draw_part(axes, train, plan, name, view)
    figure.suptitle(train.name if title is None else title, size=10)
    footer(figure, view, note=f"Not to scale. {SAFETY if _leaving(plan, powers) else ''}".strip())
    return figure


def _leaving(plan: Layout, powers: Mapping[str, float]) -> bool:
    """Whether power leaves by an open port; one whose power is not known counts."""
    least = DARK * max(powers.values(), default=0.0)
    return any(powers.get(stub.port, 1.0) > least for stub in plan.stubs)


def reflections_in_words(train: Any, target: str) -> str:
    """How often the light was reflected on the way, and whether the picture arrives mirrored."""
    try:
        count = train.reflections(target)
    except FastaxisError:
        return "light by several paths"
    times = "no reflection" if count == 0 else f"{count} reflection{'s' if count > 1 else ''}"
    return f"{times}: {'mirrored' if count % 2 else 'upright'}"


def _draw_part(axes: Axes, train: Any, plan: Layout, name: str, view: View) -> None:
    element, place = train.elements[name], plan.places[name]
    if is_space(element):
        write_distance(axes, place, in_lab_units(element.distance))
        return
    draw_symbol(axes, element, place)
    lines = detail(element, view=view)
    if name in plan.unlit:
        lines = f"{lines}\nno light".strip()
    elif element.exit is None and element.entry and type(element).__name__ != "BeamDump":
        # On two lines: a neighbour may stand close by.
        lines = f"{lines}\n{reflections_in_words(train, name)}".strip().replace(": ", "\n")
    write_label(axes, plan, name, lines)
