"""Pixel integrals from samples near the pixels only: for a camera much smaller than the window."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.interpolant import value_matrix

__all__ = ["Nearby", "nearby"]

Reals = NDArray[np.float64]

FINER = 4  # places per sample: irradiance has half their band, which leaves room for a short kernel
REACH = 20  # half width of the kernel in places; its error is exp(-pi REACH/2) = 2e-14
NODES = 12  # of the Gauss-Legendre rule over a pixel, and two more for every place the pixel spans
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

    def integrals(self) -> Reals:
        """(pixels, places): the integral over each pixel of the curve through irradiance at the places.

        The kernel is sinc(t) I0(b sqrt(1 - (t/REACH)^2))/I0(b) with b = pi REACH/2, t in places: for a curve of half
        the band of the places it interpolates to exp(-b). J. F. Kaiser and R. W. Schafer, IEEE Trans. Acoust. Speech
        Signal Process. 28, 105 (1980), for the window.
        """
        wide = self._pixel / self.step
        near = np.arange(2 * REACH + math.ceil(wide) + 2)
        middle = (self._centres - self.places[0]) / self.step
        first = np.ceil(middle - wide / 2 - REACH).astype(int)
        index = np.clip(first[:, None] + near, 0, self.places.size - 1)
        apart = middle[:, None] - (first[:, None] + near)
        nodes, weights = np.polynomial.legendre.leggauss(NODES + 2 * math.ceil(wide))
        kernel = sum(w * _kernel(apart + node * wide / 2) for node, w in zip(nodes, weights, strict=True))
        out = np.zeros((self._centres.size, self.places.size))
        np.add.at(out, (np.arange(self._centres.size)[:, None], index), kernel * self._pixel / 2)
        return out


def _kernel(t: Reals) -> Reals:
    inside = np.clip(1 - (t / REACH) ** 2, 0.0, None)
    steep = math.pi * REACH / 2
    value: Reals = np.where(inside > 0, np.sinc(t) * np.i0(steep * np.sqrt(inside)) / np.i0(steep), 0.0)
    return value


def nearby(centres: Reals, pixel: float, count: int, pitch: float) -> Nearby | None:
    """The axis of a camera if reading near it is possible and less work than from the whole window."""
    axis = Nearby(centres, pixel, count, pitch)
    return axis if axis.fits and axis.places.size < count else None
