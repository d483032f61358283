"""Watts per pixel from samples of the field, strip by strip, so that no plane of finer samples is ever held."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import product
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.kernel import Block
from fastaxis.engines.grid.light import multiply_separable
from fastaxis.engines.grid.transforms import forward, inverse
from fastaxis.engines.grid.workers import strips, together
from fastaxis.light import stokes

__all__ = ["Collected"]

Images = NDArray[Any]
Complexes = NDArray[Any]

ACROSS = 48  # pixels in one product: few enough for the linear algebra library not to start threads inside ours
OVERLAP = 8  # rows taken at a time, in units of those that have to be taken again


@dataclass(frozen=True, eq=False)
class Collected:
    """Samples of a field, and how the pixels of a raster collect its irradiance.

    Parameters
    ----------
    samples : (1, m, n) times a Jones vector, or (2, m, n) as (Ex, Ey) [sqrt(W)/m].
    jones : (2,) of a uniformly polarized field, else None.
    parts : samples between one of these and the next that irradiance asks for, along either side.
    rows, columns : blocks of pixels that collect from samples ``parts`` times as dense.
    """

    samples: Complexes
    jones: NDArray[np.complex128] | None
    parts: int
    rows: tuple[Block, ...]
    columns: tuple[Block, ...]

    def stokes(self) -> Images:
        """Watts per pixel of S0 .. S3, shape (4, ny, nx)."""
        kind = self.samples.real.dtype
        shape = (self.rows[-1].pixels.stop, self.columns[-1].pixels.stop)
        out = np.zeros((4 if self.jones is None else 1, *shape), dtype=kind)
        for (down, across), samples in self._between():
            rows = [block.every(self.parts, down, kind) for block in self.rows]
            columns = [block.every(self.parts, across, kind) for block in self.columns]
            _collect(out, samples, rows, columns)
        return out if self.jones is None else np.multiply.outer(stokes(self.jones).astype(kind), out[0])

    def _between(self) -> Iterator[tuple[tuple[int, int], Complexes]]:
        """The field moved by each part of a sample along both sides, one after the other."""
        yield (0, 0), self.samples
        if self.parts == 1:
            return
        spectrum = forward(self.samples.copy())
        turns = [_turn(self.samples.shape[-1], part / self.parts) for part in range(self.parts)]
        for down, across in product(range(self.parts), repeat=2):
            if (down, across) != (0, 0):
                moved = spectrum.copy()
                multiply_separable(moved, turns[across], turns[down])
                yield (down, across), inverse(moved)


def _turn(count: int, part: float) -> NDArray[np.complex128]:
    """Factors of the waves that move a curve back by part of a sample; the highest one is shared by both signs."""
    turn: NDArray[np.complex128] = np.exp(2j * np.pi * part * fft.fftfreq(count))
    turn[count // 2] = turn[count // 2].real
    return turn


def _collect(out: Images, samples: Complexes, rows: list[Block], columns: list[Block]) -> None:
    """Add what pixels collect from samples."""
    for group in _groups(rows):
        first, last = group[0].first, group[-1].last
        across = _across(samples, first, last, columns, out)

        def down(block: Block, first: int = first, across: Images = across) -> None:
            near = across[:, block.first - first : block.last - first]
            for start in range(0, out.shape[2], ACROSS):
                pixels = slice(start, start + ACROSS)
                out[:, block.pixels, pixels] += block.matrix @ near[:, :, pixels]

        together(down, group)


def _groups(rows: list[Block]) -> Iterator[list[Block]]:
    """Neighbouring blocks, so many at a time that few rows of samples have to be taken twice."""
    shared = max(one.last - other.first for one, other in zip(rows, rows[1:] or rows, strict=False))
    group: list[Block] = []
    for block in rows:
        group.append(block)
        if block.last - group[0].first > OVERLAP * shared:
            yield group
            group = []
    if group:
        yield group


def _across(samples: Complexes, first: int, last: int, columns: list[Block], out: Images) -> Images:
    """Irradiance in some rows of samples, collected along the rows: (images, rows, pixels)."""
    count = samples.shape[-1]
    across = np.empty((len(out), last - first, out.shape[2]), dtype=out.dtype)

    def fill(strip: slice) -> None:
        images = _irradiance(_wrapped(samples, first + strip.start, first + strip.stop, axis=1))
        for block in columns:
            near = _wrapped(images, block.first, block.last, axis=2)
            np.matmul(near, block.matrix.T, out=across[:, strip, block.pixels])

    strips(fill, last - first, count)
    return across


def _wrapped(array: Images, first: int, last: int, axis: int) -> Images:
    """Places ``first`` to ``last`` along an axis; those beyond an end are those of the other end."""
    if first >= 0 and last <= array.shape[axis]:
        return array[:, first:last] if axis == 1 else array[:, :, first:last]
    return np.take(array, np.arange(first, last), axis=axis, mode="wrap")


def _irradiance(samples: Complexes) -> Images:
    """S0 .. S3 of two components; |u|^2 of one."""
    if len(samples) == 1:
        return np.asarray(samples.real**2 + samples.imag**2)
    (xr, yr), (xi, yi) = samples.real, samples.imag
    px, py = xr * xr + xi * xi, yr * yr + yi * yi
    return np.stack([px + py, px - py, 2 * (xr * yr + xi * yi), 2 * (xi * yr - xr * yi)])
