"""A picture as it is without the last uniform parts, and what they make of it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import Guard
from fastaxis.errors import FastaxisWarning
from fastaxis.light import Raster, muellers, stokes
from fastaxis.plan import JonesStep
from fastaxis.recycled import empty

__all__ = ["Kept", "Picture", "even"]

Images = NDArray[Any]
Complexes = NDArray[np.complex128]

PIXELS = 8192  # at a time: a product small enough to stay in a core's cache and in its thread

EVEN = 1e-14
"""Strengths of a matrix alike to some dozen roundings of its making: a plate, a rotator, a plain loss."""

DIM = 1 / 16
"""Of the light that a matrix could let pass. What it takes away leaves its roundings behind, at most 16 times as large
against what is left; where there is less, the light is followed anew."""


@dataclass(frozen=True, eq=False)
class Picture:
    """What a sensor sees of some light.

    Parameters
    ----------
    images : S0 .. S3 [W per pixel], shape (4, ny, nx).
    power : of all the light [W], beside the sensor as well; None if not known.
    guard : how well samples carried the light, before its last uniform parts.
    """

    images: Images
    power: float | None
    guard: Guard

    def stokes_on(self, raster: Raster) -> Images:
        """The images; of the raster they were asked for on."""
        return self.images


@dataclass(frozen=True, eq=False)
class Kept:
    """A picture without the last uniform parts.

    Parameters
    ----------
    images : S0 .. S3 [W per pixel]; of uniformly polarized light its irradiance alone, for a Jones vector of length 1.
    jones : of uniformly polarized light, else None.
    sent : power of the source it was made with [W].
    power : of all the light [W]; None if not known.
    totals : its S0 .. S3; None if not known.
    scattered : whether edges scattered some of it beyond its samples, in a state that is not known.
    guard : how well samples carried the light.
    strain : how close it came to being cautioned of, which begins at 1.
    told : cautions that the light gave rise to.
    """

    images: Images
    jones: Complexes | None
    sent: float
    power: float | None
    totals: NDArray[np.float64] | None
    scattered: bool
    guard: Guard
    strain: float
    told: tuple[FastaxisWarning, ...]

    def behind(self, step: JonesStep, power: float) -> Picture | None:
        """The picture behind uniform parts, of a source of another power [W]; None if it must be made anew."""
        matrix = np.array(step.matrix) * np.sqrt(power / self.sent)
        return self._turned(matrix) if self.jones is None else self._uniform(stokes(matrix @ self.jones))

    def _uniform(self, vector: NDArray[np.float64]) -> Picture:
        images = empty((4, *self.images.shape[1:]), self.images.dtype)
        np.multiply(vector.astype(images.dtype)[:, None, None], self.images, out=images)
        return Picture(images, None if self.power is None else self.power * float(vector[0]), self.guard)

    def _turned(self, matrix: Complexes) -> Picture | None:
        (mueller,) = muellers(matrix[np.newaxis])
        most = float(np.linalg.norm(matrix, 2)) ** 2  # of the power of any light
        if even(matrix):
            power = None if self.power is None else self.power * float(mueller[0, 0])
        elif self.totals is None:
            return None
        else:
            power = float(mueller[0] @ self.totals)
            if power < max(DIM, self.strain) * most * self.totals[0]:
                return None
            power = None if self.scattered else power
        images = _product(mueller, self.images)
        dim = images[0].max() < DIM * most * self.images[0].max()
        return None if dim else Picture(images, power, self.guard)


def even(matrix: Complexes) -> bool:
    """Whether a matrix lets all states pass alike, so that no share of the light grows against another."""
    strongest, weakest = np.linalg.svd(matrix, compute_uv=False)
    return bool(strongest - weakest <= EVEN * strongest)


def _product(mueller: NDArray[np.float64], images: Images) -> Images:
    """The images of each pixel turned, some pixels at a time."""
    turned, flat = empty(images.shape, images.dtype), images.reshape(4, -1)
    out, mueller = turned.reshape(4, -1), mueller.astype(images.dtype)
    for first in range(0, flat.shape[1], PIXELS):
        np.matmul(mueller, flat[:, first : first + PIXELS], out=out[:, first : first + PIXELS])
    return turned
