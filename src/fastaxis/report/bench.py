"""The bench drawing: every part, fold, distance and port, and where power leaves."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

from matplotlib.axes import Axes
from matplotlib.figure import Figure

from fastaxis.conventions import View
from fastaxis.report.beams import draw_lines, draw_stubs, is_dark, write_ports, write_powers, write_stubs
from fastaxis.report.boxes import Box, covering, line_boxes
from fastaxis.report.labels import words_of, write_labels
from fastaxis.report.layout import Layout, arrange
from fastaxis.report.lines import Line, lines_of, part_boxes, stub_line
from fastaxis.report.paths_text import reflections_in_words
from fastaxis.report.style import foot_height, footer, new_figure, styled
from fastaxis.report.symbols import draw_symbol
from fastaxis.report.walk import is_space
from fastaxis.report.writing import UNIT, Sheet, Words, measured

__all__ = ["SAFETY", "draw_bench", "reflections_in_words"]

LEAST_WIDTH = 7.2  # [inch]
HEAD = 0.32  # [inch] for the title
POWER = 1.25  # [steps] a part and a power beside it
MARGIN = 0.12  # [steps]
TITLE = 10.0  # [pt]
SAFETY = (
    "Laser power leaves the bench here: block it, keep beams below eye level and enclosed, wear the eyewear "
    "prescribed. Your local rules and your laser safety officer have the last word."
)
BENT = "Lines with corners between two parts are bent for the drawing only; there the light runs straight."


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
    powers = powers or {}
    plan = arrange(train, _room(train, view, powered=bool(powers)))
    words = {name: words_of(train, name, view, lit=name not in plan.unlit) for name in plan.places}
    lines = lines_of(plan, train)
    sheet = _written(train, plan, lines, words, powers)
    title = train.name if title is None else title
    note = _note(train, plan, lines, powers)
    figure, axes = _page(covering(sheet.solid), title, view, note)
    draw_lines(axes, lines, train, powers)
    draw_stubs(axes, plan, powers)
    for name in (name for name, element in train.elements.items() if not is_space(element)):
        draw_symbol(axes, train.elements[name], plan.places[name])
    sheet.draw(axes)
    return figure


def _room(train: Any, view: View, *, powered: bool) -> dict[str, tuple[float, float]]:
    """What each part needs on paper: its label, and beside it the power of one beam."""
    room = {name: words_of(train, name, view).extent for name in train.elements}
    if not powered:
        return room
    return {name: (w if is_space(train.elements[name]) else max(w, POWER), h) for name, (w, h) in room.items()}


def _written(
    train: Any, plan: Layout, lines: Sequence[Line], words: dict[str, Words], powers: Mapping[str, float]
) -> Sheet:
    """All texts in their places; those that must stand close to what they tell of come first."""
    boxes = part_boxes(plan, train)
    sheet = Sheet([*boxes.values(), *(box for line in lines for box in line.boxes)])
    sheet.solid += [box for stub in plan.stubs for box in line_boxes(stub_line(plan, stub), 0.16)]
    write_ports(sheet, plan, lines, train)
    write_stubs(sheet, plan, powers)
    write_labels(sheet, plan, words, boxes)
    write_powers(sheet, lines, train, powers)
    for line in (line for line in lines if line.there.wrapped):
        sheet.at_line(Words("goes on in the next row", 5.5), *line.longest, (0.5, 0.3, 0.7))
    return sheet


def _page(cover: Box, title: str, view: View, note: str) -> tuple[Figure, Axes]:
    """A figure on which a step of the drawing is UNIT inches, with room for the title and the foot."""
    wide = max(
        (cover.right - cover.left + 2 * MARGIN) * UNIT, LEAST_WIDTH, (measured("", TITLE, title)[0] + 0.3) * UNIT
    )
    high, foot = (cover.top - cover.bottom + 2 * MARGIN) * UNIT, foot_height(wide, view, note=note)
    figure = new_figure(wide, high + HEAD + foot)
    figure.set_layout_engine(None)
    whole = high + HEAD + foot
    axes = figure.add_axes((0.0, foot / whole, 1.0, high / whole))
    x, y = cover.middle
    axes.set(xlim=(x - wide / UNIT / 2, x + wide / UNIT / 2), ylim=(y - high / UNIT / 2, y + high / UNIT / 2))
    axes.set_autoscale_on(False)
    axes.set_axis_off()
    figure.suptitle(title, size=TITLE, y=1 - 0.06 / whole, va="top")
    footer(figure, view, note=note)
    return figure, axes


def _note(train: Any, plan: Layout, lines: Sequence[Line], powers: Mapping[str, float]) -> str:
    """The foot: what the drawing does not show, and the caution where power leaves by an open port."""
    scale = "Not to scale."
    if any(is_space(element) for element in train.elements.values()):
        scale = "Not to scale: longer distances are drawn longer, in no fixed proportion."
    bent = BENT if any(line.bent for line in lines) else ""
    # A port whose power is not known counts as one that power leaves by.
    leaving = any(not is_dark(powers, stub.port) for stub in plan.stubs)
    return " ".join(text for text in (scale, bent, SAFETY if leaving else "") if text)
