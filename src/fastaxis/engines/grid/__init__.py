"""The grid engine: square samples, two kinds of travel, everything else sample by sample."""

from __future__ import annotations

from typing import cast

from fastaxis.engines.grid.guard import check, edge_watched
from fastaxis.engines.grid.light import GridLight
from fastaxis.engines.grid.pointwise import flipped, past_axis, past_matrix, past_scalar
from fastaxis.engines.grid.reading import GridField
from fastaxis.engines.grid.scaled import travel_scaled
from fastaxis.engines.grid.single import travel_single
from fastaxis.engines.grid.source import start
from fastaxis.laws import AxisLaw, Flip, ScalarLaw, TravelLaw
from fastaxis.plan import Branch, JonesStep
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.sampling import Hop, Sampling
from fastaxis.plan.steps import StepLaw

__all__ = ["GridField", "run"]


def run(branch: Branch) -> GridField:
    """The light of a branch at its target, on the samples its plan chose."""
    sampling = cast("Sampling", branch.sampling)
    light = start(branch, sampling)
    for index, step in enumerate(branch.steps):
        light = _past(light, as_matrix(step) or step.law, sampling.hop(index))
    names = branch.steps[-1].names if branch.steps else ()
    return GridField(light, check(light, names, sampling.grid))


def _past(light: GridLight, law: StepLaw, hop: Hop | None) -> GridLight:
    if isinstance(law, TravelLaw):
        return _travelled(light, law, cast("Hop", hop))
    if isinstance(law, ScalarLaw):
        return past_scalar(light, law)
    if isinstance(law, Flip):
        return flipped(light, law)
    return past_axis(light, law) if isinstance(law, AxisLaw) else past_matrix(light, cast("JonesStep", law))


def _travelled(light: GridLight, travel: TravelLaw, hop: Hop) -> GridLight:
    travel_by = travel_scaled if hop.kernel == "scaled" else travel_single
    return edge_watched(travel_by(light.referred(hop.curvature), travel))
