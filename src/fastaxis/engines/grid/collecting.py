"""Watts per pixel from samples of the field, strip by strip, so that no plane of finer samples is ever held."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.kernel import Block
from fastaxis.engines.grid.workers import WORKERS, strips, together
from fastaxis.light import stokes

__all__ = ["Collected"]

Images = NDArray[Any]
Complexes = NDArray[Any]

# Multiplications in one product: few enough for the linear algebra library not to start threads inside ours, which on
# a busy machine wait for each other. Many are asked for in one call, so that our threads don't queue for Python.
PRODUCT = 1 << 18
OVERLAP = 8  # rows or columns taken at a time, in units of those that have to be taken again


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
        out = np.empty((4 if self.jones is None else 1, *shape), dtype=kind)
        rows = [[block.every(self.parts, part, kind) for block in self.rows] for part in range(self.parts)]
        for across, moved in _moved(self.samples, self.parts, axis=2):
            for columns in _groups([block.every(self.parts, across, kind) for block in self.columns]):
                near = _wrapped(moved, columns[0].first, columns[-1].last, axis=2)
                for down, samples in _moved(near, self.parts, axis=1):
                    _collect(out, samples, rows[down], columns, more=bool(across or down))
        return out if self.jones is None else np.multiply.outer(stokes(self.jones).astype(kind), out[0])


def _moved(samples: Complexes, parts: int, axis: int) -> Iterator[tuple[int, Complexes]]:
    """The field moved along one side by each part of a sample, one after the other."""
    yield 0, samples
    moved = np.empty_like(samples) if parts > 1 else samples
    for part in range(1, parts):
        # Transformed anew for each part: a spectrum kept would be one more plane of samples at the peak of memory.
        np.copyto(moved, samples)
        moved = fft.fft(moved, axis=axis, overwrite_x=True, workers=WORKERS)
        turn = _turn(samples.shape[axis], part / parts).astype(samples.dtype)
        moved *= turn if axis == 2 else turn[:, None]
        moved = fft.ifft(moved, axis=axis, overwrite_x=True, workers=WORKERS)
        yield part, moved


def _turn(count: int, part: float) -> NDArray[np.complex128]:
    """Factors of the waves that move a curve back by part of a sample; the highest one is shared by both signs."""
    turn: NDArray[np.complex128] = np.exp(2j * np.pi * part * fft.fftfreq(count))
    turn[count // 2] = turn[count // 2].real
    return turn


def _collect(out: Images, samples: Complexes, rows: list[Block], columns: list[Block], *, more: bool) -> None:
    """What some columns of pixels collect from samples that begin with the first that they need; added if more."""
    start, stop = columns[0].pixels.start, columns[-1].pixels.stop
    for group in _groups(rows):
        first, last = group[0].first, group[-1].last
        across = _across(samples, first, last, columns)

        def down(block: Block, first: int = first, across: Images = across) -> None:
            near = across[:, block.first - first : block.last - first]
            _multiply(block.matrix, near, out[:, block.pixels, start:stop], more=more)

        together(down, group)


def _multiply(matrix: Images, near: Images, out: Images, *, more: bool) -> None:
    """The matrix times each image, in place or added, as one call for many products of some columns."""
    few = max(PRODUCT // matrix.size, 1)
    whole = near.shape[-1] // few * few
    for part, width in ((slice(whole), few), (slice(whole, None), near.shape[-1] - whole)):
        if width:
            ahead, behind = (_side_by_side(images[..., part], width) for images in (near, out))
            if more:
                behind += matrix @ ahead
            else:
                np.matmul(matrix, ahead, out=behind)


def _side_by_side(images: Images, width: int) -> Images:
    """(images, rows, columns) as (images, n, rows, width): the same memory, cut into strips of columns."""
    count, rows, columns = images.shape
    depth, down, along = images.strides
    shape, strides = (count, columns // width, rows, width), (depth, width * along, down, along)
    return np.lib.stride_tricks.as_strided(images, shape, strides)


def _groups(blocks: list[Block]) -> Iterator[list[Block]]:
    """Neighbouring blocks, so many at a time that few samples have to be taken twice."""
    shared = max(one.last - other.first for one, other in zip(blocks, blocks[1:] or blocks, strict=False))
    group: list[Block] = []
    for block in blocks:
        group.append(block)
        if block.last - group[0].first > OVERLAP * shared:
            yield group
            group = []
    if group:
        yield group


def _across(samples: Complexes, first: int, last: int, columns: list[Block]) -> Images:
    """Irradiance in some rows of samples, collected along the rows: (images, rows, pixels)."""
    left, start, stop = columns[0].first, columns[0].pixels.start, columns[-1].pixels.stop
    images = 1 if len(samples) == 1 else 4
    across = np.empty((images, last - first, stop - start), dtype=samples.real.dtype)

    def fill(strip: slice) -> None:
        irradiance = _irradiance(_wrapped(samples, first + strip.start, first + strip.stop, axis=1))
        for block in columns:
            near = irradiance[..., block.first - left : block.last - left]
            pixels = slice(block.pixels.start - start, block.pixels.stop - start)
            np.matmul(near, block.matrix.T, out=across[:, strip, pixels])

    strips(fill, last - first, samples.shape[-1])
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
    images = np.empty((4, *xr.shape), dtype=xr.dtype)
    px, py = xr * xr + xi * xi, yr * yr + yi * yi
    np.add(px, py, out=images[0])
    np.subtract(px, py, out=images[1])
    np.add(xr * yr, xi * yi, out=images[2])
    np.subtract(xi * yr, xr * yi, out=images[3])
    images[2:] *= 2
    return images
