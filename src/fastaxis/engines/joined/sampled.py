"""Modes brought to the samples of the one arm that has samples, and read with it."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace
from importlib import import_module
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.light import Raster
from fastaxis.plan.spread import Spread

__all__ = ["on_samples"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

SAME_STATE = 1e-13  # of two unit vectors: a hundred roundings each


def on_samples(
    arms: Sequence[Any], engines: Sequence[str], mixtures: Complexes, spreads: Sequence[Spread], raster: Raster
) -> Reals | None:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx); None where modes do not fit on the samples.

    A mode fits if its light ends inside the window and its band inside that of the samples, both to the last digit:
    then its samples say all about it, and the sum is read as the arm alone would be.

    Parameters
    ----------
    arms, engines, spreads : of each arm.
    mixtures : rows of numbers, one an arm; the powers of their sums add.
    raster : the camera.
    """
    if sorted(set(engines)) != ["grid", "modes"] or engines.count("grid") > 1:
        return None
    place = list(engines).index("grid")
    others = [i for i in range(len(arms)) if i != place]
    if not all(_fits(spreads[i], arms[place].places, arms[place].wavelength) for i in others):
        return None
    bands = [_waves(spreads[i], arms[place].places, arms[place].wavelength) for i in others]
    pictures = (
        _summed(arms[place], numbers[place], [arms[i] for i in others], numbers[others], max(bands)).stokes_on(raster)
        for numbers in mixtures
    )
    return np.asarray(sum(pictures))


def _fits(spread: Spread, places: tuple[int, float, float], wavelength: float) -> bool:
    count, pitch, _ = places
    return spread.half_window <= count * pitch / 2 and _waves(spread, places, wavelength) <= count


def _waves(spread: Spread, places: tuple[int, float, float], wavelength: float) -> int:
    """Waves along a side of the window that hold a mode, relative to the front of the samples."""
    count, pitch, curvature = places
    (x, y), (tx, ty) = spread.offset, spread.slope
    leaning = max(abs(tx - curvature * x), abs(ty - curvature * y))
    angle = math.hypot(spread.angle, (spread.curvature - curvature) * spread.size)
    return 2 * math.ceil((leaning + spread.radii * 2 * angle) / wavelength * count * pitch) + 2


def _summed(arm: Any, number: complex, modes: Sequence[Any], numbers: Complexes, band: int) -> Any:
    """The sampled arm and the modes, each times its number, as one sampled field."""
    light, grid = arm.light, import_module("fastaxis.engines.grid")
    total = import_module("fastaxis.engines.modes").combined(modes, numbers)
    scalar, x = total.scalar(0.0), light.x
    share = None if scalar is None or light.jones is None else _share(scalar.state, light.jones)
    if share is not None:
        samples, jones = number * light.samples + share * scalar.on(x, x, light.curvature), light.jones
    else:
        chirp = np.exp(-1j * math.pi * light.curvature / light.wavelength * x**2)
        samples, jones = number * light.components() + total.at(x, x) * (chirp * chirp[:, np.newaxis]), None
    samples = samples.astype(light.samples.dtype, copy=False)
    spread = light.jones is not None and jones is None
    steep = light.steep_past(number * (light.jones[:, np.newaxis] if spread else np.eye(len(light.samples))))
    filled = None if light.filled is None else max(light.filled, band)
    sum_of_all = replace(light, samples=samples, jones=jones, filled=filled, beyond=0.0, steep=steep)
    # What edges scatter is the same light, as a share of more or of less.
    ours = abs(number) ** 2 * light.power * light.beyond / (1 + light.beyond)
    lost = ours / sum_of_all.power if ours else 0.0
    return grid.GridField(replace(sum_of_all, beyond=lost), arm.guard, arm.grid)


def _share(state: Complexes, jones: Complexes) -> complex | None:
    """A state as a multiple of another; None if it is none."""
    share = complex(np.vdot(jones, state) / np.vdot(jones, jones).real)
    return share if np.linalg.norm(state - share * jones) <= SAME_STATE * np.linalg.norm(state) else None
