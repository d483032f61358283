"""Pixel integrals from samples near the pixels only: for a camera much smaller than the window."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.interpolant import value_matrix
from fastaxis.engines.grid.kernel import Block, blocks, reach_for

__all__ = ["Nearby", "nearby"]

Reals = NDArray[np.float64]

FINER = 4  # places per sample: irradiance has half their band, which leaves room for a short kernel
REACH = reach_for(FINER / 2)  # half width of the kernel in places
SPAN = 8  # largest pixel in places; wider ones collect from the whole window


class Nearby:
    """One axis of a camera: where the field is needed, and what each pixel collects of the irradiance there.

    Parameters
    ----------
    centres : middles of the pixels [m].
    pixel : their side [m].
    count, pitch : of the samples.
    """

    def __init__(self, centres: Reals, pixel: float, count: int, pitch: float) -> None:
        self.step = pitch / FINER
        self.fits = pixel <= SPAN * self.step
        low = centres[0] - pixel / 2 - REACH * self.step
        high = centres[-1] + pixel / 2 + REACH * self.step
        self.places = low + self.step * np.arange(math.ceil((high - low) / self.step) + 1)
        self.fits &= max(-low, self.places[-1]) < count * pitch / 2
        self._centres, self._pixel, self._samples = centres, pixel, (count, pitch)

    def values(self) -> Reals:
        """(places, count): the field at the places from all samples, exactly."""
        return value_matrix(self.places, *self._samples)

    def blocks(self) -> tuple[Block, ...]:
        """Pixels that collect irradiance from the places; it has half their band."""
        middle = (self._centres[0] + self._centres[-1] - self.places[0] - self.places[-1]) / 2
        return blocks(
            count=self.places.size, pitch=self.step, parts=1, reach=REACH,
            pixels=self._centres.size, pixel=self._pixel, middle=float(middle),
        )  # fmt: skip


def nearby(centres: Reals, pixel: float, count: int, pitch: float, parts: int) -> Nearby | None:
    """The axis of a camera, if reading near it is possible and less work than moving all samples by parts of one.

    A product with one place takes 8 multiplications a sample and column at full speed; a transform of both sides
    10 log2(count) at a tenth of it.
    """
    if parts == 1:
        return None
    axis = Nearby(centres, pixel, count, pitch)
    return axis if axis.fits and axis.places.size < min(count, 9 * parts**2 * math.log2(count)) else None
