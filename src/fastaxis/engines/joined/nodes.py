"""Places at which fringes are looked at, and what each pixel of a camera collects of them."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy import sparse
from scipy.special import i0

from fastaxis.light.gauss import gauss_legendre

__all__ = ["Axis", "nodes_needed"]

Reals = NDArray[np.float64]

SETTLED = 1e-11
"""Error of a pixel, as a share of the brightest irradiance times its area: that of the engines under the arms."""
FINER = 4  # places for each period of the finest fringe, twice what it needs, which leaves room for a short kernel
REACH = 17  # half width of the kernel in places; its error is exp(-pi REACH/2) = 3e-12
LARGEST = 24  # nodes in one stretch; a pixel that spans many fringes is cut into stretches


def nodes_needed(turns: float) -> int:
    """Gauss-Legendre nodes for the mean of a fringe that runs through this many turns across the pixel.

    The error of n nodes on cos(s t), -1 < t < 1, is at most 2^(2n+1) (n!)^4 s^(2n) / ((2n + 1) (2n)!^3), s = pi turns
    (P. J. Davis and P. Rabinowitz, Methods of Numerical Integration (1984), section 2.7); half of it, for the mean.

    >>> nodes_needed(0.0), nodes_needed(0.02), nodes_needed(1.0)
    (1, 3, 9)
    """
    s, n = math.pi * turns, 1
    while n < LARGEST and s > 0:
        log = 2 * n * math.log(2 * s) + 4 * math.lgamma(n + 1) - 3 * math.lgamma(2 * n + 1) - math.log(2 * n + 1)
        if log < math.log(SETTLED):
            break
        n += 1
    return n


@dataclass(frozen=True)
class Axis:
    """One axis of a camera.

    Parameters
    ----------
    places : where the fields are asked for [m].
    matrix : (pixels, places) [m], from irradiance at the places to its integral over each pixel.
    """

    places: Reals
    matrix: Any

    @classmethod
    def of(cls, middles: Reals, pixel: float, frequency: float) -> Axis:
        """For irradiance of at most this spatial frequency [1/m], by whichever way asks for fewer places.

        Fringes much wider than a pixel are a curve through places further apart than pixels; finer ones are
        integrated inside each pixel.
        """
        if frequency > 0:
            step = _rounded(1 / (FINER * frequency * pixel))
            count = len(middles) / step + 2 * REACH + 2
            if step > 1 / 2 and count < len(middles) * _nodes_inside(pixel * frequency):
                return _between(middles, pixel, step)
        return cls.inside(middles, pixel, frequency)

    @classmethod
    def inside(cls, middles: Reals, pixel: float, frequency: float) -> Axis:
        """Places inside each pixel by itself; the pixels may lie anywhere."""
        stretches = _stretches(pixel * frequency)
        side = pixel / stretches
        nodes, weights = gauss_legendre(nodes_needed(side * frequency))
        starts = (np.arange(stretches) - (stretches - 1) / 2) * side
        offsets = (starts[:, np.newaxis] + nodes * side / 2).ravel()
        row = np.tile(weights * side / 2, stretches)
        matrix = sparse.kron(sparse.identity(len(middles)), row[np.newaxis], format="csc")
        return cls((middles[:, np.newaxis] + offsets).ravel(), matrix)


def _stretches(turns: float) -> int:
    return max(1, math.ceil(turns / 4))


def _nodes_inside(turns: float) -> int:
    return _stretches(turns) * nodes_needed(turns / _stretches(turns))


def _rounded(step: float) -> float:
    """A little less, in steps of an eighth of an octave: beams much alike are read at the same places."""
    return float(2 ** (math.floor(8 * math.log2(step)) / 8))


def _between(middles: Reals, pixel: float, step: float) -> Axis:
    """The integral over each pixel of the curve through places so many pixels apart about the camera."""
    places, matrix = _interpolated(len(middles), step)
    return Axis((middles[0] + middles[-1]) / 2 + places * pixel, matrix * pixel)


@lru_cache(maxsize=16)
def _interpolated(count: int, step: float) -> tuple[Reals, Any]:
    """Places about a row of pixels and the matrix to means over each, all in pixels.

    The kernel is sinc(t) I0(b sqrt(1 - (t/REACH)^2))/I0(b) with b = pi REACH/2, t in places: for a curve of half the
    band of the places it interpolates to exp(-b). J. F. Kaiser and R. W. Schafer, IEEE Trans. Acoust. Speech Signal
    Process. 28, 105 (1980), for the window.
    """
    many = math.ceil(count / step + 2 * REACH) + 1
    places = (np.arange(many) - (many - 1) / 2) * step
    nodes, weights = gauss_legendre(nodes_needed(1 / step))
    middles = np.arange((count + 1) // 2) - (count - 1) / 2  # and their mirror images
    # A row holds only the places within reach of its pixel: all of them would fill the memory of a large camera.
    far = REACH + 1 / (2 * step)
    width = math.floor(2 * far) + 1
    first = np.clip(np.ceil(middles / step + (many - 1) / 2 - far).astype(int), 0, many - width)
    near = first[:, np.newaxis] + np.arange(width)
    apart = (middles[:, np.newaxis] - places[near]) / step
    kernel: Any = sum(w / 2 * _kernel(apart + node / step / 2) for node, w in zip(nodes, weights, strict=True))
    turned = slice(count // 2 - 1, None, -1) if count > 1 else slice(0)
    values = np.concatenate([kernel, kernel[turned]])
    columns = np.concatenate([near, many - 1 - near[turned]])
    rows: Any = (values.ravel(), columns.ravel(), width * np.arange(count + 1))
    return np.asarray(places), sparse.csr_array(rows, shape=(count, many)).tocsc()


def _kernel(t: Reals) -> Reals:
    inside = np.clip(1 - (t / REACH) ** 2, 0.0, None)
    steep = math.pi * REACH / 2
    return np.asarray(np.where(inside > 0, np.sinc(t) * i0(steep * np.sqrt(inside)) / i0(steep), 0.0))
