"""Several arms in the plane where they meet."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, fields
from functools import cached_property
from importlib import import_module
from typing import Any, cast

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.combining import combined
from fastaxis.engines.field import Guard, PlaneField
from fastaxis.engines.joined.blockwise import blockwise
from fastaxis.engines.joined.coherence import mixtures
from fastaxis.engines.joined.extent import Extent
from fastaxis.engines.joined.looking import Look, candidates, settled
from fastaxis.engines.joined.overlap import total_of_sums
from fastaxis.engines.joined.sampled import on_samples
from fastaxis.engines.joined.sight import Sight, sight
from fastaxis.errors import ParameterError
from fastaxis.light import Raster
from fastaxis.plan import Branch

__all__ = ["JoinedField", "joined"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

BLOCK = 1 << 18  # places at which the arms are held at a time


def joined(arms: Sequence[Branch], found: Sequence[PlaneField]) -> tuple[PlaneField, ...]:
    """The light of arms together: one field, or for uniform light one for each sum that does not interfere."""
    mixed = mixtures(arms)
    if all(arm.engine == "uniform" for arm in arms):
        return tuple(_uniform_sum(cast("Sequence[Any]", found), row) for row in mixed)
    if all(arm.engine == "modes" for arm in arms):
        # One sum of many modes is worked out as a whole, in no more time than it takes to look at one.
        sums = [combined("modes", [(field,) for field in found], row)[0] for row in mixed]
        return (JoinedField(tuple(sums), np.eye(len(sums), dtype=complex), Extent.of(arms), ("modes",)),)
    return (JoinedField(tuple(found), mixed, Extent.of(arms), tuple(arm.engine for arm in arms)),)


def _uniform_sum(found: Sequence[Any], numbers: Complexes) -> PlaneField:
    first = found[0]
    total = sum(number * field.jones for number, field in zip(numbers, found, strict=True))
    return type(first)(first.wavelength, np.asarray(total), first.area)  # type: ignore[no-any-return]  # the class of the first arm


@dataclass(frozen=True, eq=False)
class JoinedField:
    """Light that came by several paths.

    Parameters
    ----------
    arms : the field of each, as its engine left it.
    mixtures : rows of numbers, one an arm; each row makes a coherent sum, and the powers of the sums add.
    extent : how wide and fine the light is.
    engines : of each arm, by name.
    """

    arms: tuple[PlaneField, ...]
    mixtures: Complexes
    extent: Extent
    engines: tuple[str, ...]

    @property
    def wavelength(self) -> float:
        """Vacuum wavelength [m]."""
        return self.arms[0].wavelength

    @cached_property
    def total_stokes(self) -> Reals:
        """S0 .. S3 of all the light [W], shape (4,)."""
        return total_of_sums(self.arms, self.mixtures, self.extent, self.engines)

    @property
    def power(self) -> float:
        """Total power [W]: that of each arm, and what their overlap adds or takes."""
        return max(0.0, float(self.total_stokes[0]))

    @property
    def guard(self) -> Guard:
        """The worst of the arms."""
        guards = [arm.guard for arm in self.arms]
        return Guard(**{f.name: max(getattr(guard, f.name) for guard in guards) for f in fields(Guard)})

    def at(self, x: Reals, y: Reals) -> Complexes:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx), of arms that are fully coherent."""
        if len(self.mixtures) > 1:
            raise ParameterError(
                "light that is partly coherent has no one field; it has Stokes parameters everywhere",
                got=f"{len(self.arms)} paths of different length, and a line of some width",
                fix='train.with_changes({"laser.line": fa.Monochromatic()})',
            )
        columns, rows = np.atleast_1d(x), np.atleast_1d(y)
        first, *rest = (n * arm.at(columns, rows) for n, arm in zip(self.mixtures[0], self.arms, strict=True))
        return np.asarray(sum(rest, first))

    def stokes_on(self, raster: Raster) -> Reals:
        """Watts per pixel of S0 .. S3, integrated over each pixel, shape (4, ny, nx).

        The sums are evaluated at places close enough for the finest fringes; a pixel's share is a sum over those.
        """
        half = self.extent.half_window
        if raster.shape == (1, 1) and half and raster.pitch / 2 >= half + max(map(abs, raster.centre)):
            return self.total_stokes[:, np.newaxis, np.newaxis]
        reach = max(abs(raster.x).max(), abs(raster.y).max()) + raster.pitch / 2
        image = on_samples(self.arms, self.engines, self.mixtures, self.extent.spreads, raster)
        if image is not None:
            return image
        if any(engine != "modes" for engine in self.engines):
            seen = sight(self.arms, self.mixtures, reach)
            image = blockwise(seen, raster, self.extent.spreads, anywhere="grid" in self.engines)
            if image is not None:
                return seen.polarized(image)
        if all(engine == "azimuthal" for engine in self.engines):
            return self._by_harmonics(raster)
        frequency, finest = self.extent.frequency(reach), self.extent.finest(reach)
        looks = candidates(raster, frequency, finest)
        seen = sight(self.arms, self.mixtures, max(look.farthest for look in looks))
        image = _collected(seen, settled(raster, finest, looks, lambda look: _collected(seen, look)))
        return seen.polarized(image)

    def _by_harmonics(self, raster: Raster) -> Reals:
        """The harmonics of all arms added and looked at once, for each sum."""
        engine = import_module("fastaxis.engines.azimuthal")
        sums = (engine.combined_on(self.arms, numbers, raster) for numbers in self.mixtures)
        return np.asarray(sum(total.stokes_on(raster) for total in sums))


def _collected(seen: Sight, look: Look) -> Reals:
    """What pixels collect of the light at some places, shape (images, rows, columns)."""
    columns, rows = look.columns, look.rows
    image: Any = 0.0
    at_once = max(1, BLOCK // len(columns.places))
    for first in range(0, len(rows.places), at_once):
        block = slice(first, first + at_once)
        across = [(columns.matrix @ one.T).T for one in seen.images(columns.places, rows.places[block])]
        image = image + np.stack([rows.matrix[:, block] @ one for one in across])
    return np.asarray(image)
