"""Integrals over pixels of the band-limited curve through samples, from the samples near each pixel only."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

import numpy as np
from numpy.polynomial import chebyshev
from numpy.typing import DTypeLike, NDArray

__all__ = ["Block", "blocks", "reach_for"]

Reals = NDArray[np.float64]

STEEP = 10 * math.pi  # of the window; its error is exp(-STEEP) = 2e-14
DEGREE = 24  # of the polynomials between samples; a wave of 2 pi a sample leaves (pi/2)^24/24! = 1e-19
SIDE = 32  # pixels in a block


@dataclass(frozen=True, eq=False)
class Block:
    """Neighbouring pixels of one axis and the samples they collect from.

    Parameters
    ----------
    pixels : which pixels.
    first : index of the first sample; samples below 0 or beyond the last are those of the other end.
    matrix : (pixels, samples), from irradiance at the samples to its integral over each pixel [m].
    """

    pixels: slice
    first: int
    matrix: NDArray[Any]

    @property
    def last(self) -> int:
        """Index behind the last sample."""
        return self.first + len(self.matrix.T)

    def every(self, parts: int, part: int, kind: DTypeLike) -> Block:
        """The share of each ``parts``-th sample, counted from ``part``, as numbers of another kind."""
        return Block(self.pixels, self.first // parts, np.ascontiguousarray(self.matrix[:, part::parts], dtype=kind))


def reach_for(spare: float) -> int:
    """Half width of the kernel in samples, for samples ``spare`` times as dense as the curve needs.

    The kernel is sinc(t) I0(b sqrt(1 - (t/reach)^2))/I0(b) with b = pi reach (1 - 1/spare): it falls from 1 to 0
    between the highest wave of the curve and its first image, and keeps either to exp(-b). J. F. Kaiser and
    R. W. Schafer, IEEE Trans. Acoust. Speech Signal Process. 28, 105 (1980), for the window.

    >>> reach_for(2.0), reach_for(1.25)
    (20, 50)
    """
    return math.ceil(STEEP / (math.pi * (1 - 1 / spare)) - 1e-9)


@lru_cache(maxsize=16)
def _antiderivative(reach: int) -> Reals:
    """Chebyshev coefficients of the kernel's integral from 0, one row for each stretch [j, j + 1], j = -reach ..."""
    nodes = (np.cos(np.pi * (np.arange(DEGREE + 1) + 0.5) / (DEGREE + 1)) + 1) / 2
    t = np.arange(reach)[:, None] + nodes
    # The exponents would overflow one by one: i0(x)/i0(b) is well below 1 where it is small.
    kernel = np.sinc(t) * np.i0(STEEP * np.sqrt(1 - (t / reach) ** 2)) / np.i0(STEEP)
    rows = [chebyshev.chebint(chebyshev.chebfit(2 * nodes - 1, row, DEGREE), lbnd=-1) / 2 for row in kernel]
    right = np.array(rows)
    right[:, 0] += np.concatenate([[0.0], np.cumsum(right.sum(axis=1))[:-1]])
    # Odd about 0: on [-j - 1, -j] it is minus itself on [j, j + 1] read backwards.
    left = -right[::-1] * (-1.0) ** np.arange(DEGREE + 2)
    return np.concatenate([left, right])


def _steps(places: Reals, samples: NDArray[np.intp], reach: int) -> Reals:
    """(places, samples): the integral of each sample's kernel up to each place, less a half."""
    whole = np.floor(places).astype(int)
    table = chebyshev.chebvander(2 * (places - whole) - 1, DEGREE + 1) @ _antiderivative(reach).T
    apart = whole[:, None] - samples + reach
    inside = np.clip(apart, 0, 2 * reach - 1)
    near = np.take_along_axis(table, inside, axis=1)
    return np.where(apart < 0, -0.5, np.where(apart >= 2 * reach, 0.5, near))


@lru_cache(maxsize=32)
def blocks(
    *, count: int, pitch: float, parts: int, reach: int, pixels: int, pixel: float, middle: float
) -> tuple[Block, ...]:
    """The pixels of one axis of a raster, block by block; what lies outside of the window is dark.

    Parameters
    ----------
    count, pitch : samples at (i - (count - 1)/2) * pitch.
    parts : samples between one of these and the next, for matrices from samples ``parts`` times as dense.
    reach : half width of the kernel in the denser samples.
    pixels, pixel, middle : number of pixels, their side and the place of their middle [m].
    """
    half, step = count * pitch / 2, pitch / parts
    edges = np.clip((np.arange(pixels + 1) - pixels / 2) * pixel + middle, -half, half)
    places = (edges + (count - 1) / 2 * pitch) / step
    return tuple(
        _block(start, places[start : start + SIDE + 1], parts, reach, step) for start in range(0, pixels, SIDE)
    )


def _block(start: int, places: Reals, parts: int, reach: int, step: float) -> Block:
    first = math.floor((math.floor(places[0]) - reach + 1) / parts)
    last = math.ceil((math.floor(places[-1]) + reach + 1) / parts)
    samples = np.arange(first * parts, last * parts)
    matrix = np.diff(_steps(places, samples, reach), axis=0) * step
    return Block(slice(start, start + len(places) - 1), first * parts, matrix)
