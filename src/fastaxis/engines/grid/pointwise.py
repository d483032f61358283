"""Laws that act in one plane, sample by sample."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.light import GridLight
from fastaxis.laws import AxisLaw, Flip, ScalarLaw
from fastaxis.maths import NUMBERS, Pattern
from fastaxis.plan import JonesStep
from fastaxis.plan.merge import split_lens

__all__ = ["flipped", "past_axis", "past_matrix", "past_scalar"]

# A matrix whose determinant is this small against its square norm passes one state only (1e-15: its rounding).
RANK_ONE = 1e-15


def past_matrix(light: GridLight, law: JonesStep) -> GridLight:
    """After a uniform Jones matrix. One that passes a single state leaves one scalar field to carry."""
    matrix = np.array(law.matrix, dtype=complex)
    if light.jones is not None:
        return replace(light, jones=matrix @ light.jones)
    left, strengths, right = np.linalg.svd(matrix)
    if strengths[1] <= RANK_ONE * strengths[0]:
        samples = np.tensordot(right[:1], light.samples, axes=1)
        return replace(light, samples=samples, jones=left[:, 0] * strengths[0])
    return replace(light, samples=np.tensordot(matrix, light.samples, axes=1))


def _places(light: GridLight, centre: tuple[float, float]) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    return light.x[None, :] - centre[0], light.x[:, None] - centre[1]


def past_axis(light: GridLight, law: AxisLaw) -> GridLight:
    """After a patterned plate or polarizer; from here on (Ex, Ey) differ from place to place."""
    x, y = _places(light, law.centre)
    phi = np.arctan2(y, x) if law.order else 0.0
    if _patterned(law):
        x, y = np.broadcast_arrays(x, y)
    (a, b), (c, d) = law.linear(NUMBERS, phi, x, y)
    if light.jones is not None:
        ex, ey = light.jones
        samples = np.stack([np.broadcast_to(s, light.samples.shape[1:]) for s in (a * ex + b * ey, c * ex + d * ey)])
        return replace(light, samples=samples * light.samples, jones=None)
    ex, ey = light.samples
    return replace(light, samples=np.stack([a * ex + b * ey, c * ex + d * ey]))


def _patterned(law: AxisLaw) -> bool:
    return any(isinstance(v, Pattern) for v in (law.angle, *law.along.values, *law.across.values))


def past_scalar(light: GridLight, law: ScalarLaw) -> GridLight:
    """After a mask, wedge, spiral plate, stop or lens. A centred lens only changes the curvature kept apart."""
    if law.vergence:
        rest, _ = split_lens(law, light.wavelength)
        light = past_scalar(light, rest)
        return replace(light, curvature=light.curvature - law.vergence)
    x, y = _places(light, law.centre)
    if any(isinstance(v, Pattern) for v in law.transmission.values):
        light.samples[...] *= law.transmission.value(NUMBERS, *np.broadcast_arrays(x, y))
    elif law.transmission.values != (1.0, 0.0):
        light.samples[...] *= law.transmission.value(NUMBERS)
    if law.charge:
        light.samples[...] *= NUMBERS.phasor(law.charge * np.arctan2(y, x))
    for place, tilt in zip((x, y), law.tilt, strict=True):
        if tilt:
            light.samples[...] *= np.exp(2j * np.pi / light.wavelength * tilt * place)
    if law.stop is not None:
        light.samples[...] *= _coverage(law.stop.depth(x, y), light.pitch)
        return replace(light, periodic=False)
    return light


def _coverage(depth: Any, pitch: float) -> NDArray[np.float64]:
    """Share of each sample's square inside the clear area, to first order in the edge's distance from its centre.

    Cut to whole samples the edge is a stair whose area is wrong by a random half sample per step; the share keeps
    the area right and the field converges faster.
    """
    return np.asarray(np.clip(depth / pitch + 0.5, 0.0, 1.0))


def flipped(light: GridLight, law: Flip) -> GridLight:
    """Places reversed along x or y: the order of columns or rows, exactly."""
    samples = light.samples[:, :, ::-1] if law.axis == "x" else light.samples[:, ::-1]
    return replace(light, samples=np.ascontiguousarray(samples))
