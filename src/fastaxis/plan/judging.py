"""Whether a sampling carries the light, and the one grid that does where it does not."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace

from fastaxis.errors import SamplingError, SamplingWarning, caution
from fastaxis.laws import ScalarLaw, Stop
from fastaxis.plan.fineness import Need, needs
from fastaxis.plan.refining import LARGE, SLACK, Asked, refined
from fastaxis.plan.sampling import Plane, Sampling
from fastaxis.plan.spread import clear_width, reach
from fastaxis.plan.steps import Steps

__all__ = ["RIM", "cut", "judged"]

# Samples in the clear width of a stop: pictures then hold all but 1 % of the power, and powers, of second order in the
# pitch, are right to 1e-3 even beside a dark line. Six leave 1 % in powers, two 6 %.
RIM, WARN_RIM, REFUSE_RIM = 1 / (6 * 0.01), 6, 2
# Margins are in units of a window that holds the beam to its last digit. At 0.55 of it a Gaussian field has fallen
# to exp(-(3.3)^2) = 2e-5 at the edge; at 0.3, to 4 %: the answer would be a different beam.
WARN, REFUSE = 0.55, 0.3
# A rough beam's window holds three radii; one radius is where its edge itself lies.
WARN_ROUGH, REFUSE_ROUGH = 0.45, 0.334


@dataclass(frozen=True)
class Complaint:
    """What is wrong with a sampling.

    Parameters
    ----------
    got, rule : of the message.
    refused : whether the light cannot be carried at all.
    anew : whether the window must be chosen anew; else finer samples will do.
    """

    got: str
    rule: str
    refused: bool
    anew: bool = False


def judged(
    sampling: Sampling,
    steps: Steps,
    wavelength: float,
    anew: Callable[[], Sampling],
    again: Callable[[int, float], Sampling],
    *,
    seen: bool = True,
) -> Sampling:
    """The sampling, cautioned of or refused where it does not carry the light; one grid is named for all that is wrong.

    Parameters
    ----------
    anew : the best sampling of any size.
    again : the sampling for a number of samples and a window.
    seen : whether the light makes a picture, which asks more of axes and edges than its power does.
    """
    worst = sampling.worst
    if worst.window == 0:
        where = _where(sampling, worst, steps)
        raise SamplingError(
            "a plane wave has no finite focus; a stop gives it one",
            got=f"plane wave {where}",
            fix='fa.Aperture(radius=2*mm, name="stop")',
        )
    needed = needs(steps, sampling.planes, wavelength) if seen else []
    found = [*_of_margins(sampling, steps, wavelength), *_of_stops(sampling, steps)]
    found += _of_needs(sampling, steps, needed)
    if not found:
        return sampling
    first = next((one for one in found if one.refused), found[0])
    start = anew() if any(one.anew for one in found) else sampling
    better = refined(start, again, lambda some: _asked(some, steps, wavelength, seen=seen), LARGE[-1])
    better = better or (None if needed else start)
    if better is None:
        fix = f"fa.FreeSpace({_far_enough(sampling, needed):.3g})"
    else:
        fix = f"grid=fa.Grid(samples={better.grid.samples}, window={better.grid.window:.4g})"
    if first.refused:
        raise SamplingError(first.rule, got=first.got, fix=fix)
    caution(SamplingWarning(first.rule, got=first.got, fix=fix))
    return replace(sampling, named=better.grid if better else None)


def _where(sampling: Sampling, plane: Plane, steps: Steps) -> str:
    index = sampling.planes.index(plane)
    return "at the source" if index == 0 else f"after {', '.join(steps[index - 1].names)}"


def _of_margins(sampling: Sampling, steps: Steps, wavelength: float) -> Iterator[Complaint]:
    """Of windows too narrow and bands too low for the beam as a whole."""
    worst = sampling.worst
    rough, where = worst.spread.rough, _where(sampling, worst, steps)
    if worst.margin >= (WARN_ROUGH if rough else WARN):
        return
    if worst.width_margin <= worst.pitch_margin:
        got = f"window {worst.window * 1e3:.3g} mm {where}"
        rule = f"the light there needs {2e3 * worst.spread.half_window:.3g} mm"
    else:
        needed = 1 / (2 * worst.spread.half_band(wavelength))
        got, rule = f"pitch {worst.pitch * 1e6:.3g} um {where}", f"the light there needs {needed * 1e6:.3g} um"
    yield Complaint(got, rule, worst.margin < (REFUSE_ROUGH if rough else REFUSE), anew=True)


def cut(sampling: Sampling, steps: Steps) -> Iterator[tuple[int, Plane, Stop, float]]:
    """The stops of some width that cut the light: step, plane, clear area, distance of its centre from the axis [m]."""
    for index, (plane, step) in enumerate(zip(sampling.planes[1:], steps, strict=False)):
        law = step.law
        if isinstance(law, ScalarLaw) and law.stop is not None and plane.spread.rough and reach(law.stop):
            yield index, plane, law.stop, max(map(abs, law.centre))


def _of_stops(sampling: Sampling, steps: Steps) -> Iterator[Complaint]:
    """Of a stop that is drawn on too few samples for its power."""
    drawn = [(clear_width(stop) / plane.pitch, index, plane) for index, plane, stop, _ in cut(sampling, steps)]
    fineness, index, plane = min(drawn, key=lambda one: one[0], default=(math.inf, 0, sampling.worst))
    if fineness >= WARN_RIM:
        return
    yield Complaint(
        f"pitch {plane.pitch * 1e6:.3g} um at {', '.join(steps[index].names)}",
        f"the stop there needs {fineness * plane.pitch / RIM * 1e6:.3g} um, for a power right to 1e-3",
        fineness < REFUSE_RIM,
    )


def _of_needs(sampling: Sampling, steps: Steps, needed: list[Need]) -> Iterator[Complaint]:
    """Of an axis or an edge so near the target that what it does to the light is finer than the samples."""
    over = [(Asked(need.step, need.pitch).over(sampling), need) for need in needed]
    most, need = max(over, key=lambda one: one[0], default=(0.0, None))
    if need is None or most <= SLACK:
        return
    names = ", ".join(steps[need.step].names)
    yield Complaint(
        f"pitch {sampling.planes[need.step + 1].pitch * 1e6:.3g} um at {names}",
        f"a picture {need.distance * 1e3:.3g} mm behind it, right to 1e-3 of its peak, needs {need.pitch * 1e6:.3g} um",
        refused=False,
    )


def _asked(sampling: Sampling, steps: Steps, wavelength: float, *, seen: bool) -> Iterator[Asked]:
    for index, _, stop, _ in cut(sampling, steps):
        yield Asked(index, clear_width(stop) / RIM)
    for need in needs(steps, sampling.planes, wavelength) if seen else ():
        yield Asked(need.step, need.pitch)


def _far_enough(sampling: Sampling, needed: list[Need]) -> float:
    """Distance [m] behind all axes and edges from which on the largest grid is fine enough."""
    spare = sampling.grid.samples / LARGE[-1]
    return max(need.distance * (Asked(need.step, need.pitch).over(sampling) * spare) ** 2 for need in needed)
