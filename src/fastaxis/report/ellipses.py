"""The ellipse map: what the tip of the field draws at each place, with its sense."""

from __future__ import annotations

from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.collections import LineCollection, PolyCollection
from matplotlib.figure import Figure
from matplotlib.lines import Line2D
from numpy.typing import NDArray

from fastaxis.camera.mounting import Mounting
from fastaxis.conventions import View
from fastaxis.report.darkness import draw_dark
from fastaxis.report.glyphs import FLAT, TURN, Glyphs
from fastaxis.report.prefix import prefixed
from fastaxis.report.shots import Crop, Shots, bright_crop, heading, is_unlit, mounting_note
from fastaxis.report.style import LEFT, LINEAR, RIGHT, footer, new_figure, pale_map, styled

__all__ = ["draw_ellipses", "glyphs"]


def glyphs(crop: Crop, stokes: NDArray[Any], *, across: int = 17, dark: float = 0.03) -> Glyphs:
    """One ellipse a block of pixels, from the block's mean Stokes vector; none where a block is dark.

    Parameters
    ----------
    crop : the piece that is shown.
    stokes : (4, ny, nx) of that piece, as seen in the picture: S3 is positive for what turns clockwise there.
    across : about so many ellipses along the longer side.
    dark : blocks below this share of the brightest are left out.
    """
    block = _block(crop, across)
    left, columns = _fitted(crop.x, block, crop.pixel)
    top, rows = _fitted(crop.y, block, crop.pixel)
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


def _axis_at(places: NDArray[Any], pixel: float) -> float:
    """Where the axis of the beam stands among the pixels, counted from the middle of the first one."""
    return float(-places[0] / pixel)


def _block(crop: Crop, across: int) -> int:
    """Pixels along a side of a block: even where the axis runs between two pixels, odd where it runs through one.

    Only then can a block have its middle on the axis, and what lies on the axes of the picture is drawn there.
    """
    block = max(round(max(len(crop.x), len(crop.y)) / across), 1)
    halves = round(2 * _axis_at(crop.x, crop.pixel))
    return block + 1 if block > 1 and (block + halves) % 2 == 0 else block


def _fitted(places: NDArray[Any], block: int, pixel: float) -> tuple[int, int]:
    """(first pixel, number) of the blocks along one side, one of them with its middle on the axis if that is shown."""
    axis = _axis_at(places, pixel)
    if 0 < axis < len(places) - 1 and len(places) >= 2 * block:
        first = round(axis - (block - 1) / 2) % block
    else:
        first = len(places) % block // 2
    return first, (len(places) - first) // block


def _middles(places: NDArray[Any], first: int, block: int, count: int) -> NDArray[Any]:
    return np.asarray(places[first : first + count * block].reshape(count, block).mean(axis=1) * 1e3)


@styled
def draw_ellipses(shots: Shots, *, title: str | None = None, across: int = 17, dark: float = 0.03) -> Figure:
    """Polarization ellipses over S0; the sense is told by colour and by an arrow head on each ellipse.

    The picture is the camera's, and each ellipse stands and turns as it would be seen at that place in that
    picture: of a mirrored one R, which keeps its name and colour, is drawn counter-clockwise. The exposure's view
    only says which of the two senses is called R. A shorter ellipse is partly polarized: its size goes as the root
    of the degree of polarization.
    """
    if is_unlit(shots):
        return draw_dark(shots, title=title)
    crop, mounting = bright_crop(shots), Mounting(shots.orientation)
    figure = new_figure(6.4, 5.3 * crop.aspect + 1.1)
    axes = figure.subplots()
    stokes = crop.of(shots.stokes) * np.array([1, 1, 1, shots.view.s3_sign])[:, None, None]
    factor, unit = prefixed(float(stokes[0].max()), "W")
    picture = axes.imshow(stokes[0] * factor, origin="lower", extent=crop.extent, cmap=pale_map(), vmin=0)
    figure.colorbar(picture, ax=axes, label=f"S0 [{unit} per pixel]", aspect=30, pad=0.02, shrink=0.85)
    shown = _draw_glyphs(
        axes, glyphs(crop, mounting.seen_stokes(stokes), across=across, dark=dark), mirrored=mounting.mirrored
    )
    axes.set(xlabel="x [mm]", ylabel="y [mm]")
    axes.legend(
        handles=[_named(colour, shots.view, mirrored=mounting.mirrored) for colour in shown],
        loc="lower center",
        bbox_to_anchor=(0.5, 1.0),
        ncols=3,
        handlelength=1.4,
        columnspacing=1.2,
    )
    figure.suptitle(heading(shots, title), size=10)
    seen = mounting_note(shots) or "Seen facing the source."
    footer(figure, shots.view, note=f"No ellipse where S0 is below {dark:.0%} of its peak. {seen}")
    return figure


def _draw_glyphs(axes: Axes, all_glyphs: Glyphs, *, mirrored: bool) -> list[str]:
    """Draw what there is of each sense; gives the colours used. Colours belong to the light, arrows to the picture."""
    degrees = np.degrees(all_glyphs.ellipticity) * (-1 if mirrored else 1)
    shown = []
    for chosen, colour in ((degrees > FLAT, RIGHT), (degrees < -FLAT, LEFT), (np.abs(degrees) <= FLAT, LINEAR)):
        here = all_glyphs.of(chosen)
        if not len(here.x):
            continue
        shown.append(colour)
        axes.add_collection(LineCollection(list(here.curve(TURN)), colors=colour, linewidths=1.0, capstyle="round"))
        if colour != LINEAR:
            head = 0.5 * float(here.size.max())
            axes.add_collection(PolyCollection(list(here.arrow_heads(head)), facecolors=colour, linewidths=0))
    return shown


def _named(colour: str, view: View, *, mirrored: bool) -> Line2D:
    """The entry of a colour in the legend."""
    if colour == LINEAR:
        return Line2D([], [], color=LINEAR, label=f"linear (ellipticity within {FLAT:g}°)")
    helicity = -1 if colour == RIGHT else +1
    turns = "clockwise" if (helicity < 0) != mirrored else "counter-clockwise"
    drawn = f"drawn {turns}" if mirrored else turns
    return Line2D([], [], color=colour, label=f"{view.circular_name(helicity)}: {drawn}, helicity {helicity:+d}")
