"""The frame of every setting, on one common scale."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.colors import LogNorm, Normalize
from matplotlib.figure import Figure
from numpy.typing import NDArray

from fastaxis.camera.mounting import Mounting
from fastaxis.report.darkness import draw_dark
from fastaxis.report.marks import mark_analyzer
from fastaxis.report.powers import draw_powers
from fastaxis.report.prefix import prefixed, readable
from fastaxis.report.shots import Shots, bright_crop, heading, is_unlit, mounting_note, short_labels, whole
from fastaxis.report.style import footer, light_map, new_figure, outer_labels, styled

__all__ = ["draw_frames", "layout"]

MOST = 100  # pictures of one figure; smaller ones would be dots
FAINT = 1e-9  # of the peak; below it a crop would follow roundings
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


def draw_frames(shots: Shots, *, title: str | None = None, full: bool = False, decades: float | None = None) -> Figure:
    """All frames side by side: one scale of colour, the same piece of the camera, axes in mm.

    Each picture has its setting above, its power below and a mark for the state that passes; the colour bar gives
    watts per pixel. A detector, which has no picture, gets its power against the settings instead.

    Parameters
    ----------
    shots : what ``train.expose`` returned.
    title : above all; None for the names of train and camera.
    full : show the whole camera rather than the piece where the light is.
    decades : show so many powers of ten below the peak on a logarithmic scale, on which faint rings are seen; None for
        a linear scale.

    Of more than a hundred settings, so many are shown, evenly chosen.
    """
    if shots.pixel is None:
        return draw_powers(shots, title=title)
    if is_unlit(shots) or all(shots.is_dark(k) for k in range(len(shots))):
        return draw_dark(shots, title=title)
    return _draw_pictures(shots, heading(shots, title), full=full, decades=decades)


@styled
def _draw_pictures(shots: Shots, title: str, *, full: bool, decades: float | None) -> Figure:
    # On a logarithmic scale light is seen as far down as the scale reaches.
    share = 0.01 if decades is None else max(10**-decades, FAINT)
    crop = whole(shots) if full else bright_crop(shots, share=share)
    chosen = range(0, len(shots), -(-len(shots) // MOST))
    frames = np.stack([crop.of(shots.frame(k)) for k in chosen])
    labels, common = short_labels(shots.labels)
    rows, columns = layout(len(chosen))
    side = SIDES.get(columns, SMALL_SIDE)
    figure = new_figure(columns * side + 1.1, rows * (side * crop.aspect + 0.32) + 0.75)
    grid: NDArray[Any] = figure.subplots(rows, columns, squeeze=False)
    factor, unit = prefixed(float(frames.max()), "W")
    marked = False
    seen = Mounting(shots.orientation).seen_stokes(np.diag([1, 1, 1, shots.view.s3_sign]))
    scale = {"norm": _scale(float(frames.max()) * factor, decades), "cmap": light_map(), "origin": "lower"}
    for axes, k, frame in zip(grid.flat, chosen, frames, strict=False):
        axes.imshow(frame * factor, extent=crop.extent, **scale)
        _caption(axes, labels[k], _power(shots, k), small=len(frames) > MANY)
        marked |= mark_analyzer(axes, seen @ shots.weights[k])
    for axes in grid.flat[len(frames) :]:
        axes.set_axis_off()
    outer_labels(grid, "x [mm]", "y [mm]")
    label = f"{unit} per pixel" + ("" if decades is None else ", logarithmic")
    figure.colorbar(grid.flat[0].images[0], ax=grid, label=label, shrink=0.8, aspect=28, pad=0.015)
    figure.suptitle(f"{title}: {common}" if common else title, size=10)
    notes = [f"{len(chosen)} of {len(shots)} settings are shown."] if len(chosen) < len(shots) else []
    notes += ["White mark: the state that the analyzer lets pass."] if marked else []
    footer(figure, shots.view, note=" ".join([*notes, mounting_note(shots)]).strip())
    return figure


def _scale(peak: float, decades: float | None) -> Normalize:
    if decades is None:
        return Normalize(0.0, peak)
    return LogNorm(peak * 10**-decades, peak, clip=True)  # what is fainter has the darkest colour


def _power(shots: Shots, k: int) -> str:
    """Power on the whole camera, whatever piece of it is shown."""
    power = float(shots.frame(k).sum())
    return "dark" if shots.is_dark(k) else readable(power, "W")


def _caption(axes: Axes, setting: str, power: str, *, small: bool) -> None:
    axes.set_title(setting, size=6.0 if small else 8.5, pad=2.5)
    axes.set_xlabel(power, size=5.5 if small else 7.5, labelpad=1.5)
    axes.tick_params(labelsize=5.5 if small else 7.0)
    axes.locator_params(nbins=3 if small else 5)
