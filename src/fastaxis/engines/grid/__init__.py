"""The grid engine: square samples, two kinds of travel, everything else sample by sample."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from typing import cast

from fastaxis.engines.grid.combining import combined, steep_added
from fastaxis.engines.grid.far import FarField, arriving
from fastaxis.engines.grid.guard import check, edge_watched, phase_step
from fastaxis.engines.grid.landing import KEPT
from fastaxis.engines.grid.light import GridLight
from fastaxis.engines.grid.patterns import finer_wanted
from fastaxis.engines.grid.pointwise import flipped, passes_one_state, past_axis, past_matrix, past_scalar
from fastaxis.engines.grid.reading import GridField
from fastaxis.engines.grid.scaled import travel_scaled
from fastaxis.engines.grid.settling import leaves, settled
from fastaxis.engines.grid.single import travel_single
from fastaxis.engines.grid.source import start
from fastaxis.engines.grid.turning import turned
from fastaxis.laws import AxisLaw, Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.plan import Branch, JonesStep
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.sampling import Hop, Sampling
from fastaxis.plan.steps import StepLaw

__all__ = ["FarField", "GridField", "begun", "combined", "continued", "finished", "run", "steep_added"]


def run(branch: Branch) -> GridField | FarField:
    """The light of a branch at its target, on the samples its plan chose."""
    return finished(continued(begun(branch), branch, 0, len(branch.steps)), branch)


def begun(branch: Branch) -> GridLight:
    """The light of a branch at its source."""
    sampling = cast("Sampling", branch.sampling)
    return replace(start(branch, sampling), turned=sampling.turned)


def continued(light: GridLight, branch: Branch, first: int, end: int) -> GridLight:
    """Light before step ``first`` of a branch taken to before step ``end``; may use up the samples it is given.

    A single transform is put off until something asks for the samples behind it; what looks at the light may not.
    """
    steps, sampling = branch.steps, cast("Sampling", branch.sampling)
    last = max((i for i, step in enumerate(steps) if isinstance(step.law, TravelLaw | Turn)), default=-1)
    for index, law, after in _visits([as_matrix(step) or step.law for step in steps[:end]], first):
        hop = sampling.hop(index)
        if light.ahead and not isinstance(law, JonesStep | Flip):  # these commute with travel
            light = edge_watched(travel_single(replace(light.filled_up(), ahead=None), light.ahead))
            light = light.referred(sampling.planes[index].kept)
        if isinstance(law, TravelLaw | Turn):
            light = settled(light)
        elif index > last and leaves(light, law):
            light = replace(light, singular=None)  # it goes no further, and in its plane point values are right
        if isinstance(law, TravelLaw) and hop and hop.kernel == "single" and light.full <= KEPT:
            light = replace(light, ahead=law)
        else:
            light = _past(light, law, hop, after, last=index == last)
            if hop and hop.kernel == "single" and index < last:
                light = light.referred(sampling.planes[index + 1].kept)
    return light


def _visits(laws: list[StepLaw], first: int) -> Iterator[tuple[int, StepLaw, JonesStep | None]]:
    """Laws from the first one on with their numbers; a plate takes the matrix behind it along, in one go."""
    index = first
    while index < len(laws):
        law, after = laws[index], laws[index + 1] if index + 1 < len(laws) else None
        together = isinstance(law, AxisLaw) and isinstance(after, JonesStep) and not passes_one_state(after)
        yield index, law, cast("JonesStep", after) if together else None
        index += 1 + together


def finished(light: GridLight, branch: Branch) -> GridField | FarField:
    """Light at the target of a branch, looked over."""
    names, sampling = branch.steps[-1].names if branch.steps else (), cast("Sampling", branch.sampling)
    if light.ahead:
        return arriving(light, names, sampling)
    light = replace(light.filled_up(), singular=None)
    return GridField(light, check(light, phase_step(light), names, sampling), sampling.grid)


def _past(light: GridLight, law: StepLaw, hop: Hop | None, after: JonesStep | None, *, last: bool) -> GridLight:
    if isinstance(law, TravelLaw):
        return _travelled(light.filled_up(), law, cast("Hop", hop), last=last)
    if isinstance(law, ScalarLaw):
        return past_scalar(light.met(pattern=finer_wanted(light, law)), law)
    if isinstance(law, Flip):
        return flipped(settled(light), law)
    if isinstance(law, Turn):
        return edge_watched(turned(light.filled_up(), law))
    if isinstance(law, AxisLaw):
        return past_axis(light.met(pattern=finer_wanted(light, law)), law, after)
    return past_matrix(light, cast("JonesStep", law))


def _travelled(light: GridLight, travel: TravelLaw, hop: Hop, *, last: bool) -> GridLight:
    """After travel; only behind the last one is it of use to know how much of the band is filled."""
    if hop.kernel == "single":
        return edge_watched(travel_single(light, travel, measured=last))
    return edge_watched(travel_scaled(light.referred(hop.curvature), travel, measured=last))
