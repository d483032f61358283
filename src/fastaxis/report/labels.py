"""Names, settings and distances of a bench drawing, set where nothing else is."""

from __future__ import annotations

from typing import Any

from fastaxis.conventions import View
from fastaxis.report.boxes import Box
from fastaxis.report.details import detail, in_lab_units
from fastaxis.report.layout import Layout, Place
from fastaxis.report.paths_text import reflections_in_words
from fastaxis.report.style import INK
from fastaxis.report.walk import is_space
from fastaxis.report.writing import Sheet, Words

__all__ = ["words_of", "write_labels"]


def words_of(train: Any, name: str, view: View, *, lit: bool = True) -> Words:
    """What is written at a part: its name and settings, or the length of an empty space."""
    element = train.elements[name]
    if is_space(element):
        return Words(in_lab_units(element.distance), 6.5, INK, style="italic")
    lines = detail(element, view=view)
    if not lit:
        lines = f"{lines}\nno light"
    elif element.exit is None and element.entry and type(element).__name__ != "BeamDump":
        # On lines of their own: a neighbour may stand close by.
        lines = f"{lines}\n{reflections_in_words(train, name)}".replace(": ", "\n").replace("; ", "\n")
    return Words(lines.strip(), name=name)


def write_labels(sheet: Sheet, plan: Layout, words: dict[str, Words], boxes: dict[str, Box]) -> None:
    """Write the name of each part on the first free side, below if possible, and each distance beside its beam."""
    for name, text in words.items():
        place = plan.places[name]
        if name in boxes:
            sheet.at_part(text, boxes[name], prefer=((0, -1),) if place.heading[0] else ((1, 0), (-1, 0)))
        else:
            start, end = _stretch(place)
            sheet.at_line(text, start, end, (0.5, 0.2, 0.8))


def _stretch(place: Place) -> tuple[tuple[float, float], tuple[float, float]]:
    dx, dy = 0.35 * place.heading[0], 0.35 * place.heading[1]
    # From left to right and upwards, whichever way the light runs.
    return (place.x - abs(dx), place.y - abs(dy)), (place.x + abs(dx), place.y + abs(dy))
