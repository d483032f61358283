"""Sheets of A4 paper: where text may stand, and writing several of them to one file."""

from __future__ import annotations

import re
import textwrap
from collections.abc import Sequence
from functools import partial
from pathlib import Path
from typing import IO, Any

from matplotlib.axes import Axes
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.backends.backend_pdf import PdfPages
from matplotlib.figure import Figure

from fastaxis.conventions import stamp
from fastaxis.files import write_whole
from fastaxis.report.letters import FAMILIES
from fastaxis.report.style import FOOT_SIZE, HELD, INK, PAPER, SOFT, rules

__all__ = ["A4", "MARGIN", "Sheet", "blank", "number_pages", "save_pages"]

A4 = (8.27, 11.69)  # [inch], upright
MARGIN = 0.6  # [inch]; printers leave out the outermost quarter inch
NUMBER_AND_UNIT = re.compile(r"(?<=\d) (?=%|(?:[kmµunp]?[mW]|[mun]?s|deg)\b)")


class Sheet:
    """One page that is written from the top down, in inches.

    Parameters
    ----------
    figure : the page.
    """

    def __init__(self, figure: Figure, width: float, height: float) -> None:
        self.figure, self.width, self.height = figure, width, height
        self.axes: Axes = figure.add_axes((0, 0, 1, 1), xlim=(0, width), ylim=(height, 0))
        self.axes.set_axis_off()
        self.y = MARGIN

    @property
    def room(self) -> float:
        """Height left above the foot [inch]."""
        return self.height - MARGIN - 0.25 - self.y

    def write(
        self, text: str, *, size: float = 8.0, x: float = MARGIN, width: float | None = None, colour: str = INK,
        bold: bool = False, mono: bool = False,
    ) -> None:  # fmt: skip
        """Write wrapped lines at x and move on below them."""
        for line in wrapped(text, size, (self.width - MARGIN - x) if width is None else width, mono=mono):
            self.axes.text(
                x, self.y, line, size=size, color=colour, va="top", weight="bold" if bold else "normal",
                family="DejaVu Sans Mono" if mono else FAMILIES,
            )  # fmt: skip
            self.y += line_height(size)

    def rule(self, colour: str = SOFT) -> None:
        """A thin line across the page."""
        self.axes.plot([MARGIN, self.width - MARGIN], [self.y, self.y], color=colour, lw=0.5)
        self.y += 0.06


def line_height(size: float) -> float:
    """[inch]"""
    return 1.35 * size / 72


def wrapped(text: str, size: float, width: float, *, mono: bool = False) -> list[str]:
    """Lines of a text that fit a width [inch]; none ends between a number and its unit."""
    # A fixed-pitch glyph is 0.602 em wide, but on whole dots of a screen up to 0.7; running text needs 0.54 em.
    room = max(8, int(width * 72 / ((0.7 if mono else 0.54) * size)))
    held = NUMBER_AND_UNIT.sub(HELD, text)
    return [line.replace(HELD, " ") for line in textwrap.wrap(held, room)] or [""]


def blank(*, landscape: bool = False) -> Sheet:
    """An empty page."""
    width, height = reversed(A4) if landscape else A4
    figure = Figure(figsize=(width, height), facecolor=PAPER)
    FigureCanvasAgg(figure)
    return Sheet(figure, width, height)


def number_pages(sheets: Sequence[Sheet], title: str) -> tuple[Figure, ...]:
    """Feet with the sign stamp, the title and "page 1 of 3"."""
    for number, sheet in enumerate(sheets, start=1):
        foot: dict[str, Any] = {"size": FOOT_SIZE, "color": SOFT, "va": "top"}
        y = sheet.height - MARGIN + 0.08
        sheet.axes.text(MARGIN, y, stamp(), **foot)
        sheet.axes.text(MARGIN, y + line_height(FOOT_SIZE), f"{title}, page {number} of {len(sheets)}", **foot)
    return tuple(sheet.figure for sheet in sheets)


def save_pages(figures: Sequence[Figure], path: Path) -> tuple[Path, ...]:
    """Write pages as one PDF, or as a PNG each ("sheet-1.png", "sheet-2.png")."""
    if path.suffix == ".pdf":
        return (write_whole(path, partial(_write_pdf, figures)),)
    return tuple(
        write_whole(path.with_name(f"{path.stem}-{number}.png"), partial(_write_png, figure))
        for number, figure in enumerate(figures, start=1)
    )


def _write_pdf(figures: Sequence[Figure], file: IO[bytes]) -> None:
    # Without a date the same bench writes the same bytes.
    metadata = {"Creator": "fastaxis", "Subject": stamp(), "CreationDate": None}
    with rules(), PdfPages(file, metadata=metadata) as pdf:
        for figure in figures:
            pdf.savefig(figure)


def _write_png(figure: Figure, file: IO[bytes]) -> None:
    with rules():
        figure.savefig(file, format="png", dpi=110, metadata={"Software": "fastaxis", "Description": stamp()})
