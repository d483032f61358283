"""Reading sampled light: watts per pixel, and the field at any place."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.interpolant import integral_matrix, value_matrix
from fastaxis.engines.grid.light import GridLight, curve, multiply_separable
from fastaxis.engines.grid.transforms import WORKERS
from fastaxis.light import Raster, stokes

__all__ = ["GridField"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

EMPTY = 1e-25  # share of the power; 3e-13 of the field, a thousand roundings


@dataclass(frozen=True)
class GridField:
    """Sampled light in the plane of a target.

    Between the samples it is the band-limited curve through them; beyond the window it is dark.
    """

    light: GridLight
    guard: Guard

    @property
    def wavelength(self) -> float:
        """Vacuum wavelength [m]."""
        return self.light.wavelength

    @property
    def power(self) -> float:
        """Power in the window [W]."""
        return self.light.power

    def at(self, x: Reals, y: Reals) -> Complexes:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx)."""
        light = self.light
        columns, rows = (np.atleast_1d(np.asarray(places, dtype=float)) for places in (x, y))
        left = value_matrix(rows, light.count, light.pitch)
        right = value_matrix(columns, light.count, light.pitch).T
        values = np.stack([_complex_sandwich(left, part, right) for part in light.samples])
        values *= curve(rows, light.curvature, light.wavelength)[:, None]
        values *= curve(columns, light.curvature, light.wavelength)[None, :]
        return values if light.jones is None else light.jones[:, None, None] * values[0]

    def stokes_on(self, raster: Raster) -> Reals:
        """Watts per pixel of S0 .. S3, shape (4, ny, nx).

        Irradiance has twice the band of the field. Samples twice as fine hold it exactly, and the integral of their
        band-limited curve over a pixel is a fixed sum of them: pixels of any size collect the light to rounding.
        """
        samples, pitch = _fine(self.light.samples, self.light.pitch)
        count = samples.shape[-1]
        rows, columns = (_edges(places, raster.pitch) for places in (raster.y, raster.x))
        left, right = integral_matrix(rows, count, pitch), integral_matrix(columns, count, pitch).T
        if self.light.jones is not None:
            image = _sandwich(left, samples[0].real ** 2 + samples[0].imag ** 2, right)
            states: Reals = stokes(self.light.jones)
            return np.multiply.outer(states, image)
        ex, ey = samples
        px, py, cross = ex.real**2 + ex.imag**2, ey.real**2 + ey.imag**2, 2 * ex.conj() * ey
        images = (_sandwich(left, image, right) for image in (px + py, px - py, cross.real, -cross.imag))
        return np.stack(list(images))


def _edges(centres: Reals, pitch: float) -> Reals:
    return np.append(centres - pitch / 2, centres[-1] + pitch / 2)


def _complex_sandwich(left: Reals, middle: Complexes, right: Reals) -> Complexes:
    """Two real products: half the work of one with real matrices made complex."""
    real, imaginary = (_sandwich(left, np.ascontiguousarray(part), right) for part in (middle.real, middle.imag))
    values: Complexes = real + 1j * imaginary
    return values


def _sandwich(left: Reals, middle: Reals, right: Reals) -> Reals:
    """The product left @ middle @ right, the one that leaves fewer rows or columns first."""
    product: Reals = (left @ middle) @ right if left.shape[0] <= right.shape[1] else left @ (middle @ right)
    return product


def _fine(samples: Complexes, pitch: float) -> tuple[Complexes, float]:
    """The samples on the coarsest grid that still holds the irradiance: their spectrum at most half filled."""
    count = samples.shape[-1]
    spectrum = fft.fftshift(fft.fft2(samples, workers=WORKERS), axes=(-2, -1))
    new = fft.next_fast_len(2 * _filled(spectrum))
    new += new % 2
    new = min(new, 2 * count)
    if new == count:
        return samples, pitch
    fine = np.zeros((samples.shape[0], new, new), dtype=complex)
    keep = min(count, new)
    inner = slice((count - keep) // 2, (count + keep) // 2)
    outer = slice((new - keep) // 2, (new + keep) // 2)
    fine[:, outer, outer] = spectrum[:, inner, inner]
    _halve_highest(fine, keep)
    # The first sample of a symmetric grid moves with the pitch: from -(n - 1)/2 pitches to -(new - 1)/2 finer ones.
    shift = (count - 1) / (2 * count) - (new - 1) / (2 * new)
    turn = np.exp(2j * np.pi * shift * (np.arange(new) - new // 2))
    multiply_separable(fine, turn)
    out = fft.ifft2(fft.ifftshift(fine, axes=(-2, -1)), overwrite_x=True, workers=WORKERS)
    return out * (new / count) ** 2, pitch * count / new


def _halve_highest(fine: Complexes, keep: int) -> None:
    """Share the highest wave, which samples cannot tell from its mirror image, between both."""
    new = fine.shape[-1]
    if keep >= new:
        return
    low, high = (new - keep) // 2, (new + keep) // 2
    fine[:, low, :] /= 2
    fine[:, high, :] = fine[:, low, :]
    fine[:, :, low] /= 2
    fine[:, :, high] = fine[:, :, low]


def _filled(spectrum: Complexes) -> int:
    """Waves along a side, from -m to +m, that hold all but rounding of the power."""
    power = (spectrum.real**2 + spectrum.imag**2).sum(axis=0)
    count = power.shape[-1]
    profile = power.sum(axis=0) + power.sum(axis=1)
    order = abs(np.arange(count) - count // 2)
    by_order = np.bincount(order, profile)
    beyond = np.cumsum(by_order[::-1])[::-1]
    needed = np.nonzero(beyond > EMPTY * beyond[0])[0]
    return 2 * (int(needed[-1]) + 1) if needed.size else 2
