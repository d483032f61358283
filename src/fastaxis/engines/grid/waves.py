"""The waves a far plane is made of: light one transform before its target, read where a camera looks."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.workers import strips, together
from fastaxis.recycled import scratch

__all__ = ["FarRows", "Places", "Waves"]

Samples: TypeAlias = NDArray[Any]
Reals: TypeAlias = NDArray[np.float64]

TRANSFORM = 10  # times a transform takes up each sample: about log2 of its length


@dataclass(frozen=True)
class Places:
    """Neighbouring places of a line, ``length`` of which fill the window symmetrically about its middle.

    Parameters
    ----------
    first, count : the first of them, counted from the first in the window, and how many.
    length : places in the window.
    """

    first: int
    count: int
    length: int

    @property
    def from_other_end(self) -> Places:
        """The same places counted from the other end of the window."""
        return Places(self.length - self.first - self.count, self.count, self.length)


@dataclass(frozen=True, eq=False)
class FarRows:
    """Rows of a far plane, worked out as they are asked for; the phase that all components share is left out.

    Parameters
    ----------
    near : (components, rows, waves), each row still to be transformed.
    before : factors of the waves.
    columns : places of the columns.
    mirrored : whether rows and columns count from the other end.
    """

    near: Samples
    before: Samples
    columns: Places
    mirrored: bool

    @property
    def dtype(self) -> np.dtype[Any]:
        """Of the samples."""
        return self.near.dtype

    def rows(self, first: int, last: int) -> Samples:
        """(components, last - first, columns); rows beyond an end are those of the other end."""
        count = self.near.shape[1]
        if self.mirrored:
            first, last = count - last, count - first
        inside = first >= 0 and last <= count
        near = self.near[:, first:last] if inside else self.near[:, np.arange(first, last) % count]
        samples = near * self.before
        found = fft.fft(samples, n=self.columns.length, axis=2, overwrite_x=True)[:, :, : self.columns.count]
        return found[:, ::-1, ::-1] if self.mirrored else found


@dataclass(frozen=True, eq=False)
class Waves:
    """A field as waves across its window: the sum of amplitude[j] exp(-2 pi i (j0 + j - c) t), c = (count - 1)/2.

    That is the field at t windows from the middle. Amplitudes left out at either end are zero.

    Parameters
    ----------
    samples : (components, rows, columns): amplitudes but for two factors.
    factors : of the amplitudes of each row and of each column; so no plane of amplitudes is ever written.
    first : j0 of the rows and of the columns.
    count : waves along a side, those left out included.
    mirrored : whether places count from the other end.
    """

    samples: Samples
    factors: tuple[Samples, Samples]
    first: tuple[int, int]
    count: int
    mirrored: bool = False

    def at(self, rows: Places, columns: Places) -> Samples:
        """(components, rows, columns): the field at some places.

        Transforms over a window filled up with zeros, first of all columns, then of the rows asked for.
        """
        found = self.rows_at(rows, columns)
        down, across = (self._after(places, first) for places, first in zip((rows, columns), self.first, strict=True))
        out = np.empty((len(self.samples), rows.count, columns.count), dtype=found.dtype)

        def fill(strip: slice) -> None:
            np.multiply(found.rows(strip.start, strip.stop), down[strip, None] * across, out=out[:, strip])

        strips(fill, rows.count, columns.length, times=TRANSFORM)
        return out

    def _after(self, places: Places, first: int) -> Samples:
        """The phase that all components share at some places along a side."""
        if self.mirrored:
            return self._turns(places.from_other_end, first, 0)[1][::-1]
        return self._turns(places, first, 0)[1]

    def rows_at(self, rows: Places, columns: Places) -> FarRows:
        """The field at some places but for a phase that its components share, row by row."""
        if self.mirrored:
            rows, columns = rows.from_other_end, columns.from_other_end
        near = self._dropped(rows)
        return FarRows(near, self._before(columns, axis=1), columns, self.mirrored)

    def _dropped(self, rows: Places) -> Samples:
        """Transforms of all columns, at the rows asked for."""
        width = self.samples.shape[2]
        before = self._before(rows, axis=0)
        near = scratch((len(self.samples), rows.count, width), self.samples.dtype)

        def drop(strip: slice) -> None:
            for part, some in zip(near, self.samples[:, :, strip], strict=True):
                turned = some * before[:, None]
                part[:, strip] = fft.fft(turned, n=rows.length, axis=0, overwrite_x=True)[: rows.count]

        strips(drop, width, rows.length, times=TRANSFORM)
        return near

    def _before(self, places: Places, axis: int) -> Samples:
        """Factors of the waves along a side before their transform."""
        turns, _ = self._turns(places, self.first[axis], self.samples.shape[axis + 1])
        return np.asarray(turns * self.factors[axis], dtype=self.samples.dtype)

    def _turns(self, places: Places, first: int, waves: int) -> tuple[Samples, Samples]:
        """Factors of the waves before, and of the places after, a transform that counts both from 0.

        At place k of L, t = (2k - L + 1)/2L. With k = first + e, (j0 + j - c) t is j e/L, a part of j alone, and the
        rest, that of wave 0. Counted in whole turns so that the phase of a far place is not rounded.
        """
        length = places.length
        zero, lowest = 2 * places.first - (length - 1), 2 * first - (self.count - 1)
        before = np.mod(np.arange(waves) * zero, 2 * length) / (2 * length)
        after = np.mod(lowest * (zero + 2 * np.arange(places.count)), 4 * length) / (4 * length)
        kind = self.samples.dtype
        return np.exp(-2j * np.pi * before).astype(kind), np.exp(-2j * np.pi * after).astype(kind)

    def anywhere(self, rows: Reals, columns: Reals) -> Samples:
        """(components, rows, columns): the field at places given in windows from the middle."""
        down, across = (
            self._matrix(-places if self.mirrored else places, axis) for axis, places in enumerate((rows, columns))
        )
        found: Samples = (
            (down @ self.samples) @ across.T if len(down) <= len(across) else down @ (self.samples @ across.T)
        )
        return found

    def _matrix(self, places: Reals, axis: int) -> Samples:
        order = self.first[axis] + np.arange(self.samples.shape[axis + 1]) - (self.count - 1) / 2
        return np.asarray(np.exp(-2j * np.pi * np.mod(np.outer(places, order), 1.0)) * self.factors[axis])

    def profiles(self, lines: int) -> tuple[Reals, Reals]:
        """Power at each of ``count`` rows and columns of the window, from so many lines of waves only.

        The power in a row of the window is the sum over all columns of waves of what each sends there; columns are
        alike enough that a share of them tells where the light goes.
        """
        down, across = together(lambda axis: self._profile(axis, lines), (1, 2))
        return down, across

    def _profile(self, axis: int, lines: int) -> Reals:
        other = 3 - axis
        stride = max(self.samples.shape[other] // lines, 1)
        some = self.samples[:, :, ::stride] if axis == 1 else self.samples[:, ::stride]
        before = self._before(Places(0, self.count, self.count), axis - 1)
        spectrum = fft.fft(some * (before[:, None] if axis == 1 else before), n=self.count, axis=axis, overwrite_x=True)
        profile: Reals = np.sum(spectrum.real**2 + spectrum.imag**2, axis=(0, other), dtype=float)
        return profile[::-1] if self.mirrored else profile
