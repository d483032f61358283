"""Light made ready to leave the plane of a singular axis."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.lattice_sums import reach
from fastaxis.engines.grid.light import GridLight, Samples, inner, stokes_sum
from fastaxis.engines.grid.singular import Singular, Turns

__all__ = ["noted", "settled", "watched"]

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
    before = _sums(block)
    block[...] = known.values(light.count)
    return _scattering(light, before - _sums(block))


def _sums(samples: Samples) -> NDArray[np.float64]:
    """S0 .. S3 of some samples; of one component S0 alone."""
    wide = samples.astype(np.complex128, copy=False)
    return stokes_sum(wide) if len(wide) == 2 else np.array([inner(wide, wide).real])


def _scattering(light: GridLight, lost: NDArray[np.float64]) -> GridLight:
    """The light with what its samples have just lost, S0 or S0 .. S3, counted beyond their band."""
    kept = inner(light.samples, light.samples).real
    if not kept:
        return light
    beyond = lost + light.beyond * (kept + lost[0]) * _state(light) if light.beyond else lost
    state = beyond[1:] / beyond[0] if len(beyond) == 4 and beyond[0] else None
    return replace(light, beyond=float(beyond[0] / kept), beyond_state=state)


def _state(light: GridLight) -> NDArray[np.float64]:
    """(1, S1/S0 ...) of light beyond the band."""
    if light.beyond_state is not None:
        return np.append(1, light.beyond_state)
    sums = _sums(light.samples)
    return np.asarray(sums / sums[0])
