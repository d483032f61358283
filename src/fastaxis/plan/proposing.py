"""The automatic grid: the fewest samples and the window that hold the light at every plane of a train."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import replace
from itertools import takewhile
from typing import Any

from fastaxis.errors import ParameterError, SamplingError, SamplingWarning, caution
from fastaxis.laws import AxisLaw, CircularLaw, ScalarLaw, TravelLaw
from fastaxis.plan.grid import Grid
from fastaxis.plan.sampling import Plane, Sampling, follow
from fastaxis.plan.spread import ROUGH_RADII, Spread, clear_width, closed, reach
from fastaxis.plan.steps import JonesStep, Steps

__all__ = ["propose", "sampling_for"]

# Lengths with small prime factors, for the transform; smooth beams start at the first, rough ones at 1024.
LENGTHS = (256, 320, 384, 512, 640, 768, 1024, 1280, 1536, 2048, 3072, 4096)
LARGE = (6144, 8192, 12288, 16384)  # not taken unasked; named where nothing smaller will do
ROUGH_START = 1024
# Samples in the clear width of a stop: pictures then hold all but 1 % of the power, and powers, of second order in the
# pitch, are right to 1e-3 even beside a dark line. Six leave 1 % in powers, two 6 %.
RIM, WARN_RIM, REFUSE_RIM = 1 / (6 * 0.01), 6, 2
# Margins are in units of a window that holds the beam to its last digit. At 0.55 of it a Gaussian field has fallen
# to exp(-(3.3)^2) = 2e-5 at the edge; at 0.3, to 4 %: the answer would be a different beam.
WARN, REFUSE = 0.55, 0.3
# A rough beam's window holds three radii; one radius is where its edge itself lies.
WARN_ROUGH, REFUSE_ROUGH = 0.45, 0.334


def _planes(steps: Steps, spread: Spread, samples: int, window: float, wavelength: float) -> Sampling:
    grid = Grid(samples, window)
    return Sampling(
        grid, follow(steps, _bounded(steps, spread, window, wavelength), grid, wavelength), _open(steps, spread)
    )


def _first_stop(steps: Steps) -> ScalarLaw | None:
    return next((s.law for s in steps if isinstance(s.law, ScalarLaw) and s.law.stop is not None), None)


def _open(steps: Steps, spread: Spread) -> bool:
    """Whether a plane wave meets an edge that does not bound it."""
    first = _first_stop(steps)
    return spread.infinite and first is not None and first.stop is not None and not closed(first.stop)


def _bounded(steps: Steps, spread: Spread, window: float, wavelength: float) -> Spread:
    """A plane wave that must be faded out is as wide as the faded window, and as flat."""
    if not _open(steps, spread):
        return _stopped_at_once(steps, spread, wavelength)
    size = window / (4 * ROUGH_RADII)
    return replace(spread, size=size, angle=wavelength / (2 * math.pi * size), rough=True)


def _stopped_at_once(steps: Steps, spread: Spread, wavelength: float) -> Spread:
    """What the stops before the first travel leave: light beyond them is never needed."""
    if spread.whole or spread.infinite:
        return spread
    for step in takewhile(lambda step: isinstance(step.law, AxisLaw | CircularLaw | ScalarLaw | JonesStep), steps):
        if isinstance(step.law, ScalarLaw) and step.law.stop is not None:
            spread = spread.clipped(step.law.stop, step.law.centre, wavelength)
    return spread


def _lengths(steps: Steps, spread: Spread) -> list[float]:
    """Transverse lengths that occur: beam sizes, radii of stops, distances off the axis."""
    found = [] if spread.infinite else [spread.half_window]
    for step in steps:
        law = step.law
        if isinstance(law, ScalarLaw) and law.stop is not None:
            found.append(reach(law.stop) + max(map(abs, law.centre)))
    return [length for length in found if length > 0] or [1e-3]


def _windows(steps: Steps, spread: Spread) -> list[float]:
    """Windows to try, from twice the smallest length to 60 times the largest, 8 % apart."""
    lengths = _lengths(steps, spread)
    low, high = 2 * min(lengths), 60 * max(lengths)
    count = math.ceil(math.log(high / low) / math.log(1.08))
    return [low * (high / low) ** (i / count) for i in range(count + 1)]


def _open_window(steps: Steps, spread: Spread, samples: int, wavelength: float) -> float:
    """Window for a plane wave past an open edge, faded out at its own edge.

    Wide enough for every stop, and for each travel so wide that the scaled spectrum is the better kernel: twice the
    critical wavelength B samples = window^2. Fringes of an edge are then sqrt(samples)/2 samples wide.
    """
    window = 20 * max(_lengths(steps, spread)) if _first_reach(steps) else 0.0
    for step in steps:
        law = step.law
        if isinstance(law, TravelLaw):
            near = law.a + law.b * spread.curvature
            distance = abs(law.b / near) if near else 0.0
            window = max(window, math.sqrt(2 * samples * wavelength * distance))
        spread = spread.past(law, wavelength) if isinstance(law, TravelLaw) else spread
    return window or 10e-3


def _first_reach(steps: Steps) -> float:
    first = _first_stop(steps)
    return reach(first.stop) if first is not None and first.stop is not None else 0.0


def _fits(sampling: Sampling, steps: Steps) -> float:
    """The margin of a sampling: room and band at every plane, and stops both held and drawn finely enough."""
    margin = min(min(plane.margin, plane.band) for plane in sampling.planes)
    for plane, law in _cut(sampling, steps):
        held = plane.window / 2 / (max(map(abs, law.centre)) + 3 * reach(law.stop))
        margin = min(margin, held, clear_width(law.stop) / (RIM * plane.pitch))
    return margin


def _cut(sampling: Sampling, steps: Steps) -> Iterator[tuple[Plane, Any]]:
    """The stops of some width that cut the light, each with its plane."""
    for plane, step in zip(sampling.planes[1:], steps, strict=False):
        law = step.law
        if isinstance(law, ScalarLaw) and law.stop is not None and plane.spread.rough and reach(law.stop):
            yield plane, law


def propose(steps: Steps, spread: Spread, wavelength: float, *, most: int = LENGTHS[-1]) -> Sampling:
    """The fewest samples, and for them the best window, that hold the light at every plane."""
    if _open(steps, spread):
        window = _open_window(steps, spread, ROUGH_START, wavelength)
        return _planes(steps, spread, ROUGH_START, window, wavelength)
    windows = _windows(steps, spread)
    rough = spread.infinite or _planes(steps, spread, 256, windows[-1], wavelength).planes[-1].spread.rough
    for samples in LENGTHS + LARGE:
        if (rough and samples < ROUGH_START) or samples > most:
            continue
        tried = [_planes(steps, spread, samples, window, wavelength) for window in windows]
        margins = [_fits(sampling, steps) for sampling in tried]
        if rough and max(margins) >= 1:
            # Edges want fine pitch: the smallest window that holds everything.
            return next(s for s, margin in zip(tried, margins, strict=True) if margin >= 1)
        best = tried[margins.index(max(margins))]
        if max(margins) >= 1:
            return best
    return best


def sampling_for(steps: Steps, spread: Spread, wavelength: float, grid: Grid | None) -> Sampling:
    """The sampling to use: as set by hand, or the automatic one; checked either way.

    Raises
    ------
    ParameterError : something that is no Grid.
    SamplingError : the grid cannot carry the light; the message names one that can.

    Warns
    -----
    SamplingWarning : the grid is tight; errors of about 1e-4 of the peak may show.
    """
    if grid is not None and not isinstance(grid, Grid):
        raise ParameterError(
            "a grid set by hand is a Grid", got=f"grid = {grid!r:.60}", fix="grid=fa.Grid(samples=1024, window=10*mm)"
        )
    if grid is None:
        sampling = propose(steps, spread, wavelength)
    else:
        sampling = replace(_planes(steps, spread, grid.samples, grid.window, wavelength), chosen="by hand")
    _check_stops(sampling, steps)
    worst = sampling.worst
    rough = worst.spread.rough
    if worst.margin >= (WARN_ROUGH if rough else WARN):
        return sampling
    message = _message(sampling, steps, spread, wavelength)
    if worst.margin < (REFUSE_ROUGH if rough else REFUSE):
        raise SamplingError(**message)
    caution(SamplingWarning(**message))
    return sampling


def _check_stops(sampling: Sampling, steps: Steps) -> None:
    """A SamplingError or a warning for a stop that is drawn on too few samples."""
    drawn = [(clear_width(law.stop) / plane.pitch, plane, law) for plane, law in _cut(sampling, steps)]
    if not drawn or min(drawn, key=lambda one: one[0])[0] >= WARN_RIM:
        return
    fineness, plane, law = min(drawn, key=lambda one: one[0])
    where = next(", ".join(step.names) for step in steps if step.law is law)
    grid = sampling.grid
    samples = 2 * math.ceil(grid.samples * RIM / fineness / 2)
    message = {
        "rule": f"the stop there needs {clear_width(law.stop) / RIM * 1e6:.3g} um, for a power right to 1e-3",
        "got": f"pitch {plane.pitch * 1e6:.3g} um at {where}",
        "fix": f"grid=fa.Grid(samples={samples}, window={grid.window:.4g})",
    }
    if fineness < REFUSE_RIM:
        raise SamplingError(**message)
    caution(SamplingWarning(**message))


def _message(sampling: Sampling, steps: Steps, spread: Spread, wavelength: float) -> dict[str, str]:
    worst = sampling.worst
    index = sampling.planes.index(worst)
    where = "at the source" if index == 0 else f"after {', '.join(steps[index - 1].names)}"
    if worst.window == 0:
        return {
            "rule": "a plane wave has no finite focus; a stop gives it one",
            "got": f"plane wave {where}",
            "fix": 'fa.Aperture(radius=2*mm, name="stop")',
        }
    if worst.width_margin <= worst.pitch_margin:
        got = f"window {worst.window * 1e3:.3g} mm {where}"
        rule = f"the light there needs {2e3 * worst.spread.half_window:.3g} mm"
    else:
        needed = 1 / (2 * worst.spread.half_band(wavelength))
        got, rule = f"pitch {worst.pitch * 1e6:.3g} um {where}", f"the light there needs {needed * 1e6:.3g} um"
    better = propose(steps, spread, wavelength, most=LARGE[-1]).grid
    fix = f"grid=fa.Grid(samples={better.samples}, window={better.window:.4g})"
    return {"rule": rule, "got": got, "fix": fix}
