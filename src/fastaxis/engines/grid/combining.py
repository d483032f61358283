"""Sums of sampled fields that came to one plane on the same samples."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.light import GridLight
from fastaxis.engines.grid.reading import GridField
from fastaxis.errors import SamplingError

__all__ = ["combined"]

Complexes = NDArray[np.complex128]


def combined(fields: Sequence[GridField], coefficients: Complexes) -> GridField:
    """The sum of coefficient * field, of light at one target.

    Raises
    ------
    SamplingError : the fields are not on the same samples.
    """
    lights = [field.light for field in fields]
    _check_samples(lights)
    return GridField(_sum(lights, coefficients), _worst([field.guard for field in fields]))


def _sum(lights: list[GridLight], coefficients: Complexes) -> GridLight:
    """One scalar field stays one: where the lights share their polarization, or all but their polarization."""
    first, vectors = lights[0], [light.jones for light in lights if light.jones is not None]
    if len(vectors) == len(lights):
        if all(np.array_equal(vectors[0], vector) for vector in vectors):
            return replace(first, samples=_total([light.samples for light in lights], coefficients))
        if all(np.array_equal(first.samples, light.samples) for light in lights):
            return replace(first, jones=_total(vectors, coefficients))
    return replace(first, samples=_total([light.components() for light in lights], coefficients), jones=None)


def _total(arrays: list[Complexes], coefficients: Complexes) -> Complexes:
    out = np.asarray(coefficients[0] * arrays[0])
    for number, array in zip(coefficients[1:], arrays[1:], strict=True):
        if number != 0:
            out += number * array
    return out


def _check_samples(lights: list[GridLight]) -> None:
    places = {(light.count, light.pitch, light.curvature) for light in lights}
    if len(places) > 1:
        pitches = ", ".join(f"{count} of {pitch * 1e6:.6g} um" for count, pitch, _ in sorted(places))
        raise SamplingError(
            "fields are added sample by sample, so they need the same samples",
            got=f"fields on {pitches}",
            fix="grid=fa.Grid(samples=1024, window=10*mm)",
        )


def _worst(guards: list[Guard]) -> Guard:
    return Guard(
        max(guard.edge_power for guard in guards),
        max(guard.phase_step for guard in guards),
        max(guard.discarded for guard in guards),
    )
