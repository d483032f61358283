"""Stokes images, and azimuth and ellipticity where there is light enough to tell."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.colors import Colormap
from matplotlib.figure import Figure
from numpy.typing import NDArray

from fastaxis.camera.mounting import Mounting
from fastaxis.report.darkness import draw_dark
from fastaxis.report.prefix import prefixed
from fastaxis.report.shots import Shots, bright_crop, heading, is_unlit, mounting_note
from fastaxis.report.style import azimuth_map, footer, light_map, new_figure, outer_labels, signed_map, styled

__all__ = ["DARK_SHARE", "draw_stokes"]

DARK_SHARE = 0.01  # of the peak of S0; below it a state of polarization is not drawn


@dataclass(frozen=True, kw_only=True)
class Panel:
    """One picture of the figure: its name, its values and how they are coloured."""

    name: str
    image: NDArray[Any]
    colours: Colormap
    low: float
    high: float
    unit: str
    ticks: tuple[float, ...] | None = None


@styled
def draw_stokes(shots: Shots, *, title: str | None = None, dark: float = DARK_SHARE) -> Figure:
    """S0 in watts per pixel, S1 to S3 over the local S0, azimuth and ellipticity in degrees.

    Azimuth is atan2(S2, S1)/2 and ellipticity asin(S3/|S1..S3|)/2. Where S0 is below ``dark`` of its peak nothing
    is said (grey); where the light is circular within 2 deg of ellipticity 45 deg, azimuth isn't either.
    S3 and ellipticity are positive for what the exposure's view calls R. The azimuth is the one seen in the camera's
    picture; S1 and S2 keep the beam's own frame, in which H and D are named.
    """
    if is_unlit(shots):
        return draw_dark(shots, title=title)
    crop = bright_crop(shots)
    panels = _panels(crop.of(shots.stokes), dark, Mounting(shots.orientation))
    figure = new_figure(9.4, 2 * (2.35 * crop.aspect + 0.3) + 0.7)
    grid = figure.subplots(2, 3)
    for axes, panel in zip(grid.flat, panels, strict=True):
        _draw(figure, axes, panel, crop.extent)
    outer_labels(grid, "x [mm]", "y [mm]")
    figure.suptitle(heading(shots, title), size=10)
    note = f"Grey: S0 below {dark:.0%} of its peak, or azimuth of nearly circular light. {mounting_note(shots)}"
    footer(figure, shots.view, note=note.strip())
    return figure


def _draw(figure: Figure, axes: Axes, panel: Panel, extent: tuple[float, float, float, float]) -> None:
    picture = axes.imshow(
        panel.image, origin="lower", extent=extent, cmap=panel.colours, vmin=panel.low, vmax=panel.high
    )
    axes.set_title(panel.name, pad=3)
    axes.locator_params(nbins=5)
    bar = figure.colorbar(picture, ax=axes, label=panel.unit, aspect=22, pad=0.02, ticks=panel.ticks)
    bar.ax.tick_params(labelsize=6.5)


def _panels(stokes: NDArray[Any], dark: float, mounting: Mounting) -> tuple[Panel, ...]:
    total = stokes[0]
    lit = total > dark * total.max()
    shares = np.where(lit, stokes[1:] / np.where(lit, total, 1.0), np.nan)
    s1, s2, s3 = shares
    linear, degree = np.hypot(s1, s2), np.sqrt((shares**2).sum(axis=0))
    ellipticity = np.degrees(np.arctan2(s3, linear)) / 2
    _, seen1, seen2, _ = mounting.seen_stokes([total, *shares])
    azimuth = np.where(np.abs(ellipticity) < 43, np.degrees(np.arctan2(seen2, seen1)) / 2, np.nan)
    azimuth = np.where(degree > DARK_SHARE, azimuth, np.nan)
    factor, unit = prefixed(float(total.max()), "W")
    ones = (-1.0, -0.5, 0.0, 0.5, 1.0)
    signed = [
        Panel(name=name, image=image, colours=signed_map(), low=-1, high=1, unit="share of S0", ticks=ones)
        for name, image in (("S1 / S0   (H − V)", s1), ("S2 / S0   (D − A)", s2), ("S3 / S0   (R − L)", s3))
    ]
    return (
        Panel(name="S0", image=total * factor, colours=light_map(), low=0,
              high=float(total.max()) * factor or 1.0, unit=f"{unit} per pixel"),
        *signed,
        Panel(name="azimuth of the long axis" if mounting.upright else "azimuth seen in this picture",
              image=azimuth, colours=azimuth_map(), low=-90, high=90, unit="deg",
              ticks=(-90.0, -45.0, 0.0, 45.0, 90.0)),
        Panel(name="ellipticity   (positive: R)", image=ellipticity, colours=signed_map(), low=-45, high=45,
              unit="deg", ticks=(-45.0, -22.5, 0.0, 22.5, 45.0)),
    )  # fmt: skip
