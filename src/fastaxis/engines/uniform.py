"""The uniform engine: a Jones vector, where no transverse structure is asked for."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import CLEAN, Guard
from fastaxis.errors import ParameterError
from fastaxis.laws import ScalarLaw
from fastaxis.light import PlaneWave, Raster, stokes
from fastaxis.plan import Branch, JonesStep

__all__ = ["UniformField", "combined", "run", "started"]


@dataclass(frozen=True)
class UniformField:
    """Light of one polarization state all over the plane.

    Parameters
    ----------
    wavelength : [m].
    jones : (Ex, Ey) [sqrt(W)]; its squared length is the power.
    area : [m^2] that a plane wave's power is counted on; None for a beam all of which is collected.
    """

    wavelength: float
    jones: NDArray[np.complex128]
    area: float | None = None
    guard: Guard = CLEAN

    @property
    def power(self) -> float:
        """Total power [W]; of a plane wave, the power on its area."""
        return float(np.sum(abs(self.jones) ** 2))

    @property
    def total_stokes(self) -> NDArray[np.float64]:
        """S0 .. S3 [W], shape (4,); of a plane wave, on its area."""
        return stokes(self.jones)

    def stokes_on(self, raster: Raster) -> NDArray[np.float64]:
        """A plane wave puts its irradiance on every pixel; a collected beam is all in one pixel."""
        if self.area is None and raster.shape != (1, 1):
            raise ParameterError(
                "where in the plane the light is was not followed: only its total power is known",
                got=f"engine uniform: {raster.shape[0]} x {raster.shape[1]} pixels",
                fix='engine="grid"',
            )
        share = 1.0 if self.area is None else raster.pitch**2 / self.area
        return np.broadcast_to((share * stokes(self.jones))[:, None, None], (4, *raster.shape)).copy()

    def at(self, x: NDArray[np.float64], y: NDArray[np.float64]) -> NDArray[np.complex128]:
        """(Ex, Ey) [sqrt(W)/m] of a plane wave, the same everywhere."""
        if self.area is None:
            raise ParameterError(
                "where in the plane the light is was not followed: only its total power is known",
                got="engine uniform: field asked at a place",
                fix='engine="grid"',
            )
        values = self.jones / np.sqrt(self.area)
        return np.broadcast_to(values[:, None, None], (2, np.size(y), np.size(x))).copy()


def started(branch: Branch) -> UniformField:
    """The light of a branch where it begins."""
    terms, scale = branch.beam.terms, branch.beam.scale(branch.wavelength)
    jones = sum(scale * term.number * term.state.jones for term in terms) * np.sqrt(branch.power)
    mode = terms[0].mode
    area = float(mode.area) if isinstance(mode, PlaneWave) else None
    return UniformField(branch.wavelength, np.asarray(jones), area)


def run(branch: Branch) -> UniformField:
    """The light of a branch whose parts are uniform; travel and frame changes leave its Jones vector alone."""
    start = started(branch)
    jones = start.jones
    for step in branch.steps:
        if isinstance(step.law, JonesStep):
            jones = np.array(step.law.matrix) @ jones
        elif isinstance(step.law, ScalarLaw):
            jones = step.law.transmission.number() * jones
    return replace(start, jones=jones)


def combined(fields: Sequence[UniformField], coefficients: NDArray[np.complex128]) -> UniformField:
    """The sum of coefficient * field, of light at one target."""
    jones = sum(number * field.jones for number, field in zip(coefficients, fields, strict=True))
    return replace(fields[0], jones=np.asarray(jones))
