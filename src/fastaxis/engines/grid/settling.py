"""Light made ready to leave the plane of a singular axis."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np

from fastaxis.engines.grid.lattice_sums import reach
from fastaxis.engines.grid.light import GridLight, Steep
from fastaxis.engines.grid.singular import Singular, Turns
from fastaxis.laws import AxisLaw, ScalarLaw
from fastaxis.maths import Pattern
from fastaxis.plan import JonesStep
from fastaxis.plan.steps import StepLaw

__all__ = ["leaves", "noted", "patterned", "settled", "watched"]

ROOM = 2.0  # reaches of the first part that its block holds: parts in contact add their charges


def watched(light: GridLight, centre: tuple[float, float], charge: int) -> GridLight:
    """The light with the samples about a singular axis kept, before a part changes them."""
    if light.singular and light.singular.centre == centre:
        return light
    light = settled(light)
    places = [place / light.pitch + (light.count - 1) / 2 for place in centre]
    column, row = (round(place) for place in places)
    known = Singular(
        centre=centre,
        middle=(column, row),
        half=math.ceil(ROOM * reach(charge)),
        offset=(column - places[0], row - places[1]),
        before=light.samples[:, :0, :0],
        turns={0: np.eye(len(light.samples), dtype=complex)},
    )
    block = (slice(None), *known.places(light.count))
    return replace(light, singular=replace(known, before=light.samples[block].copy()))


def leaves(light: GridLight, law: StepLaw) -> bool:
    """Whether a part needs samples done with a singular axis: any but uniform ones and those about that axis."""
    if light.singular is None or isinstance(law, JonesStep):
        return False
    if isinstance(law, ScalarLaw):
        return law != ScalarLaw(charge=int(law.charge), centre=light.singular.centre)
    return not isinstance(law, AxisLaw) or patterned(law) or law.centre != light.singular.centre


def patterned(law: AxisLaw) -> bool:
    """Whether a part changes from place to place by other than its angle about an axis."""
    return any(isinstance(value, Pattern) for value in law.values)


def noted(light: GridLight, turns: Turns) -> GridLight:
    """The light with one more part noted that has just changed the samples; uniform if its only charge is 0."""
    return replace(light, singular=light.singular.then(turns)) if light.singular else light


def settled(light: GridLight) -> GridLight:
    """The light with samples about a singular axis that stand for its waves; changes them in place.

    Their factors are means, of modulus below 1: waves steeper than the samples hold are left out. That power is counted
    beside them.
    """
    known = light.singular
    if known is None:
        return light
    light = replace(light, singular=None)
    block = light.samples[(slice(None), *known.places(light.count))]
    if not block.any():
        return light
    around = light.samples[(slice(None), *known.around(light.count))]
    before = around.copy()
    block[...] = known.values(light.count)
    steep = Steep(before * light.pitch, around * light.pitch, complex(*known.centre), light.pitch)
    return replace(light, steep=(*light.steep, steep))
