"""The set sheet on A4 paper: the table to dial from, cautions, and the frames to expect."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from matplotlib.figure import Figure

from fastaxis.inspect.set_sheet import HEADINGS
from fastaxis.report.paper import MARGIN, Sheet, blank, line_height, number_pages, wrapped
from fastaxis.report.prefix import prefixed
from fastaxis.report.shots import bright_crop
from fastaxis.report.style import INK, PAPER, SOFT, light_map, rules

__all__ = ["draw_set_sheet"]

SIZE = 8.0
TICK = 0.28  # [inch], a box to tick when the part is set
SHARES = (0.95, 1.5, 0.8, 0.7, 0.6, 0.95, 0.55, 0.6, 0.55, 0.7, 1.5, 0.65)
"""Widths of the columns among each other, in the order of the sheet's headings."""
ROOM = 0.08  # [inch] between rows
THUMB, GAP, PER_ROW = 1.58, 0.14, 6


def draw_set_sheet(sheet: Any) -> tuple[Figure, ...]:
    """Pages: the rows with a box to tick each, remarks, then the frames of each camera on one scale.

    Parameters
    ----------
    sheet : what ``train.set_sheet()`` returned.
    """
    with rules():
        pages = [_titled(sheet)]
        columns = _columns(sheet, pages[0].width)
        _head(pages[0], columns)
        for row in sheet.rows:
            if pages[-1].room < 3 * line_height(SIZE) + ROOM:
                pages.append(blank(landscape=True))
                _head(pages[-1], columns)
            _row(pages[-1], row, columns)
        _remarks(pages, sheet.remarks)
        for camera, shots in sheet.shots.items():
            _thumbnails(pages, camera, shots)
        return number_pages(pages, f"Set sheet of {sheet.name}")


def _titled(sheet: Any) -> Sheet:
    page = blank(landscape=True)
    page.write(f"Set sheet: {sheet.name}", size=13, bold=True)
    page.write(
        f"{sheet.wavelength * 1e9:.6g} nm. Angles count counter-clockwise facing the source; positions along the beam. "
        "Date ____________   Set by ____________",
        size=8.5, colour=SOFT,
    )  # fmt: skip
    page.y += 0.08
    return page


Columns = list[tuple[int, str, float, float]]  # which cell, its heading, x, width


def _columns(sheet: Any, width: float) -> Columns:
    """The columns that say something, spread over the page."""
    cells = [row.cells() for row in sheet.rows]
    used = [k for k in range(len(HEADINGS)) if any(row[k] for row in cells)]
    unit = (width - 2 * MARGIN - TICK) / sum(SHARES[k] for k in used)
    columns, x = [], MARGIN + TICK
    for k in used:
        columns.append((k, HEADINGS[k], x, SHARES[k] * unit))
        x += SHARES[k] * unit
    return columns


def _head(page: Sheet, columns: Columns) -> None:
    _line(page, [(heading, x, width, True) for _, heading, x, width in columns])
    page.rule(INK)


def _line(page: Sheet, cells: Sequence[tuple[str, float, float, bool]]) -> None:
    """Cells (text, x, width, bold) side by side, two lines each at most; moves on below the longest."""
    top, most = page.y, 1
    for text, x, width, bold in cells:
        # Bold glyphs are a tenth wider.
        lines = wrapped(text, SIZE, (width - 0.06) / (1.1 if bold else 1.0))[:2]
        for number, line in enumerate(lines):
            y = top + number * line_height(SIZE)
            page.axes.text(x, y, line, size=SIZE, va="top", color=INK, weight="bold" if bold else "normal")
        most = max(most, len(lines))
    page.y = top + most * line_height(SIZE) + ROOM / 2


def _row(page: Sheet, row: Any, columns: Columns) -> None:
    page.y += ROOM / 2
    if row.branch:
        page.write(f"from {row.origin}", size=7.5, colour=SOFT)
    if not row.listed:
        _tick_box(page)
    cells = row.cells()
    _line(page, [(cells[k], x, width, heading == "dial") for k, heading, x, width in columns])
    page.rule("#d5d8dc")
    page.y -= 0.06


def _tick_box(page: Sheet) -> None:
    x, y, side = MARGIN, page.y - 0.01, 0.14
    page.axes.plot([x, x + side, x + side, x, x], [y, y, y + side, y + side, y], color=INK, lw=0.7)


def _remarks(pages: list[Sheet], remarks: Sequence[str]) -> None:
    pages[-1].y += 0.08
    for remark in remarks:
        lines = wrapped(remark, 7.5, pages[-1].width - 2 * MARGIN)
        if pages[-1].room < len(lines) * line_height(7.5):
            pages.append(blank(landscape=True))
        pages[-1].write(remark, size=7.5)


def _thumbnails(pages: list[Sheet], camera: str, shots: Any) -> None:
    """The frames of one camera, on one scale of colour, cut to where the light is."""
    peak = max(float(shots.frame(k).max()) for k in range(len(shots)))
    factor, unit = prefixed(peak, "W")
    crop = bright_crop(shots)
    left, right, bottom, top = crop.extent
    title = (
        f"Frames of {camera}: {right - left:.3g} mm x {top - bottom:.3g} mm shown, one scale, "
        f"white is {peak * factor:.3g} {unit} a pixel"
    )
    for start in range(0, len(shots), PER_ROW):
        if pages[-1].room < THUMB + 0.75:
            pages.append(blank(landscape=True))
        page = pages[-1]
        page.y += 0.1
        page.write(title if start == 0 else f"{camera}, continued", size=9, bold=True)
        for place, k in enumerate(range(start, min(start + PER_ROW, len(shots)))):
            frame = shots.frame(k)
            factor, unit = prefixed(float(frame.sum()), "W")
            label = shots.labels[k] if len(shots.labels[k]) <= 18 else f"{shots.labels[k][:17]}…"
            _thumbnail(page, place, crop.of(frame), peak, f"{label}: {frame.sum() * factor:.3g} {unit}")
        page.y += THUMB + 0.3


def _thumbnail(page: Sheet, place: int, picture: Any, peak: float, label: str) -> None:
    x = MARGIN + place * (THUMB + GAP)
    axes = page.figure.add_axes(
        (x / page.width, 1 - (page.y + THUMB) / page.height, THUMB / page.width, THUMB / page.height)
    )
    axes.imshow(picture, origin="lower", vmin=0, vmax=peak or 1.0, cmap=light_map())
    axes.set(xticks=[], yticks=[], facecolor=PAPER)
    page.axes.text(x, page.y + THUMB + 0.04, label, size=7.5, va="top", color=INK)
