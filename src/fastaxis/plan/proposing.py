"""The automatic grid: the fewest samples and the window that hold the light at every plane of a train."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import replace
from functools import partial
from itertools import takewhile

from fastaxis.errors import ParameterError
from fastaxis.laws import AxisLaw, CircularLaw, ScalarLaw, TravelLaw
from fastaxis.plan.fineness import held, known_tails, needs
from fastaxis.plan.grid import Grid
from fastaxis.plan.judging import RIM, cut, judged
from fastaxis.plan.refining import LARGE, LENGTHS, SLACK, Asked, refined
from fastaxis.plan.sampling import Sampling, follow
from fastaxis.plan.spread import ROUGH_RADII, Spread, clear_width, closed, reach
from fastaxis.plan.steps import JonesStep, Steps

__all__ = ["propose", "sampling_for"]

FINEST = 2048  # samples taken unasked where only the pitch at an axis or an edge asks for more
ROUGH_START = 1024


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
    for _, plane, stop, off in cut(sampling, steps):
        held = plane.window / 2 / (off + 3 * reach(stop))
        margin = min(margin, held, clear_width(stop) / (RIM * plane.pitch))
    return margin


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


def _fine(sampling: Sampling, steps: Steps, spread: Spread, wavelength: float) -> Sampling:
    """A proposed sampling with finer samples if an axis or an edge asks for them; as fine as FINEST if for more."""
    again, is_open = partial(_planes, steps, spread, wavelength=wavelength), _open(steps, spread)

    def asked(found: Sampling) -> Iterator[Asked]:
        yield from (Asked(need.step, need.pitch) for need in needs(steps, found.planes, wavelength))
        yield from (Asked(step, pitch) for step, pitch in held(steps, found.planes, wavelength))

    most = max(FINEST, sampling.grid.samples)
    better = refined(sampling, again, asked, most, fits=lambda found: _fits(found, steps) >= 1)
    if better is None and not is_open:
        better = _searched(sampling, steps, spread, wavelength, asked=asked, most=most)
    if better is None:
        better = again(most, _open_window(steps, spread, most, wavelength) if is_open else sampling.grid.window)
    return better if better.worst.margin >= min(sampling.worst.margin, 1.0) else sampling


def _searched(
    sampling: Sampling,
    steps: Steps,
    spread: Spread,
    wavelength: float,
    *,
    asked: Callable[[Sampling], Iterator[Asked]],
    most: int,
) -> Sampling | None:
    """The fewest samples, on any window, that hold the light and are as fine as all steps ask for; None if too many.

    Behind a single transform a wider window makes the pitch smaller, so that the smallest window is far from the best.
    """
    for samples in LENGTHS:
        if sampling.grid.samples <= samples <= most:
            for window in _windows(steps, spread):
                found = _planes(steps, spread, samples, window, wavelength)
                if _fits(found, steps) >= 1 and all(one.over(found) <= SLACK for one in asked(found)):
                    return found
    return None


def sampling_for(steps: Steps, spread: Spread, wavelength: float, grid: Grid | None, *, seen: bool = True) -> Sampling:
    """The sampling to use: as set by hand, or the automatic one; checked either way.

    Parameters
    ----------
    seen : whether the light makes a picture; its power asks for less.

    Raises
    ------
    ParameterError : something that is no Grid.
    SamplingError : the grid cannot carry the light; the message names one that can.

    Warns
    -----
    SamplingWarning : the grid is tight, or too coarse at a singular axis or an edge; errors of 1e-4 to 1e-3 of the peak
        may show.
    """
    if grid is not None and not isinstance(grid, Grid):
        raise ParameterError(
            "a grid set by hand is a Grid", got=f"grid = {grid!r:.60}", fix="grid=fa.Grid(samples=1024, window=10*mm)"
        )
    if grid is None:
        sampling = propose(steps, spread, wavelength)
        sampling = _fine(sampling, steps, spread, wavelength) if seen else sampling
    else:
        sampling = replace(_planes(steps, spread, grid.samples, grid.window, wavelength), chosen="by hand")
    return judged(
        replace(sampling, known=known_tails(steps, spread)),
        steps,
        wavelength,
        anew=partial(propose, steps, spread, wavelength, most=LARGE[-1]),
        again=partial(_planes, steps, spread, wavelength=wavelength),
        seen=seen,
    )
