"""Our own look: colours that survive colour blindness and a grey printer, quiet axes, small type."""

from __future__ import annotations

import textwrap
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from functools import cache, wraps
from typing import Any, ParamSpec

import matplotlib as mpl
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.colors import Colormap, LinearSegmentedColormap
from matplotlib.figure import Figure
from numpy.typing import NDArray

from fastaxis.conventions import View, stamp
from fastaxis.report.letters import FAMILIES, make_known

__all__ = [
    "DARK", "HELD", "INK", "LEFT", "LINEAR", "PAPER", "RIGHT", "SOFT", "WARN", "azimuth_map", "foot_height", "footer",
    "light_map", "new_figure", "outer_labels", "pale_map", "rules", "signed_map",
    "styled",
]  # fmt: skip

INK, SOFT, PAPER = "#20262e", "#6b7480", "#ffffff"
DARK = "#d5d8dc"  # where there is too little light to say anything
RIGHT, LEFT, LINEAR = "#b8431f", "#1668a8", "#3d3d3d"  # the two hands: rust and blue, apart for every kind of eye
WARN = "#a33b00"

# Anchors of each map; the first climbs in lightness all the way, so order survives in grey.
LIGHT_ANCHORS = ("#07090f", "#1b2350", "#3a3f8f", "#7a4a93", "#c0596f", "#ea8a4a", "#f8c55f", "#fff7d8")
PALE_ANCHORS = ("#ffffff", "#e7e4dc", "#c9c3b4", "#a8a08d")
SIGNED_ANCHORS = ("#0d3b66", "#3f7cac", "#a9c6dd", "#f6f4ef", "#e9bf93", "#c26a2c", "#6e2c0a")
AZIMUTH_ANCHORS = ("#f3dc8c", "#6fa8a0", "#23395b", "#8c4a6b", "#f3dc8c")

RULES: dict[Any, Any] = {
    "font.family": FAMILIES,
    "font.size": 8.0,
    "axes.titlesize": 8.5,
    "axes.labelsize": 8.0,
    "axes.edgecolor": SOFT,
    "axes.linewidth": 0.6,
    "axes.labelcolor": INK,
    "text.color": INK,
    "xtick.color": INK,
    "ytick.color": INK,
    "xtick.labelsize": 7.0,
    "ytick.labelsize": 7.0,
    "xtick.major.width": 0.6,
    "ytick.major.width": 0.6,
    "xtick.major.size": 2.5,
    "ytick.major.size": 2.5,
    "legend.frameon": False,
    "legend.fontsize": 7.5,
    "image.interpolation": "nearest",
    "pdf.fonttype": 42,  # text stays text
}

FOOT_SIZE = 5.5  # [pt]
HELD = "\N{NO-BREAK SPACE}"

P = ParamSpec("P")


@contextmanager
def rules() -> Iterator[None]:
    """Our rules in place of the caller's matplotlib settings, which are given back afterwards."""
    make_known()
    with mpl.rc_context():
        mpl.rcdefaults()
        mpl.rcParams.update(RULES)
        yield


def styled(draw: Callable[P, Figure]) -> Callable[P, Figure]:
    """Run a drawing function under our rules, and leave the caller's matplotlib settings alone."""

    @wraps(draw)
    def under_rules(*args: P.args, **kwargs: P.kwargs) -> Figure:
        with rules():
            return draw(*args, **kwargs)

    return under_rules


def _colours(name: str, anchors: tuple[str, ...]) -> Colormap:
    return LinearSegmentedColormap.from_list(name, anchors, N=512).with_extremes(bad=DARK)


@cache
def light_map() -> Colormap:
    """From no light to the peak; lightness climbs all the way."""
    return _colours("fastaxis light", LIGHT_ANCHORS)


@cache
def pale_map() -> Colormap:
    """From no light (paper) to the peak (grey): a ground for drawings."""
    return _colours("fastaxis pale", PALE_ANCHORS)


@cache
def signed_map() -> Colormap:
    """From -1 (blue) through 0 (paper) to +1 (brown)."""
    return _colours("fastaxis signed", SIGNED_ANCHORS)


@cache
def azimuth_map() -> Colormap:
    """Closed: -90 deg and +90 deg are the same direction and the same colour."""
    return _colours("fastaxis azimuth", AZIMUTH_ANCHORS)


def new_figure(width: float, height: float) -> Figure:
    """An empty figure [inch] with a canvas of its own; nothing is registered anywhere."""
    figure = Figure(figsize=(width, height), layout="constrained", facecolor=PAPER)
    FigureCanvasAgg(figure)
    return figure


def outer_labels(grid: NDArray[Any], x: str, y: str) -> None:
    """Name and number only the lowest picture of each column and the first of each row.

    ``grid`` is (rows, columns) of axes; places without a picture are switched off. What already stands below a
    picture stays, with the name of the axis on a line under it.
    """
    for column in range(grid.shape[1]):
        used = [axes for axes in grid[:, column] if axes.axison]
        for axes in used[:-1]:
            axes.tick_params(labelbottom=False)
        if used:
            used[-1].set_xlabel(f"{used[-1].get_xlabel()}\n{x}".strip())
    for row in grid:
        row[0].set_ylabel(y)
        for axes in row[1:]:
            axes.tick_params(labelleft=False)


def footer(figure: Figure, view: View = View.RECEIVER, *, note: str = "") -> None:
    """Write the sign stamp (and a note above it) along the foot, and keep the drawing clear of it."""
    width, height = figure.get_size_inches()
    lines, inches = _foot_lines(width, view, note), foot_height(width, view, note=note)
    figure.text(0.01, 0.03 / height, "\n".join(lines), size=FOOT_SIZE, color=SOFT, va="bottom", linespacing=1.15)
    engine = figure.get_layout_engine()
    if engine is not None:
        rect = (0, inches / height, 1, 1 - inches / height)
        engine.set(rect=rect, h_pad=0.03, w_pad=0.03)  # type: ignore[call-arg]  # its stub lacks rect


def foot_height(width: float, view: View = View.RECEIVER, *, note: str = "") -> float:
    """Height [inch] of what :func:`footer` writes on a figure of this width [inch]."""
    return float((len(_foot_lines(width, view, note)) * 1.25 * FOOT_SIZE + 9) / 72)


def _foot_lines(width: float, view: View, note: str) -> list[str]:
    # A glyph of this font is about 0.6 em wide on average.
    room = int(width * 72 / (0.56 * FOOT_SIZE)) - 4
    return [*textwrap.wrap(note, room), *_between_signs(stamp(view), room)]


def _between_signs(signs: str, room: int) -> list[str]:
    """Lines broken behind a semicolon only: "S3 = I_R" on one line and "- I_L" on the next would be misread."""
    held = signs.replace(" ", HELD).replace(f";{HELD}", "; ")
    return [line.replace(HELD, " ") for line in textwrap.wrap(held, room)]
