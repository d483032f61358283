"""Texts of a drawing: each gets the nearest place where it lies on nothing."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from functools import lru_cache
from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.figure import Figure

from fastaxis.report.boxes import Box, Point, clear_of
from fastaxis.report.style import INK, SOFT, new_figure

__all__ = ["UNIT", "Sheet", "Words", "measured"]

UNIT = 0.86  # [inch] a step of the drawing
GAP = 0.045  # [steps] between a text and what is beside it
LEADER = 0.3  # a text farther from its place than this gets a line that leads there
REACHES = (0.0, 0.08, 0.18, 0.32, 0.5, 0.75, 1.0, 1.4, 1.8, 2.4, 3.0, 4.0, 5.5, 7.5, 10.0, 15.0, 25.0, 40.0)
AROUND = tuple((math.cos(t * math.pi / 12), math.sin(t * math.pi / 12)) for t in range(24))
SIDES = ((0, -1), (1, 0), (0, 1), (-1, 0), (1, -1), (1, 1), (-1, -1), (-1, 1))


@dataclass(frozen=True)
class Words:
    """Lines of text, the first in bold if it is a name.

    Parameters
    ----------
    text : what is written; lines parted by newlines.
    size : [pt].
    colour : of the letters.
    name : a first line in bold, "" for none.
    style : "normal" or "italic".
    """

    text: str
    size: float = 6.0
    colour: str = SOFT
    name: str = ""
    style: str = "normal"

    @property
    def extent(self) -> tuple[float, float]:
        """(width, height) in steps."""
        return measured(self.text, self.size, self.name, self.style)


@lru_cache(maxsize=1)
def _scratch() -> Figure:
    return new_figure(1, 1)


@lru_cache(maxsize=4096)
def _one(text: str, size: float, weight: str, style: str) -> tuple[float, float]:
    if not text:
        return 0.0, 0.0
    figure = _scratch()
    written = figure.text(0, 0, text, size=size, weight=weight, style=style, linespacing=1.15)
    box = written.get_window_extent()
    written.remove()
    # Hinting moves letters by up to a pixel, at whatever resolution the drawing is saved.
    return (box.width + 1.5) / figure.dpi / UNIT, (box.height + 1.0) / figure.dpi / UNIT


def measured(text: str, size: float, name: str = "", style: str = "normal") -> tuple[float, float]:
    """(width, height) in steps of lines of text below a name."""
    width, height = _one(text, size, "normal", style)
    wide, high = _one(name, size + 1, "bold", "normal")
    return max(width, wide), height + high


@dataclass
class Sheet:
    """What is on the drawing already, and the texts that found a place.

    Parameters
    ----------
    solid : boxes no text may touch: parts, beams, texts.
    """

    solid: list[Box] = field(default_factory=list)
    written: list[tuple[Words, Box, Point | None]] = field(default_factory=list)

    def at_part(self, words: Words, around: Box, prefer: Sequence[Point] = ()) -> None:
        """Write on the first free side of a box."""
        sides = [*prefer, *SIDES]
        self._write(words, around.middle, _beside(words, around, sides))

    def at_line(self, words: Words, start: Point, end: Point, parts: Sequence[float]) -> None:
        """Write beside a line, at one of these parts of its length."""
        points = [(start[0] + t * (end[0] - start[0]), start[1] + t * (end[1] - start[1])) for t in parts]
        level = abs(end[0] - start[0]) > abs(end[1] - start[1])
        sides = ((0, 1), (0, -1)) if level else ((1, 0), (-1, 0))
        near = [box for point in points for box in _beside(words, _dot(point), sides)]
        for reach in REACHES[1:4]:
            near += [box for point in points for box in _beside(words, _dot(point, reach), sides)]
        self._write(words, points[0], near)

    def ahead(self, words: Words, tip: Point, way: tuple[int, int]) -> None:
        """Write beyond the tip of an arrow, or beside it."""
        around = Box.about(tip[0], tip[1], 0.22, 0.22)
        across = ((way[1], way[0]), (-way[1], -way[0]))
        self._write(words, tip, _beside(words, around, [way, *across, *((way[0] + a, way[1] + b) for a, b in across)]))

    def _write(self, words: Words, about: Point, near: Iterable[Box]) -> None:
        box = self._first_free(list(near)) or next(
            found
            for reach in REACHES
            if (found := self._first_free(list(_ring(words, about, reach)), leading=about)) is not None
        )
        far = _distance(box, about) > LEADER + 0.42
        self.written.append((words, box, about if far else None))
        self.solid.append(box)

    def _first_free(self, boxes: list[Box], leading: Point | None = None) -> Box | None:
        candidates, taken = np.array([box.sides for box in boxes]), np.array([box.sides for box in self.solid])
        free = np.flatnonzero(clear_of(candidates, taken.reshape(-1, 4)))
        return boxes[free[0]] if len(free) else None

    def draw(self, axes: Axes) -> None:
        """Put all texts on the axes."""
        for words, box, about in self.written:
            if about is not None:
                _lead(axes, box, about)
            _put(axes, words, box)


def _dot(point: Point, reach: float = 0.0) -> Box:
    return Box.about(*point, 0.1 + 2 * reach, 0.1 + 2 * reach)


def _beside(words: Words, around: Box, sides: Iterable[tuple[float, float]]) -> Iterator[Box]:
    width, height = words.extent
    x, y = around.middle
    room_x, room_y = (around.right - around.left + width) / 2 + GAP, (around.top - around.bottom + height) / 2 + GAP
    for sx, sy in sides:
        yield Box.about(x + sx * room_x, y + sy * room_y, width, height)


def _ring(words: Words, about: Point, reach: float) -> Iterator[Box]:
    width, height = words.extent
    for ux, uy in AROUND:
        yield Box.about(
            about[0] + ux * (reach + width / 2 + 0.4), about[1] + uy * (reach + height / 2 + 0.4), width, height
        )


def _distance(box: Box, point: Point) -> float:
    dx = max(box.left - point[0], point[0] - box.right, 0.0)
    dy = max(box.bottom - point[1], point[1] - box.top, 0.0)
    return math.hypot(dx, dy)


def _lead(axes: Axes, box: Box, about: Point) -> None:
    x = min(max(about[0], box.left), box.right)
    y = min(max(about[1], box.bottom), box.top)
    axes.plot([x, about[0]], [y, about[1]], color=SOFT, lw=0.4, ls=(0, (1, 1.5)), zorder=0.5)


def _put(axes: Axes, words: Words, box: Box) -> None:
    x, top = box.middle[0], box.top
    more: dict[str, Any] = {"ha": "center", "va": "top", "linespacing": 1.15}
    if words.name:
        axes.text(x, top, words.name, size=words.size + 1, weight="bold", color=INK, **more)
        top -= _one(words.name, words.size + 1, "bold", "normal")[1]
    if words.text:
        axes.text(x, top, words.text, size=words.size, color=words.colour, style=words.style, **more)
