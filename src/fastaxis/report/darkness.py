"""The figure of a camera that no light reaches."""

from __future__ import annotations

from matplotlib.figure import Figure

from fastaxis.report.shots import Shots, heading, whole
from fastaxis.report.style import DARK, INK, footer, new_figure, styled

__all__ = ["draw_dark"]


@styled
def draw_dark(shots: Shots, *, title: str | None = None) -> Figure:
    """The field of view of the camera with the word "dark" in it: roundings are not drawn as light."""
    crop = whole(shots)
    figure = new_figure(4.6, 3.6 * min(crop.aspect, 2.0) + 0.9)
    axes = figure.subplots()
    left, right, bottom, top = crop.extent
    axes.set(xlim=(left, right), ylim=(bottom, top), aspect="equal", xlabel="x [mm]", ylabel="y [mm]", facecolor=DARK)
    axes.text(0.5, 0.5, "dark", transform=axes.transAxes, ha="center", va="center", size=14, color=INK)
    figure.suptitle(heading(shots, title), size=10)
    footer(figure, shots.view, note="Behind every setting: no light but roundings.")
    return figure
