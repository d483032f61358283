"""A mode given by its samples: a measured or computed field."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING, Any, ClassVar

import numpy as np
from numpy.typing import ArrayLike

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.light.modes.base import Complexes, Mode, Moments
from fastaxis.light.raster import Raster

if TYPE_CHECKING:
    from scipy.interpolate import RectBivariateSpline

__all__ = ["SampledMode"]


@dataclass(frozen=True, eq=False)
class SampledMode:
    """A field known at the centres of square pixels about the axis; cubic splines between, dark outside.

    The samples are scaled to unit power. Sampling must carry the field: less than pi of phase from pixel to pixel.

    Parameters
    ----------
    array : complex samples (ny, nx), rows along +y, columns along +x; at least 4 by 4, any scale.
    pixel : side of a pixel [m].

    Raises
    ------
    ParameterError : samples that are not a finite two-dimensional array with some light in it; a pixel without unit.

    Examples
    --------
    >>> from fastaxis.units import um, nm
    >>> mode = SampledMode(np.ones((8, 8)), pixel=10*um)
    >>> round(float(mode.amplitude(0, 0, 532*nm).real), 6)
    12500.0
    """

    array: np.ndarray[Any, Any]
    pixel: float

    infinite: ClassVar[bool] = False
    hard: ClassVar[bool] = False
    charge: ClassVar[None] = None
    symbols: ClassVar[frozenset[Any]] = frozenset()

    def __post_init__(self) -> None:
        fix = "array=[[1.0] * 8] * 8"
        try:
            array = np.array(self.array, dtype=complex)
        except (TypeError, ValueError):
            raise ParameterError(
                "samples are numbers", got=f"SampledMode: {type(self.array).__name__}", fix=fix
            ) from None
        if array.ndim != 2 or min(array.shape) < 4:
            raise ParameterError(
                "samples form a (ny, nx) array of at least 4 by 4", got=f"SampledMode: shape = {array.shape}", fix=fix
            )
        if not np.isfinite(array).all() or not array.any():
            raise ParameterError("samples are finite and not all zero", got=f"SampledMode: {_unfit(array)}", fix=fix)
        pixel = checks.length("SampledMode", "pixel", self.pixel, most=0.1, fix="pixel=10*um")
        object.__setattr__(self, "pixel", float(pixel))
        array /= np.linalg.norm(array) * self.pixel
        array.flags.writeable = False
        object.__setattr__(self, "array", array)

    @property
    def raster(self) -> Raster:
        """The pixels."""
        ny, nx = self.array.shape
        return Raster(self.pixel, (ny, nx))

    def amplitude(self, x: ArrayLike, y: ArrayLike, wavelength: float) -> Complexes:
        """Complex amplitude [1/m] of unit power at the places (x, y) [m]; the same at every wavelength."""
        x, y = np.broadcast_arrays(np.asarray(x, dtype=float), np.asarray(y, dtype=float))
        rows, columns = self.raster.y, self.raster.x
        real, imag = self._splines
        inside = (abs(x) <= -columns[0] + self.pixel / 2) & (abs(y) <= -rows[0] + self.pixel / 2)
        return np.where(inside, real(y, x, grid=False) + 1j * imag(y, x, grid=False), 0)

    @cached_property
    def _splines(self) -> tuple[RectBivariateSpline, RectBivariateSpline]:
        # It takes a quarter of a second to load, and no other mode needs it.
        from scipy.interpolate import RectBivariateSpline  # noqa: PLC0415  # slow to load, and only sampled modes need it

        rows, columns = self.raster.y, self.raster.x
        return (
            RectBivariateSpline(rows, columns, self.array.real),
            RectBivariateSpline(rows, columns, self.array.imag),
        )

    def radial(self, r: ArrayLike, wavelength: float) -> Complexes:
        """Refused: samples have no charge of their own."""
        raise ParameterError(
            "a sampled mode has no radial form: ask for its amplitude",
            got="SampledMode: radial",
            fix="mode.amplitude(0.1*mm, 0*mm, 532*nm)",
        )

    def curvature(self, wavelength: float) -> float:
        """1/R [1/m] of the sphere that fits the phase best: covariance over variance of position."""
        moments = self.moments(wavelength)
        return moments.xt / moments.x2 if moments.x2 else 0.0

    def moments(self, wavelength: float) -> Moments:
        """Second moments from the samples: power for positions, spectrum for angles, current for both."""
        axes = [self._axis_moments(axis, wavelength) for axis in (0, 1)]
        return max(axes, key=lambda m: m.x2 * m.t2 - m.xt**2)

    def _axis_moments(self, axis: int, wavelength: float) -> Moments:
        place = (self.raster.y if axis == 0 else self.raster.x)[:, np.newaxis]
        field = self.array if axis == 0 else self.array.T
        frequency = np.fft.fftfreq(len(place), self.pixel)[:, np.newaxis] * wavelength
        angle = np.fft.ifft(frequency * np.fft.fft(field, axis=0), axis=0)  # the angle operator at work
        power = abs(field) ** 2 * self.pixel**2
        mean_x = float(np.sum(place * power))
        mean_t = float(np.sum(field.conj() * angle).real * self.pixel**2)
        return Moments(
            x2=float(np.sum((place - mean_x) ** 2 * power)),
            xt=float(np.sum((place - mean_x) * (field.conj() * angle).real) * self.pixel**2),
            t2=float(np.sum(abs(angle - mean_t * field) ** 2) * self.pixel**2),
        )

    def overlap(self, other: Mode, wavelength: float) -> complex:
        """<self|other>, summed over the pixels; of two sampled modes, over the finer ones."""
        if other.infinite:
            return other.overlap(self, wavelength).conjugate()
        if isinstance(other, SampledMode) and other.pixel < self.pixel:
            return other.overlap(self, wavelength).conjugate()
        values = other.amplitude(*np.meshgrid(self.raster.x, self.raster.y), wavelength)
        return complex(np.sum(self.array.conj() * values) * self.pixel**2)


def _unfit(array: Complexes) -> str:
    """What samples are when they are no light."""
    bad = np.argwhere(~np.isfinite(array))
    if not len(bad):
        return "all zero"
    row, column = bad[0]
    return f"{len(bad)} of {array.size} are not finite (first in row {row}, column {column})"
