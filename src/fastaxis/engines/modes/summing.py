"""Coherent sums of Gaussian modes at one target."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from functools import cached_property
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import CLEAN, Guard
from fastaxis.engines.modes.scalar import ScalarModes
from fastaxis.engines.modes.waves import Waves, overlaps
from fastaxis.light import Raster

__all__ = ["ModeSum", "combined"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]


@dataclass(frozen=True, eq=False)
class ModeSum:
    """Light that is a sum of Gaussian modes.

    Parameters
    ----------
    wavelength : [m].
    waves : modes of each kind.
    """

    wavelength: float
    waves: tuple[Waves, ...]

    @cached_property
    def total_stokes(self) -> Reals:
        """S0 .. S3 of all the light [W], shape (4,), by exact overlaps."""
        coherency = np.zeros((2, 2), dtype=complex)
        for one in self.waves:
            for other in self.waves:
                coherency += other.jones.T @ overlaps(one, other).T @ one.jones.conj()
        (xx, xy), (_, yy) = coherency
        return np.array([(xx + yy).real, (xx - yy).real, 2 * xy.real, 2 * xy.imag])

    @property
    def power(self) -> float:
        """Total power [W]."""
        return max(0.0, float(self.total_stokes[0]))

    @property
    def guard(self) -> Guard:
        """Nothing is sampled."""
        return CLEAN

    def scalar(self, reach: float) -> ScalarModes | None:
        """The field as one state times a scalar, known however far one looks; None if its polarization varies."""
        return ScalarModes.of(self.wavelength, self.waves)

    def at(self, x: Reals, y: Reals) -> Complexes:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx)."""
        columns, rows = (np.atleast_1d(np.asarray(places, dtype=float)) for places in (x, y))
        return np.asarray(sum(waves.at(columns, rows) for waves in self.waves))

    def stokes_on(self, raster: Raster) -> Reals:
        """All of the light in one pixel; pictures are read where arms are joined, which knows their fringes."""
        return np.broadcast_to(self.total_stokes[:, np.newaxis, np.newaxis], (4, *raster.shape)).copy()


def combined(fields: Sequence[ModeSum], coefficients: Complexes) -> ModeSum:
    """The sum of coefficient * field; modes of one kind are kept together, so that they are worked out together."""
    kinds: dict[object, list[Waves]] = {}
    for field, number in zip(fields, coefficients, strict=True):
        for waves in field.waves:
            kinds.setdefault((waves.mode, waves.senses), []).append(replace(waves, jones=number * waves.jones))
    return ModeSum(fields[0].wavelength, tuple(map(_together, kinds.values())))


def _together(alike: list[Waves]) -> Waves:
    parts = ("widths", "exponents", "jones", "middles", "leans")
    joined: dict[str, Any] = {part: np.concatenate([getattr(waves, part) for waves in alike]) for part in parts}
    return replace(alike[0], **joined)
