"""Watts per pixel from samples of the field, strip by strip, so that no plane of finer samples is ever held."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import partial
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.kernel import Block
from fastaxis.engines.grid.waves import FarRows
from fastaxis.engines.grid.workers import WORKERS, strips, together
from fastaxis.light import stokes
from fastaxis.recycled import scratch

__all__ = ["Collected", "stokes_from"]

Images: TypeAlias = NDArray[Any]
Complexes: TypeAlias = NDArray[Any]
Rows: TypeAlias = Callable[[int, int], Complexes]
"""Samples from one row to before another; rows beyond an end are those of the other end."""

# Multiplications in one product: few enough for the linear algebra library not to start threads inside ours, which on
# a busy machine wait for each other. Many are asked for in one call, so that our threads don't queue for Python.
PRODUCT = 1 << 18
OVERLAP = 16  # rows or columns taken at a time, in units of those that have to be taken again


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
        if self.parts == 1:
            return stokes_from(self.samples, self.jones, self.rows, self.columns)
        out = _images(len(self.samples), self.samples.dtype, self.rows, self.columns)
        self._collect_moved(self.samples, out)
        return _polarized(out, self.jones)

    def _collect_moved(self, samples: Complexes, out: Images) -> None:
        """From samples and from these moved by each part of one, some columns at a time."""
        rows = [[block.every(self.parts, part, out.dtype) for block in self.rows] for part in range(self.parts)]
        for across, moved in _moved(samples, self.parts, axis=2):
            for columns in _groups([block.every(self.parts, across, out.dtype) for block in self.columns]):
                near = _wrapped(moved, columns[0].first, columns[-1].last, axis=2)
                for down, there in _moved(near, self.parts, axis=1):
                    _collect(out, partial(_wrapped, there, axis=1), rows[down], columns, more=bool(across or down))


def stokes_from(
    samples: Complexes | FarRows,
    jones: NDArray[np.complex128] | None,
    rows: tuple[Block, ...],
    columns: tuple[Block, ...],
) -> Images:
    """Watts per pixel of S0 .. S3, shape (4, ny, nx), from samples as dense as irradiance asks for.

    Parameters
    ----------
    samples : as of :class:`Collected`; or what gives them row by row, with any phase that both components share.
    """
    kind = np.empty(0, samples.dtype).real.dtype
    out = _images(1 if jones is not None else 2, samples.dtype, rows, columns)
    own = [[block.every(1, 0, kind) for block in line] for line in (rows, columns)]
    _collect(out, partial(_near, samples, own[1]), *own, more=False)
    return _polarized(out, jones)


def _images(components: int, kind: np.dtype[Any], rows: tuple[Block, ...], columns: tuple[Block, ...]) -> Images:
    shape = (rows[-1].pixels.stop, columns[-1].pixels.stop)
    return scratch((4 if components == 2 else 1, *shape), np.empty(0, kind).real.dtype)


def _polarized(images: Images, jones: NDArray[np.complex128] | None) -> Images:
    return images if jones is None else np.multiply.outer(stokes(jones).astype(images.dtype), images[0])


def _near(samples: Complexes | FarRows, columns: list[Block], first: int, last: int) -> Complexes:
    """Some rows, from the first sample that some columns of pixels need to the last one."""
    rows = samples.rows(first, last) if isinstance(samples, FarRows) else _wrapped(samples, first, last, axis=1)
    return _wrapped(rows, columns[0].first, columns[-1].last, axis=2)


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


def _collect(out: Images, samples: Rows, rows: list[Block], columns: list[Block], *, more: bool) -> None:
    """What some columns of pixels collect from samples that begin with the first that they need; added if more."""
    start, stop = columns[0].pixels.start, columns[-1].pixels.stop
    for group in _groups(rows):
        first, last = group[0].first, group[-1].last
        across = scratch((last - first, len(out), stop - start), out.dtype)
        _fill(across, samples, first, columns)

        def down(block: Block, first: int = first, across: Images = across) -> None:
            near = across[block.first - first : block.last - first].swapaxes(0, 1)
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


def _fill(across: Images, samples: Rows, first: int, columns: list[Block]) -> None:
    """Irradiance in some rows of samples, collected along the rows: (rows, images, pixels)."""
    left, start, (height, images, pixels) = columns[0].first, columns[0].pixels.start, across.shape
    few = max(PRODUCT // max(block.matrix.size for block in columns) // images, 1)

    def fill(strip: slice) -> None:
        for begin in range(strip.start, strip.stop, few):
            end = min(begin + few, strip.stop)
            # The images of a row lie side by side, so that all of some rows go through one product.
            irradiance = _irradiance(samples(first + begin, first + end)).reshape(images * (end - begin), -1)
            here = across[begin:end].reshape(images * (end - begin), pixels)
            for block in columns:
                near = irradiance[:, block.first - left : block.last - left]
                np.matmul(near, block.matrix.T, out=here[:, block.pixels.start - start : block.pixels.stop - start])

    strips(fill, height, columns[-1].last - left, times=images * columns[0].matrix.shape[1])


def _wrapped(array: Images, first: int, last: int, axis: int) -> Images:
    """Places ``first`` to ``last`` along an axis; those beyond an end are those of the other end."""
    if first >= 0 and last <= array.shape[axis]:
        return array[:, first:last] if axis == 1 else array[:, :, first:last]
    return np.take(array, np.arange(first, last), axis=axis, mode="wrap")


def _irradiance(samples: Complexes) -> Images:
    """S0 .. S3 of two components, |u|^2 of one: (rows, images, columns)."""
    if len(samples) == 1:
        return np.asarray(samples.real**2 + samples.imag**2).swapaxes(0, 1)
    # Side by side in memory first: all that follows is then twice as fast.
    real, imaginary = np.ascontiguousarray(samples.real), np.ascontiguousarray(samples.imag)
    (xr, yr), (xi, yi) = real, imaginary
    images = np.empty((len(xr), 4, xr.shape[1]), dtype=xr.dtype)
    np.add(xr * yr, xi * yi, out=images[:, 2])
    np.subtract(xi * yr, xr * yi, out=images[:, 3])
    images[:, 2:] *= 2
    real *= real
    imaginary *= imaginary
    real += imaginary
    np.add(real[0], real[1], out=images[:, 0])
    np.subtract(real[0], real[1], out=images[:, 1])
    return images
