"""The findings of an inspection on A4 paper."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any, Protocol

from matplotlib.figure import Figure

from fastaxis.report.paper import MARGIN, Sheet, blank, line_height, number_pages, wrapped
from fastaxis.report.style import INK, LEFT, SOFT, WARN, rules

__all__ = ["draw_inspection"]

MARKS = {"high": ("#8c1c00", "HIGH"), "medium": (WARN, "MEDIUM"), "low": (LEFT, "LOW"), "note": (SOFT, "NOTE")}
SIZE, LABEL = 8.0, 0.85  # [pt], [inch] for the severity at the left


class Findings(Protocol):
    """An inspection, as the page sees it."""

    name: str
    not_checked: tuple[str, ...]

    def summary(self) -> str: ...
    def __iter__(self) -> Any: ...


def draw_inspection(inspection: Findings) -> tuple[Figure, ...]:
    """Pages with every finding, the weightiest first, and what was not checked."""
    with rules():
        sheets = [blank()]
        sheets[0].write(f"Inspection of {inspection.name}", size=13, bold=True)
        sheets[0].write(inspection.summary(), size=10, colour=SOFT)
        sheets[0].y += 0.08
        for finding in inspection:
            lines = _lines(finding, sheets[-1].width)
            if sheets[-1].room < len(lines) * line_height(SIZE) + 0.2:
                sheets.append(blank())
            _draw(sheets[-1], finding)
        _not_checked(sheets, inspection.not_checked)
        return number_pages(sheets, inspection.name)


def _texts(finding: Any) -> Iterable[tuple[str, dict[str, Any]]]:
    yield f"{finding.element}: {finding.check}", {"bold": True}
    yield f"{finding.got}; {finding.rule}.", {}
    yield f"fix: {finding.fix}", {"mono": True, "size": 7.0}


def _lines(finding: Any, width: float) -> list[str]:
    room = width - 2 * MARGIN - LABEL
    return [line for text, look in _texts(finding) for line in wrapped(text, SIZE, room, mono="mono" in look)]


def _draw(sheet: Sheet, finding: Any) -> None:
    sheet.rule()
    colour, word = MARKS[finding.severity.value]
    top = sheet.y
    sheet.write(word, size=SIZE, colour=colour, bold=True)
    sheet.y = top
    for text, look in _texts(finding):
        sheet.write(text, x=MARGIN + LABEL, colour=INK, **{"size": SIZE, **look})
    sheet.y += 0.06


def _not_checked(sheets: list[Sheet], items: tuple[str, ...]) -> None:
    if not items:
        return
    if sheets[-1].room < (len(items) + 2) * line_height(SIZE) + 0.3:
        sheets.append(blank())
    sheet = sheets[-1]
    sheet.rule()
    sheet.write("Not checked", size=SIZE, bold=True)
    for item in items:
        sheet.write(item, size=7.5, colour=SOFT)
