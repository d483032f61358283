"""The waves a far plane is made of, kept so that it can be sampled again, more densely, where a camera looks."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.workers import strips

__all__ = ["Places", "Waves"]

Samples = NDArray[Any]


@dataclass(frozen=True)
class Places:
    """Neighbouring places ``parts`` times as dense as samples.

    Parameters
    ----------
    first : the first one, counted in parts of a sample from the first sample.
    count : how many.
    """

    first: int
    count: int


@dataclass(frozen=True, eq=False)
class Waves:
    """A field as waves across its window: the sum of amplitude[j] exp(-2 pi i (j0 + j - c) (m - c)/n), c = (n - 1)/2.

    That is the field at sample m of n along a side, for whole m and for any m in between.

    Parameters
    ----------
    amplitudes : (components, waves, waves).
    first : j0, along either side.
    count : n.
    mirrored : whether m counts from the other end.
    """

    amplitudes: Samples
    first: int
    count: int
    mirrored: bool = False

    def at(self, rows: Places, columns: Places, parts: int) -> Samples:
        """(components, rows, columns): the field at places between the samples.

        Transforms over a window filled up with zeros, first of all columns, then of the rows asked for.
        """
        if self.mirrored:
            rows, columns = (self._from_other_end(places, parts) for places in (rows, columns))
        length, width = parts * self.count, self.amplitudes.shape[-1]
        (before_down, after_down), (before, after) = (self._turns(places, parts) for places in (rows, columns))
        near = np.empty((len(self.amplitudes), rows.count, width), dtype=self.amplitudes.dtype)
        out = np.empty((len(near), rows.count, columns.count), dtype=near.dtype)

        def drop(strip: slice) -> None:
            for part, some in zip(near, self.amplitudes[:, :, strip], strict=True):
                part[:, strip] = fft.fft(some * before_down[:, None], n=length, axis=0)[: rows.count]

        def fill(strip: slice) -> None:
            samples = near[:, strip] * before
            samples *= after_down[strip, None]
            np.multiply(fft.fft(samples, n=length, axis=2)[:, :, : columns.count], after, out=out[:, strip])

        strips(drop, width, length)
        strips(fill, rows.count, length)
        return np.ascontiguousarray(out[:, ::-1, ::-1]) if self.mirrored else out

    def _from_other_end(self, places: Places, parts: int) -> Places:
        return Places(parts * (self.count - 1) - (places.first + places.count - 1), places.count)

    def _turns(self, places: Places, parts: int) -> tuple[Samples, ...]:
        """Factors of the waves before, and of the places after, a transform that counts both from 0.

        With places m = (first + e)/parts: (j0 + j - c)(m - c)/n is j e/(parts n), j (first/parts - c)/n, and the rest,
        that of wave 0. Counted in whole turns so that the phase of a far sample is not rounded.
        """
        n, kind = self.count, self.amplitudes.dtype
        waves = np.arange(self.amplitudes.shape[-1])
        zero, lowest = 2 * places.first - parts * (n - 1), 2 * self.first - (n - 1)
        before = np.mod(waves * zero, 2 * parts * n) / (2 * parts * n)
        after = np.mod(lowest * (zero + 2 * np.arange(places.count)), 4 * parts * n) / (4 * parts * n)
        return tuple(np.exp(-2j * np.pi * turns).astype(kind) for turns in (before, after))
