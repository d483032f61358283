"""The frames of a failing assertion, side by side."""

from __future__ import annotations

import textwrap
from collections.abc import Mapping
from typing import Any, Protocol

import numpy as np
from matplotlib.figure import Figure

from fastaxis.report.frames import layout
from fastaxis.report.style import INK, WARN, footer, light_map, new_figure, styled

__all__ = ["draw_failing"]

SIDE = 2.8  # [inch] of a picture


class Failing(Protocol):
    """A failing assertion, as the figure sees it."""

    where: str
    expected: str
    got: str
    cause: str
    frames: Mapping[str, Any]


@styled
def draw_failing(error: Failing) -> Figure:
    """Every frame on its own scale, since a recorded one is seldom in watts; the words of the failure above."""
    frames = {name: np.asarray(frame) for name, frame in error.frames.items()}
    rows, columns = layout(len(frames))
    width = max(5.0, columns * SIDE)
    lines = textwrap.wrap(f"expected: {error.expected}", int(width * 12)) + textwrap.wrap(
        f"got: {error.got}", int(width * 12)
    )
    cause = textwrap.wrap(f"likely cause: {error.cause}", int(width * 12))
    figure = new_figure(width, rows * SIDE + 0.45 + 0.16 * (len(lines) + len(cause) + 1))
    figure.suptitle("\n".join([error.where, *lines, *cause]), size=8, color=INK, x=0.02, ha="left")
    grid = figure.subplots(rows, columns, squeeze=False)
    for axes in grid.flat:
        axes.set_axis_off()
    for axes, (name, frame) in zip(grid.flat, frames.items(), strict=False):
        axes.imshow(frame, origin="lower", cmap=light_map(), vmin=0.0)
        axes.set_title(name, color=WARN if name.startswith("got") else INK)
    footer(figure)
    return figure
