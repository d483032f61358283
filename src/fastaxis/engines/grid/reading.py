"""Reading sampled light: watts per pixel, and the field at any place."""

from __future__ import annotations

import math
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.collecting import Collected, stokes_from
from fastaxis.engines.grid.edges import watch_frame
from fastaxis.engines.grid.filled import beat, filled
from fastaxis.engines.grid.interpolant import value_matrix
from fastaxis.engines.grid.kernel import blocks, reach_for
from fastaxis.engines.grid.landing import KEPT, landing_length, lines
from fastaxis.engines.grid.light import GridLight, Samples, curve, inner, stokes_sum
from fastaxis.engines.grid.nearby import Nearby, nearby
from fastaxis.engines.grid.sampled_waves import waves_of
from fastaxis.engines.grid.transforms import forward
from fastaxis.light import Raster, stokes
from fastaxis.plan import Grid

__all__ = ["GridField"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]


ROOM = 1 << 28  # bytes that the waves of the rows a camera looks at may take
SPARE = 1.25  # density of samples over what irradiance needs, at least: room for a kernel to fall off
MOST_SPARE = 5.0  # beyond it the kernel gets no shorter to speak of


@dataclass(frozen=True)
class GridField:
    """Sampled light in the plane of a target.

    Between the samples it is the band-limited curve through them; beyond the window it is dark.
    """

    light: GridLight
    guard: Guard
    grid: Grid | None = field(default=None, repr=False)
    _read: dict[tuple[Raster, int | None], Collected] = field(default_factory=dict, repr=False, compare=False)

    @property
    def wavelength(self) -> float:
        """Vacuum wavelength [m]."""
        return self.light.wavelength

    @property
    def carried(self) -> GridLight:
        """The light as it is kept."""
        return self.light

    @property
    def places(self) -> tuple[int, float, float]:
        """Samples along a side, their pitch [m], the curvature kept apart [1/m]."""
        return self.light.count, self.light.pitch, self.light.curvature

    @property
    def power(self) -> float:
        """Power [W]: in the window, and scattered by edges beyond the band of the samples."""
        return self.light.power

    @property
    def total_stokes(self) -> Reals:
        """S0 .. S3 of all the light [W], shape (4,); what edges scattered counts with the polarization of the rest."""
        light, area = self.light, self.light.pitch**2
        if light.jones is not None:
            whole = inner(light.samples, light.samples).real * area * (1 + light.beyond) + light.steep_power
            return np.asarray(whole * stokes(light.jones))
        steep = sum(stokes_sum(one.whole) - stokes_sum(one.kept) for one in light.steep)
        return np.asarray(stokes_sum(light.samples) * area * (1 + light.beyond) + steep)

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
        """Watts per pixel of S0 .. S3, shape (4, ny, nx): the integral of the band-limited curve over each pixel.

        Irradiance has twice the band of the field, so finer samples hold it exactly, and what a pixel of any size
        collects is a fixed sum of them. Light that edges scattered to steeper angles than the samples hold is in
        ``power`` and in ``guard.discarded``, not here.

        Warns
        -----
        SamplingWarning : that light is more than 1 % of the power.
        """
        if raster.shape != (1, 1):
            watch_frame(self.light, self.grid)
        known = next((read for (read_on, _), read in self._read.items() if read_on == raster), None)
        images = None if known else self._by_rows(raster)
        return images if images is not None else (known or self._collected_by(raster)).stokes()

    def _by_rows(self, raster: Raster) -> Reals | None:
        """Read from the waves of the samples, row by row; None where another way is better or that takes much room."""
        light = self.light
        if not self._lands(raster) or (light.filled and _parts(light, light.filled) == 1):
            return None
        waves, (down, across) = waves_of(light)
        order = beat(down, light.samples.dtype), beat(across, light.samples.dtype)
        lengths = map(landing_length, order, waves.samples.shape[1:])
        rows, columns = lines(raster, light.window, tuple(lengths), order)  # type: ignore[arg-type]  # a tuple of map has no length for mypy; there are two
        if rows.places.count * waves.samples.shape[2] * waves.samples[:, 0, 0].nbytes > ROOM:
            return None
        samples = waves.rows_at(rows.places, columns.places)
        return np.asarray(stokes_from(samples, light.jones, rows.blocks, columns.blocks))

    def _lands(self, raster: Raster) -> bool:
        """Whether waves are worth following to where a camera looks: few samples, and no camera much smaller."""
        return self.light.count <= KEPT and not all(self._nearby(raster, 2))

    def _nearby(self, raster: Raster, parts: int) -> list[Nearby | None]:
        light = self.light
        return [nearby(places, raster.pitch, light.count, light.pitch, parts) for places in (raster.y, raster.x)]

    def collected_by(self, raster: Raster, order: int | None = None) -> Collected:
        """The light as pixels collect it; kept for the last raster, since sums of this field are read alike.

        Parameters
        ----------
        order : highest of irradiance to be held, in cycles a window, if it is known for all fields of a sum.
        """
        found = self._read.get((raster, order))
        if found is None:
            found = self._landed(raster, order) if order and self._lands(raster) else self._collected_by(raster)
            self._read.clear()
            self._read[raster, order] = found
        return found

    def _landed(self, raster: Raster, order: int) -> Collected:
        light, orders = self.light, (order, order)
        length = landing_length(order, light.count + 1)
        rows, columns = lines(raster, light.window, (length, length), orders)
        samples = waves_of(light)[0].at(rows.places, columns.places)
        return Collected(samples, light.jones, 1, rows.blocks, columns.blocks)

    def _collected_by(self, raster: Raster) -> Collected:
        light = self.light
        waves = light.filled or filled(forward(light.samples.copy()), fft.fftfreq(light.count, 1 / light.count))
        parts = _parts(light, waves)
        rows, columns = self._nearby(raster, parts)
        if rows and columns:
            left, right = rows.values(), columns.values().T
            samples = np.stack([_complex_sandwich(left, part, right) for part in light.samples])
            return Collected(samples.astype(light.samples.dtype), light.jones, 1, rows.blocks(), columns.blocks())
        reach = reach_for(max(min(parts * light.count / (2 * waves), MOST_SPARE), SPARE))
        down, across = (
            blocks(
                count=light.count, pitch=light.pitch, parts=parts, reach=reach,
                pixels=pixels, pixel=raster.pitch, middle=middle,
            )
            for pixels, middle in zip(raster.shape, reversed(raster.centre), strict=True)
        )  # fmt: skip
        return Collected(light.samples, light.jones, parts, down, across)


def _parts(light: GridLight, waves: int) -> int:
    """Samples as many times as dense as irradiance asks for."""
    return math.ceil(SPARE * 2 * min(waves, light.count) / light.count)


def _complex_sandwich(left: Reals, middle: Samples, right: Reals) -> Complexes:
    """Two real products: half the work of one with real matrices made complex."""
    real, imaginary = (_sandwich(left, np.ascontiguousarray(part), right) for part in (middle.real, middle.imag))
    values: Complexes = real + 1j * imaginary
    return values


def _sandwich(left: Reals, middle: Reals, right: Reals) -> Reals:
    """The product left @ middle @ right, the one that leaves fewer rows or columns first."""
    product: Reals = (left @ middle) @ right if left.shape[0] <= right.shape[1] else left @ (middle @ right)
    return product
