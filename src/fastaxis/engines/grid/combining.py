"""Sums of sampled fields that came to one plane on the same samples."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from functools import cached_property
from typing import Any, TypeVar

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.collecting import Collected
from fastaxis.engines.grid.edges import watch_frame
from fastaxis.engines.grid.far import FarField
from fastaxis.engines.grid.light import GridLight, Steep, stokes_sum
from fastaxis.engines.grid.reading import GridField
from fastaxis.errors import SamplingError
from fastaxis.light import Raster

__all__ = ["GridSum", "combined", "steep_added"]

Complexes = NDArray[np.complex128]
Sampled = TypeVar("Sampled", GridLight, Collected)


@dataclass(frozen=True, eq=False)
class GridSum:
    """The sum of coefficient * field, of light at one target.

    Parameters
    ----------
    fields : on the same samples.
    coefficients : one complex number a field.
    """

    fields: Sequence[GridField | FarField]
    coefficients: Complexes

    @property
    def wavelength(self) -> float:
        """Vacuum wavelength [m]."""
        return self.fields[0].wavelength

    @cached_property
    def whole(self) -> GridField | FarField:
        """The sum as sampled light; before the last travel, where all have the same ahead of them."""
        ways = {(light.full, light.pitch, light.curvature, light.ahead) for light in self._carried}
        lights = self._carried if len(ways) == 1 else [field.light for field in self.fields]
        lights = [one.filled_up() for one in lights]
        light = _sum(lights, self.coefficients)
        # Each field fills as many waves as it needs; how many the sum fills is found anew.
        light = replace(light, filled=None, beyond=self._beyond(), steep=_steep(light, lights, self.coefficients))
        return (FarField if light.ahead else GridField)(light, self.guard, self.fields[0].grid)

    @property
    def _carried(self) -> list[GridLight]:
        return [field.carried for field in self.fields]

    def _beyond(self) -> float:
        """What edges scattered, of all fields together; as a share, for light that cancels takes its own along."""
        lights, weights = self._carried, abs(self.coefficients) ** 2
        shares = [light.beyond for light in lights]
        if not any(shares):
            return 0.0
        powers = [w * light.power / (1 + light.beyond) for w, light in zip(weights, lights, strict=True)]
        return float(np.average(shares, weights=powers)) if sum(powers) else 0.0

    @property
    def power(self) -> float:
        """Power [W]: in the window, and scattered by edges beyond the band of the samples."""
        return self.whole.power

    @property
    def total_stokes(self) -> NDArray[np.float64]:
        """S0 .. S3 of all the light [W], shape (4,)."""
        return self.whole.total_stokes

    @property
    def guard(self) -> Guard:
        """The worst of the fields."""
        guards = [field.guard for field in self.fields]
        worst = (max(getattr(guard, name) for guard in guards) for name in ("edge_power", "phase_step", "discarded"))
        return Guard(*worst)

    def at(self, x: NDArray[np.float64], y: NDArray[np.float64]) -> Complexes:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx)."""
        return self.whole.at(x, y)

    def stokes_on(self, raster: Raster) -> NDArray[np.float64]:
        """Watts per pixel of S0 .. S3, shape (4, ny, nx); each field is brought to the pixels once for all sums."""
        if raster.shape != (1, 1):
            for field in self.fields:
                watch_frame(field.carried, field.grid)
        parts = self._collected_by(raster)
        if any((part.rows, part.columns) != (parts[0].rows, parts[0].columns) for part in parts):
            return self.whole.stokes_on(raster)
        return _sum(parts, self.coefficients).stokes()

    def _collected_by(self, raster: Raster) -> list[Collected]:
        far = [field for field in self.fields if isinstance(field, FarField)]
        down, across = (max((field.orders[axis] for field in far), default=0) for axis in (0, 1))
        # All on as many places as the finest of them asks for.
        filled = [field.light.filled for field in self.fields if isinstance(field, GridField)]
        order = max(some for some in filled if some) if filled and all(filled) else None
        return [
            field.collected_by(raster, (down, across))
            if isinstance(field, FarField)
            else field.collected_by(raster, order)
            for field in self.fields
        ]


def combined(fields: Sequence[GridField | FarField], coefficients: Complexes) -> GridSum:
    """The sum of coefficient * field, of light at one target.

    Raises
    ------
    SamplingError : the fields are not on the same samples.
    """
    _check_samples([field.places for field in fields])
    return GridSum(fields, coefficients)


def _sum(lights: Sequence[Sampled], coefficients: Complexes) -> Sampled:
    """One scalar field stays one: where the lights share their polarization, or all but their polarization."""
    first, vectors = lights[0], [light.jones for light in lights if light.jones is not None]
    if len(vectors) == len(lights):
        if all(np.array_equal(vectors[0], vector) for vector in vectors):
            return replace(first, samples=_total([light.samples for light in lights], coefficients))
        if all(np.array_equal(first.samples, light.samples) for light in lights):
            return replace(first, jones=_total(vectors, coefficients))
    return replace(first, samples=_total([_components(light) for light in lights], coefficients), jones=None)


def _steep(whole: GridLight, lights: Sequence[GridLight], coefficients: Complexes) -> tuple[Steep, ...]:
    """What singular points scattered of a sum: the sum of what they scattered, where that is of the same samples."""
    if whole.samples is lights[0].samples:
        return lights[0].steep
    parts = [
        light.steep_past(light.jones[:, None]) if whole.jones is None and light.jones is not None else light.steep
        for light in lights
    ]
    return _same_added(parts, coefficients)


def _same_added(parts: Sequence[tuple[Steep, ...]], coefficients: Complexes) -> tuple[Steep, ...]:
    """What singular points scattered of each light, times a number, added up where it is of the same samples."""
    found: dict[Any, Steep] = {}
    for number, part in zip(coefficients, parts, strict=True):
        for order, one in enumerate(part):
            key, before = (order, one.samples), found.get((order, one.samples))
            whole, kept = number * one.whole, number * one.kept
            found[key] = (
                one._replace(whole=before.whole + whole, kept=before.kept + kept)
                if before
                else one._replace(whole=whole, kept=kept)
            )
    return tuple(found.values())


def steep_added(fields: Sequence[GridField | FarField], mixtures: Complexes) -> NDArray[np.float64]:
    """S0 .. S3 [W] that interference adds to what singular points scattered, in sums of fields whose powers add.

    Parameters
    ----------
    mixtures : rows of numbers, one a field; each row makes a coherent sum.
    """
    lights = [field.carried for field in fields]
    parts = [one.steep if one.jones is None else one.steep_past(one.jones[:, None]) for one in lights]
    added = np.zeros(4)
    for numbers in mixtures:
        added += _steep_stokes(_same_added(parts, numbers))
        added -= sum(abs(number) ** 2 * _steep_stokes(part) for number, part in zip(numbers, parts, strict=True))
    return added


def _steep_stokes(steep: tuple[Steep, ...]) -> NDArray[np.float64]:
    return sum((stokes_sum(one.whole) - stokes_sum(one.kept) for one in steep), start=np.zeros(4))


def _components(light: GridLight | Collected) -> Complexes:
    return light.samples if light.jones is None else light.jones[:, None, None] * light.samples


def _total(arrays: list[Complexes], coefficients: Complexes) -> Complexes:
    out = np.asarray(coefficients[0] * arrays[0])
    for number, array in zip(coefficients[1:], arrays[1:], strict=True):
        if number != 0:
            out += number * array
    return out


def _check_samples(found: list[tuple[int, float, float]]) -> None:
    places = set(found)
    if len(places) > 1:
        pitches = ", ".join(f"{count} of {pitch * 1e6:.6g} um" for count, pitch, _ in sorted(places))
        raise SamplingError(
            "fields are added sample by sample, so they need the same samples",
            got=f"fields on {pitches}",
            fix="grid=fa.Grid(samples=1024, window=10*mm)",
        )
