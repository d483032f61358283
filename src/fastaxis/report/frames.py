"""The frame of every setting, on one common scale."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.figure import Figure
from numpy.typing import NDArray

from fastaxis.report.marks import mark_analyzer
from fastaxis.report.powers import draw_powers
from fastaxis.report.prefix import prefixed, readable
from fastaxis.report.shots import Shots, bright_crop, heading, short_labels, whole
from fastaxis.report.style import footer, light_map, new_figure, outer_labels, styled

__all__ = ["draw_frames", "layout"]

MANY = 20  # from here on type is smaller
SIDES = {1: 4.0, 2: 2.7, 3: 2.3, 4: 1.9}  # [inch] of a picture by the number of columns
SMALL_SIDE = 1.15


def layout(count: int) -> tuple[int, int]:
    """(rows, columns) for so many pictures: close to a square, wider than high.

    >>> [layout(n) for n in (1, 3, 4, 6, 16, 64)]
    [(1, 1), (1, 3), (2, 2), (2, 3), (4, 4), (8, 8)]
    """
    if count <= 3:
        return 1, count
    columns = math.ceil(math.sqrt(count))
    return math.ceil(count / columns), columns


def draw_frames(shots: Shots, *, title: str | None = None, full: bool = False) -> Figure:
    """All frames side by side: one scale of colour, the same piece of the camera, axes in mm.

    Each picture has its setting above, its power below and a mark for the state that passes; the colour bar gives
    watts per pixel. A detector, which has no picture, gets its power against the settings instead.

    Parameters
    ----------
    shots : what ``train.expose`` returned.
    title : above all; None for the names of train and camera.
    full : show the whole camera rather than the piece where the light is.
    """
    if shots.pixel is None:
        return draw_powers(shots, title=title)
    return _draw_pictures(shots, heading(shots, title), full=full)


@styled
def _draw_pictures(shots: Shots, title: str, *, full: bool) -> Figure:
    crop = whole(shots) if full else bright_crop(shots)
    frames = np.stack([crop.of(shots.frame(k)) for k in range(len(shots))])
    labels, common = short_labels(shots.labels)
    rows, columns = layout(len(shots))
    side = SIDES.get(columns, SMALL_SIDE)
    figure = new_figure(columns * side + 1.1, rows * (side * crop.aspect + 0.32) + 0.75)
    grid: NDArray[Any] = figure.subplots(rows, columns, squeeze=False)
    factor, unit = prefixed(float(frames.max()), "W")
    marked = False
    signs = np.array([1, 1, 1, shots.view.s3_sign])
    scale = {"vmin": 0.0, "vmax": float(frames.max()) * factor or 1.0, "cmap": light_map(), "origin": "lower"}
    for k, axes in enumerate(grid.flat):
        if k >= len(frames):
            axes.set_axis_off()
            continue
        axes.imshow(frames[k] * factor, extent=crop.extent, **scale)
        # The power is that of the whole camera, whatever piece of it is shown.
        _caption(axes, labels[k], float(shots.frame(k).sum()), small=len(frames) > MANY)
        marked |= mark_analyzer(axes, signs * shots.weights[k])
    outer_labels(grid, "x [mm]", "y [mm]")
    figure.colorbar(grid.flat[0].images[0], ax=grid, label=f"{unit} per pixel", shrink=0.8, aspect=28, pad=0.015)
    figure.suptitle(f"{title}: {common}" if common else title, size=10)
    footer(figure, shots.view, note="White mark: the state that the analyzer lets pass." if marked else "")
    return figure


def _caption(axes: Axes, setting: str, power: float, *, small: bool) -> None:
    axes.set_title(setting, size=6.0 if small else 8.5, pad=2.5)
    axes.set_xlabel(readable(power, "W"), size=5.5 if small else 7.5, labelpad=1.5)
    axes.tick_params(labelsize=5.5 if small else 7.0)
    axes.locator_params(nbins=3 if small else 5)
