"""Power against the analyzer setting, for a detector that collects all light."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from matplotlib.figure import Figure

from fastaxis.report.prefix import prefixed
from fastaxis.report.shots import Shots, heading, short_labels
from fastaxis.report.style import LEFT, footer, new_figure, styled

__all__ = ["draw_powers"]

NAMED = 24  # so many names fit along the axis; of more, every n-th is written


@styled
def draw_powers(shots: Shots, *, title: str | None = None) -> Figure:
    """One dot a setting, in order, from zero power up.

    Parameters
    ----------
    shots : what ``train.expose`` returned.
    title : above all; None for the names of train and detector.
    """
    powers = [float(shots.frame(k).sum()) for k in range(len(shots))]
    factor, unit = prefixed(max(powers), "W")
    figure = new_figure(7.2, 3.6)
    axes = figure.subplots()
    places = range(len(powers))
    axes.plot(places, [power * factor for power in powers], color=LEFT, lw=0.8, marker="o", ms=3.5)
    labels, common = short_labels(shots.labels)
    every = _step(labels)
    long = max(map(len, labels)) > 3
    turned: dict[str, Any] = {"rotation": 60, "ha": "right", "rotation_mode": "anchor"} if long else {}
    axes.set_xticks(places[::every], labels[::every], **turned)
    axes.set_ylim(bottom=0)
    axes.set(xlabel=f"analyzer setting: {common}" if common else "analyzer setting", ylabel=f"power [{unit}]")
    axes.grid(axis="y", lw=0.4, alpha=0.5)
    axes.set_title(heading(shots, title), size=10)
    footer(figure, shots.view)
    return figure


def _step(labels: Sequence[str]) -> int:
    """Every how many settings are named: as many as fit, or up to half of them where that makes names shorter."""
    least = -(-len(labels) // NAMED)
    return min(range(least, 2 * least + 1), key=lambda step: max(map(len, labels[::step])))
