"""A tolerance study on A4 paper: what contributes, how the draws spread, and what the frames become."""

from __future__ import annotations

from typing import Any, Protocol

import numpy as np
from matplotlib.axes import Axes
from matplotlib.figure import Figure
from numpy.typing import NDArray

from fastaxis.camera.settings import no_analyzer
from fastaxis.report.paper import MARGIN, Sheet, blank, number_pages
from fastaxis.report.prefix import prefixed
from fastaxis.report.style import INK, LEFT, RIGHT, SOFT, light_map, rules

__all__ = ["draw_tolerance"]

FEWEST = 5  # bars that there is room for; one alone would be as high as the plot
BARS = 10  # contributions shown; of more, the rest is one bar
HIGH = 2.1  # [inch] of a row of plots
ROUNDINGS = (
    1e-12  # of a value; draws that no error touches differ by some 1e-16 in it, too little for a bar to stand on
)
FRAME = 2.1


class Study(Protocol):
    """A tolerance study, as the page sees it."""

    train: Any
    merits: Any
    limits: Any
    nominal: Any
    rankings: Any
    seed: int
    surfaces: Any

    @property
    def samples(self) -> Any: ...
    @property
    def yield_(self) -> Any: ...
    def percentile(self, share: float, merit: str | None = None) -> float: ...
    def at_percentile(self, share: float, merit: str | None = None) -> Any: ...


def draw_tolerance(study: Study) -> tuple[Figure, ...]:
    """Pages with contributions and draws of every figure of merit, and frames of those read off a camera."""
    with rules():
        sheets = [blank()]
        _head(sheets[0], study)
        for name in study.merits:
            needed = HIGH + 0.5 + (0.25 if name in study.surfaces else 0) + (FRAME + 0.6 if _camera(study, name) else 0)
            if sheets[-1].room < needed:
                sheets.append(blank())
            _draw(sheets[-1], study, name)
        return number_pages(sheets, f"Tolerances of {study.train.name}")


def _head(sheet: Sheet, study: Study) -> None:
    draws = len(next(iter(study.samples.values())))
    sheet.write(f"Tolerances of {study.train.name}", size=13, bold=True)
    within = f"; within all limits: {study.yield_}, 95 % sure" if study.limits else ""
    sheet.write(f"{draws} draws, seed {study.seed}{within}", size=9, colour=SOFT)


def _draw(sheet: Sheet, study: Study, name: str) -> None:
    sheet.y += 0.12
    sheet.rule()
    sheet.write(name, size=10, bold=True)
    if name in study.surfaces:
        sheet.write(str(study.surfaces[name]), size=7, colour=SOFT)
    unread = int(np.isnan(study.samples[name]).sum())
    if unread:
        sheet.write(f"{unread} of {len(study.samples[name])} draws could not be read", size=7, colour=SOFT)
    width = sheet.width - 2 * MARGIN
    _bars(_axes(sheet, MARGIN + 1.45, width / 2 - 1.6, HIGH), study.rankings[name])
    _histogram(_axes(sheet, MARGIN + width / 2 + 0.4, width / 2 - 0.4, HIGH), study, name)
    sheet.y += HIGH
    if _camera(study, name):
        _frames(sheet, study, name)


def _axes(sheet: Sheet, x: float, width: float, height: float) -> Axes:
    """Axes with their upper left corner at x [inch] and where the page is written to, room for labels left below."""
    inner = height - 0.5
    box = (x / sheet.width, 1 - (sheet.y + 0.1 + inner) / sheet.height, width / sheet.width, inner / sheet.height)
    return sheet.figure.add_axes(box)


def _bars(axes: Axes, ranking: Any) -> None:
    """Shares of the variance, the largest on top."""
    if not all(np.isfinite(one.share) for one in ranking):
        axes.text(0.5, 0.5, "not known: it cannot be read", ha="center", va="center", transform=axes.transAxes)
        axes.set_axis_off()
        return
    shown = [(one.cause, 100 * one.share) for one in ranking[:BARS]]
    if len(ranking) > BARS:
        shown.append((f"{len(ranking) - BARS} more", 100 * sum(one.share for one in ranking[BARS:])))
    names, shares = zip(*shown[::-1], strict=True)
    axes.barh(range(len(shown)), shares, color=LEFT, height=0.65)
    axes.set_yticks(range(len(shown)), [name if len(name) <= 26 else f"{name[:24]} ..." for name in names], size=6.5)
    for place, share in enumerate(shares):
        axes.text(share, place, f" {share:.1f}", va="center", size=6)
    axes.set_xlim(0, 1.18 * max(*shares, 1e-9))
    axes.set_ylim(len(shown) - max(len(shown), FEWEST) - 0.5, len(shown) - 0.5)
    axes.set_xlabel("share of the variance [%]")
    for side in ("top", "right"):
        axes.spines[side].set_visible(False)


def _histogram(axes: Axes, study: Study, name: str) -> None:
    values = study.samples[name]
    read = values[np.isfinite(values)]
    if words := _instead(read):
        axes.text(0.5, 0.5, words, ha="center", va="center", transform=axes.transAxes)
        axes.set_axis_off()
        return
    limits = [limit for limit in study.limits.get(name, ()) if limit is not None]
    factor, unit = _scale(study, name, read)
    axes.hist(read * factor, bins=min(60, max(10, int(np.sqrt(read.size)))), color=SOFT, alpha=0.6)
    for share in (5, 95):
        axes.axvline(study.percentile(share, name) * factor, color=LEFT, lw=0.8, ls=(0, (4, 2)))
    axes.axvline(study.nominal[name] * factor, color=INK, lw=1.0)
    for limit in limits:
        axes.axvline(limit * factor, color=RIGHT, lw=1.2)
    axes.set_xlabel(f"{name} [{unit}]" if unit else name)
    axes.set_ylabel("draws")
    axes.locator_params(axis="x", nbins=5)  # numbers that differ in their fifth digit are long
    legend = "black: as declared; dashed: 5 % and 95 %" + ("; rust: limits" if limits else "")
    axes.set_title(legend, size=6.5, color=SOFT, loc="left")


def _instead(values: NDArray[Any]) -> str:
    """What is said in place of bars, where there would be none or all in one place."""
    if not values.size:
        return "no draw could be read"
    alike = np.ptp(values) <= ROUNDINGS * np.abs(values).max()
    return "all draws give the same: none of the errors shows here" if alike else ""


def _scale(study: Study, name: str, values: Any) -> tuple[float, str]:
    unit = getattr(study.merits[name], "unit", "")
    if unit == "rad":
        return 180 / np.pi, "°"
    return prefixed(float(np.abs(values).max()), unit) if unit in ("W", "m") else (1.0, unit)


def _camera(study: Study, name: str) -> bool:
    return hasattr(study.merits[name], "weights") and bool(np.isfinite(study.samples[name]).any())


def _frames(sheet: Sheet, study: Study, name: str) -> None:
    """The frame as declared between those of the 5th and the 95th percentile, on one scale."""
    sheet.y += 0.15
    merit = study.merits[name]
    benches = {
        "5th percentile": study.at_percentile(5, name),
        "as declared": study.train,
        "95th percentile": study.at_percentile(95, name),
    }
    shots = {title: bench.expose(merit.target, no_analyzer()) for title, bench in benches.items()}
    frames = {title: np.tensordot(merit.weights, one.stokes, axes=1) for title, one in shots.items()}
    most = max(float(frame.max()) for frame in frames.values())
    step = (sheet.width - 2 * MARGIN) / 3
    for place, (title, frame) in enumerate(frames.items()):
        axes = _axes(sheet, MARGIN + place * step + 0.35, step - 0.5, FRAME + 0.3)
        one = shots[title]
        extent = (one.x[0] * 1e3, one.x[-1] * 1e3, one.y[0] * 1e3, one.y[-1] * 1e3)
        axes.imshow(frame, origin="lower", extent=extent, cmap=light_map(), vmin=0, vmax=most)
        axes.set_title(title)
        axes.set_xlabel("x [mm]")
        if place == 0:
            axes.set_ylabel("y [mm]")
    sheet.y += FRAME + 0.35
