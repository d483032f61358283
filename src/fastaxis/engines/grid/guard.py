"""How close the light came to the limits of its samples."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.edges import beyond_share
from fastaxis.engines.grid.light import GridLight, Rims, Samples
from fastaxis.engines.grid.workers import strips, together
from fastaxis.errors import SamplingError, SamplingWarning, caution
from fastaxis.plan import Grid
from fastaxis.plan.sampling import Sampling

__all__ = ["LINES", "check", "edge_watched", "limits", "phase_step", "rim_of", "rim_share", "steps_of"]

Reals = NDArray[np.float64]

FRAME = 1 / 16  # of half the side
QUIET = 0.99  # share of the light whose phase steps are looked at
# A frame that holds one part in a thousand is what the slow tails of a hard edge put there in a good window; ten
# times that would show in a frame. With 20 % the light has come round the edge.
WARN, REFUSE = 1e-2, 0.2
# Beside runs four times as dense on windows twice as wide, over about 110 random benches on random grids, pictures were
# wrong by 1e-3 of their peak from 1.4e-4 near the edge of the window or 4e-6 near that of the band on, and right to
# 1e-3 below 5e-5 and 8e-7: the field there is the root of the power.
EDGE_WARN, BAND_WARN = 1e-4, 2e-6
# Tails behind an axis or an edge reach to the edge of any band, and the plan knows how fine their samples must be. What
# the plan can't know, as of patterns, is told of any grid from BAND on.
BAND, BAND_KNOWN = 1e-3, 1e-2
DIM = 1e-6  # of the brightest: where even all samples of a line together are no part of the last 1 %
LINES = 128  # rows and columns looked at for phase steps: enough to meet a beam anywhere


def edge_watched(light: GridLight) -> GridLight:
    """The light with the power near the edge of its window noted, if that is the most so far."""
    if light.periodic:
        return light
    return light.met(edge=rim_share(light.samples))


def rim_share(samples: Samples, *, spectrum: bool = False) -> float:
    """Share of the power in the outermost samples, along all four sides.

    Parameters
    ----------
    spectrum : whether these are the waves of a transform, of which the shortest stand in the middle.
    """
    count = samples.shape[-1]
    margin = math.ceil(count * FRAME / 2)
    middle = slice(count // 2 - margin, count // 2 + margin)
    rim = [middle] if spectrum else [slice(margin), slice(count - margin, count)]
    total, outer = np.sum(strips(lambda strip: _powers(samples, strip, rim), count, count), axis=0)
    return float(outer / total) if total else 0.0


def _powers(samples: Samples, strip: slice, rim: list[slice]) -> tuple[float, float]:
    """Sums of the squares in some rows, and of those of them that lie in the rim of either side."""
    rows, outer = samples[:, strip], 0.0
    for piece in rim:
        low, high = (min(max(row, strip.start), strip.stop) - strip.start for row in (piece.start or 0, piece.stop))
        whole = rows[:, low:high]
        corners = (_squares(whole[:, :, other]) for other in rim)
        outer += _squares(rows[:, :, piece]) + _squares(whole) - sum(corners)
    return _squares(rows), outer


def _squares(samples: Samples) -> float:
    parts = samples.view(samples.real.dtype)
    return float(np.einsum("kij,kij->", parts, parts))


def phase_step(light: GridLight) -> float:
    """Phase step [rad] between neighbouring samples that all but 1 % of the light stays below.

    Looked at on some rows and columns of both components. A step counts as much as the two samples have light in
    common, so the jump by pi at a zero of the field, which no sampling removes, weighs next to nothing.
    """
    stride = max(light.count // LINES, 1)
    lines = [some for part in light.samples for some in (part[::stride], part.T[::stride])]
    weights, steps = map(np.concatenate, zip(*together(_steps, lines), strict=True))
    seen = weights > DIM * weights.max(initial=0.0)
    return _quantile(weights[seen], steps[seen])


def _steps(lines: Samples) -> tuple[Reals, Reals]:
    """(weight, phase step) of neighbours along some lines, but for those dim beside others."""
    products = (lines[:, 1:] * lines[:, :-1].conj()).ravel()
    weights = abs(products)
    seen = weights > DIM * weights.max()
    return weights[seen], abs(np.angle(products[seen]))


def _quantile(weights: Reals, steps: Reals) -> float:
    order = np.argsort(steps)
    below = np.cumsum(weights[order])
    return float(steps[order[np.searchsorted(below, QUIET * below[-1])]]) if steps.size else 0.0


def rim_of(down: Reals, across: Reals) -> float:
    """Share of the power in the outermost samples, from the power of each row and each column.

    Corners count twice: a little more than there is, where light has come that far.
    """
    margin = math.ceil(len(down) * FRAME / 2)
    shares = [(line[:margin].sum() + line[-margin:].sum()) / line.sum() for line in (down, across) if line.any()]
    return min(float(sum(shares)), 1.0)


def steps_of(down: Reals, across: Reals, room: int) -> float:
    """Phase step [rad] between neighbouring samples that all but 1 % of the light stays below, from its waves.

    A wave j of n across the window turns by 2 pi j/n from one sample to the next.

    Parameters
    ----------
    down, across : power of the waves of each order along either side, the order 0 in the middle.
    room : n.
    """
    count = len(down)
    steps = 2 * np.pi * abs(np.arange(count) - (count - 1) / 2) / room
    order = np.argsort(steps)
    below = np.cumsum((down + across)[order])
    return float(steps[order[np.searchsorted(below, QUIET * below[-1])]]) if below[-1] else 0.0


def limits(sampling: Sampling) -> tuple[float, float]:
    """Shares of the power that are told of: near the edge of a window or cut off, and near the edge of a band.

    The automatic grid keeps its own distance from both, and is looked at only for what no plan can foresee.
    """
    by_hand = sampling.chosen == "by hand"
    if sampling.known and sampling.planes[-1].spread.rough:
        return EDGE_WARN if by_hand else WARN, BAND_KNOWN
    return (EDGE_WARN, BAND_WARN) if by_hand else (WARN, BAND)


def check(light: GridLight, step: float, names: tuple[str, ...], sampling: Sampling) -> Guard:
    """The guard of finished light; warned about or refused where it is bad.

    Parameters
    ----------
    step : its steepest phase step [rad].
    names : parts of the last step.
    sampling : its samples; at the source twice as wide or twice as fine is the remedy named.

    Warns
    -----
    SamplingWarning : more than 1 % of the power came near the edge of the window or was cut off; on a grid set by
        hand, so much near the edge of window or band that one part in a thousand of the peak may be wrong.

    Raises
    ------
    SamplingError : more than 20 % near the edge of the window or cut off.
    """
    worst, (edge, band) = max(light.edge_power, light.discarded), limits(sampling)
    if worst > edge or light.band_power > band or _pattern(light) > 1:
        better, named = _better(light, sampling.grid, band), sampling.named
        message = _message(light, names, _both(better, named), band)
        if worst > REFUSE:
            raise SamplingError(**message)
        if _both(better, named) != named:
            caution(SamplingWarning(**message))
    return Guard(light.edge_power, step, light.discarded + beyond_share(light))


def _message(light: GridLight, names: tuple[str, ...], better: Grid, band: float) -> dict[str, Any]:
    where = " ".join(names) or "source"
    if _pattern(light) > 1:
        return {
            "rule": "from sample to sample a pattern turns light by less than half a wave",
            "got": f"{where}: a pattern before it is {_pattern(light)} times too fine for its samples",
            "fix": f"grid=fa.Grid(samples={better.samples}, window={better.window:.4g})",
        }
    got = f"{light.edge_power:.2%} of the power near the edge of the window, {light.discarded:.2%} cut off by the band"
    if light.band_power > band:
        got = f"{light.band_power:.1e} of the power near the highest frequency of the samples; {got}"
    return {
        "rule": "the samples must hold the light, with dark room around it and fine enough for its edges",
        "got": f"{where}: {got} limit",
        "fix": f"grid=fa.Grid(samples={better.samples}, window={better.window:.4g})",
    }


def _better(light: GridLight, grid: Grid, band: float) -> Grid:
    """Samples at the source, twice as wide or twice as fine as they are.

    Behind an odd number of single transforms a window ends at the highest frequency of the source, and its pitch goes
    with the source's window: what is too narrow there asks for finer samples here, what is too coarse for a wider
    window.
    """
    narrow, coarse = zip(*(_over(rims, band) for rims in (light.rims, light.turned_rims)), strict=True)
    wide = max(2 ** (narrow[0] or coarse[1]), light.turned_rims.pattern)
    fine = max(2 ** (coarse[0] or narrow[1]), light.rims.pattern)
    return Grid(grid.samples * wide * fine, grid.window * wide)


def _pattern(light: GridLight) -> int:
    return max(light.rims.pattern, light.turned_rims.pattern)


def _both(one: Grid, other: Grid | None) -> Grid:
    """The grid as wide and as fine as each of two: one of them, if it is both."""
    if other is None or (one.window >= other.window and one.pitch <= other.pitch):
        return one
    if other.window >= one.window and other.pitch <= one.pitch:
        return other
    window = max(one.window, other.window)
    return Grid(2 * math.ceil(window / min(one.pitch, other.pitch) / 2), window)


def _over(rims: Rims, band: float) -> tuple[bool, bool]:
    """Whether a window was too narrow, and whether its samples were too coarse."""
    return max(rims.edge, rims.cut) > EDGE_WARN, rims.band > band
