"""What the figures ask of an exposure, and where in it the light is."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Protocol

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.mounting import Mounting
from fastaxis.conventions import View

__all__ = ["Crop", "Shots", "bright_crop", "heading", "is_unlit", "mounting_note", "short_labels", "whole"]

Image = NDArray[np.float64]


class Shots(Protocol):
    """An exposure, as the figures see it: the camera's own picture, centred on the axis of the beam."""

    @property
    def labels(self) -> tuple[str, ...]: ...
    @property
    def view(self) -> View: ...
    @property
    def stokes(self) -> Image: ...
    @property
    def weights(self) -> Image: ...
    @property
    def x(self) -> Image: ...
    @property
    def y(self) -> Image: ...
    @property
    def pixel(self) -> float | None: ...
    @property
    def name(self) -> str: ...
    @property
    def target(self) -> str: ...
    @property
    def orientation(self) -> str: ...
    @property
    def dark_below(self) -> float: ...
    def __len__(self) -> int: ...
    def frame(self, which: int) -> Image: ...
    def is_dark(self, which: int) -> bool: ...


def heading(shots: Shots, title: str | None) -> str:
    """The title asked for, or the names of the train and of the camera."""
    return title if title is not None else ", ".join(part for part in (shots.name, shots.target) if part)


def is_unlit(shots: Shots) -> bool:
    """Whether no light at all reaches the sensor."""
    return not shots.stokes[0].max() > 0 or math.isinf(shots.dark_below)


def mounting_note(shots: Shots) -> str:
    """What the foot of a figure says of a camera that is turned or mirrored; "" for an upright one."""
    words = Mounting(shots.orientation).words
    if not words:
        return ""
    return f"Picture {words}: polarization is drawn as it is seen there; states keep the names of the beam's own frame."


def short_labels(labels: tuple[str, ...]) -> tuple[tuple[str, ...], str]:
    """Labels without the words they all begin and end with, and those words with a gap for what differs.

    >>> short_labels(("plate fast 0°, polarizer 0°", "plate fast 9°, polarizer 0°"))
    (('0°', '9°'), 'plate fast …, polarizer 0°')
    >>> short_labels(("H", "V"))
    (('H', 'V'), '')
    """
    words = [label.split(" ") for label in labels]
    room = min(map(len, words)) - 1  # at least one word of each is left
    front = _agreeing(words, room)
    back = _agreeing([row[::-1] for row in words], room - front)
    if len(labels) < 2 or front + back == 0:
        return labels, ""
    middles = [" ".join(row[front : len(row) - back]) for row in words]
    comma = "," if all(middle.endswith(",") for middle in middles) else ""
    frame = " ".join([*words[0][:front], f"…{comma}", *words[0][len(words[0]) - back :]])
    return tuple(middle.rstrip(",") for middle in middles), frame


def _agreeing(rows: list[list[str]], most: int) -> int:
    """How many first words all rows have in common."""
    return next((k for k in range(most) if len({row[k] for row in rows}) > 1), max(most, 0))


@dataclass(frozen=True)
class Crop:
    """The part of a picture that is shown.

    Parameters
    ----------
    x, y : centres of its columns and rows [m].
    pixel : side of a pixel [m].
    rows, columns : first and one past the last, in the whole picture.
    """

    x: Image
    y: Image
    pixel: float
    rows: tuple[int, int]
    columns: tuple[int, int]

    def of(self, images: NDArray[Any]) -> NDArray[Any]:
        """The shown part of images (..., ny, nx)."""
        return images[..., slice(*self.rows), slice(*self.columns)]

    @property
    def extent(self) -> tuple[float, float, float, float]:
        """(left, right, bottom, top) [mm], to the outer edges of the pixels."""
        edge = self.pixel / 2
        sides = (self.x[0] - edge, self.x[-1] + edge, self.y[0] - edge, self.y[-1] + edge)
        left, right, bottom, top = (float(side) * 1e3 for side in sides)
        return left, right, bottom, top

    @property
    def aspect(self) -> float:
        """Height over width."""
        return len(self.y) / len(self.x)


def whole(shots: Shots) -> Crop:
    """All of the picture."""
    return _cut(shots, (0, len(shots.y)), (0, len(shots.x)))


def bright_crop(shots: Shots, *, share: float = 0.01, least: int = 8) -> Crop:
    """The smallest square around all light above ``share`` of the peak of S0, with a margin of an eighth.

    It stays inside the picture, so it is a rectangle where the light reaches an edge, and never has fewer than
    ``least`` pixels a side where the picture has them.
    """
    total = shots.stokes[0]
    lit = total > share * total.max()
    if not lit.any():
        return whole(shots)
    spans = [_span(lit.any(axis=axis)) for axis in (1, 0)]
    side = max(*(high - low for low, high in spans), least)
    side += 2 * round(side / 8)
    rows, columns = (_grown(span, side, count) for span, count in zip(spans, total.shape, strict=True))
    return _cut(shots, rows, columns)


def _cut(shots: Shots, rows: tuple[int, int], columns: tuple[int, int]) -> Crop:
    assert shots.pixel is not None, "a detector has no picture"
    return Crop(shots.x[slice(*columns)], shots.y[slice(*rows)], shots.pixel, rows, columns)


def _span(lit: Sequence[bool] | NDArray[np.bool_]) -> tuple[int, int]:
    places = np.flatnonzero(lit)
    return int(places[0]), int(places[-1]) + 1


def _grown(span: tuple[int, int], side: int, count: int) -> tuple[int, int]:
    start = (sum(span) - side) // 2
    return max(start, 0), min(start + side, count)
