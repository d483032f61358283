"""The ellipse map: what the tip of the field draws at each place, with its sense."""

from __future__ import annotations

from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.collections import LineCollection, PolyCollection
from matplotlib.figure import Figure
from matplotlib.lines import Line2D
from numpy.typing import NDArray

from fastaxis.conventions import View
from fastaxis.report.glyphs import FLAT, TURN, Glyphs
from fastaxis.report.prefix import prefixed
from fastaxis.report.shots import Crop, Shots, bright_crop, heading
from fastaxis.report.style import LEFT, LINEAR, RIGHT, footer, new_figure, pale_map, styled

__all__ = ["draw_ellipses", "glyphs"]


def glyphs(crop: Crop, stokes: NDArray[Any], *, across: int = 17, dark: float = 0.03) -> Glyphs:
    """One ellipse a block of pixels, from the block's mean Stokes vector; none where a block is dark.

    Parameters
    ----------
    crop : the piece that is shown.
    stokes : (4, ny, nx) of that piece, R named in the receiver's view.
    across : about so many ellipses along the longer side.
    dark : blocks below this share of the brightest are left out.
    """
    ny, nx = stokes.shape[1:]
    block = max(round(max(ny, nx) / across), 1)
    rows, columns = ny // block, nx // block
    top, left = (ny - rows * block) // 2, (nx - columns * block) // 2
    cells = stokes[:, top : top + rows * block, left : left + columns * block]
    means = cells.reshape(4, rows, block, columns, block).mean(axis=(2, 4))
    total, s1, s2, s3 = means
    polarized = np.sqrt(s1**2 + s2**2 + s3**2)
    lit = (total > dark * total.max()) & (polarized > 0.02 * total)
    x = _middles(crop.x, left, block, columns)
    y = _middles(crop.y, top, block, rows)
    px, py = np.meshgrid(x, y)
    spacing = block * crop.pixel * 1e3
    return Glyphs(
        px[lit],
        py[lit],
        np.arctan2(s2, s1)[lit] / 2,
        np.arctan2(s3, np.hypot(s1, s2))[lit] / 2,
        0.43 * spacing * np.sqrt(polarized / np.where(lit, total, 1.0))[lit],
    )


def _middles(places: NDArray[Any], first: int, block: int, count: int) -> NDArray[Any]:
    return np.asarray(places[first : first + count * block].reshape(count, block).mean(axis=1) * 1e3)


@styled
def draw_ellipses(shots: Shots, *, title: str | None = None, across: int = 17, dark: float = 0.03) -> Figure:
    """Polarization ellipses over S0; the sense is told by colour and by an arrow head on each ellipse.

    The picture is always seen facing the source; the exposure's view only says which of the two senses is called R.
    A shorter ellipse is partly polarized: its size goes as the root of the degree of polarization.
    """
    crop = bright_crop(shots)
    figure = new_figure(6.4, 5.3 * crop.aspect + 1.1)
    axes = figure.subplots()
    stokes = crop.of(shots.stokes) * np.array([1, 1, 1, shots.view.s3_sign])[:, None, None]
    factor, unit = prefixed(float(stokes[0].max()), "W")
    picture = axes.imshow(stokes[0] * factor, origin="lower", extent=crop.extent, cmap=pale_map(), vmin=0)
    figure.colorbar(picture, ax=axes, label=f"S0 [{unit} per pixel]", aspect=30, pad=0.02, shrink=0.85)
    _draw_glyphs(axes, glyphs(crop, stokes, across=across, dark=dark))
    axes.set(xlabel="x [mm]", ylabel="y [mm]")
    axes.legend(
        handles=_legend(shots.view),
        loc="lower center",
        bbox_to_anchor=(0.5, 1.0),
        ncols=3,
        handlelength=1.4,
        columnspacing=1.2,
    )
    figure.suptitle(heading(shots, title), size=10)
    footer(figure, shots.view, note=f"No ellipse where S0 is below {dark:.0%} of its peak. Seen facing the source.")
    return figure


def _draw_glyphs(axes: Axes, all_glyphs: Glyphs) -> None:
    degrees = np.degrees(all_glyphs.ellipticity)
    for chosen, colour in ((degrees > FLAT, RIGHT), (degrees < -FLAT, LEFT), (np.abs(degrees) <= FLAT, LINEAR)):
        here = all_glyphs.of(chosen)
        if not len(here.x):
            continue
        axes.add_collection(LineCollection(list(here.curve(TURN)), colors=colour, linewidths=1.0, capstyle="round"))
        if colour != LINEAR:
            head = 0.5 * float(here.size.max())
            axes.add_collection(PolyCollection(list(here.arrow_heads(head)), facecolors=colour, linewidths=0))


def _legend(view: View) -> list[Line2D]:
    rows = ((RIGHT, -1, "clockwise"), (LEFT, +1, "counter-clockwise"))
    return [
        *(
            Line2D([], [], color=colour, label=f"{view.circular_name(helicity)}: {turns}, helicity {helicity:+d}")
            for colour, helicity, turns in rows
        ),
        Line2D([], [], color=LINEAR, label=f"linear (ellipticity within {FLAT:g}°)"),
    ]
