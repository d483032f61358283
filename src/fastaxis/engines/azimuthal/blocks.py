"""Pixels in blocks: a picture is a polynomial on each block, and the mean of a polynomial over a pixel is exact."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import lru_cache
from itertools import pairwise

import numpy as np

from fastaxis.engines.azimuthal.panels import Reals
from fastaxis.engines.azimuthal.products import multiplied
from fastaxis.light.gauss import gauss_legendre

__all__ = ["SETTLED", "Block", "Images", "blocks_along", "collected", "lines_across"]

Images = Callable[[Reals, Reals], Reals]
"""Columns x and rows y [m] to pictures (images, rows, columns)."""

WIDEST = 64  # pixels a block
PROBES = 48  # nodes that a block is looked at with
MOST = 44  # nodes a block at most: below PROBES, or the end of its polynomial is not seen
SPARE = 2  # nodes beyond the last degree that counts: lines between those looked at may be a little finer
SETTLED = 3e-12
"""What is left of the polynomials of a block, as a share of the peak: ten times the rounding of the tables."""

LINES = np.array([0.0, 0.03, 0.1, 0.2, 0.35, 0.6, 1.0])  # from the nearest row to the farthest


@dataclass(frozen=True, eq=False)
class Block:
    """Neighbouring pixels along one side.

    Parameters
    ----------
    pixels : which.
    nodes : Gauss-Legendre nodes [m] of the block.
    means : from values at the nodes to means over the pixels, shape (pixels, nodes).
    """

    pixels: slice
    nodes: Reals
    means: Reals


@lru_cache(maxsize=64)
def _rule(count: int) -> tuple[Reals, Reals]:
    """Gauss-Legendre nodes, and the matrix from values there to Legendre coefficients."""
    nodes, weights = gauss_legendre(count)
    vander = np.polynomial.legendre.legvander(nodes, count - 1)
    return nodes, np.asarray((vander * weights[:, np.newaxis] * (np.arange(count) + 0.5)).T)


@lru_cache(maxsize=256)
def _means(pixels: int, count: int) -> Reals:
    """Means over so many equal pixels of [-1, 1], from values at the nodes."""
    inner, weights = gauss_legendre(count // 2 + 1)
    middles = (2 * np.arange(pixels) + 1) / pixels - 1
    places = middles[:, np.newaxis] + inner / pixels
    return np.asarray(weights / 2 @ np.polynomial.legendre.legvander(places, count - 1) @ _rule(count)[1])


def _edges(count: int) -> list[int]:
    """Borders of the first blocks, the same from both ends; one is in the middle."""
    half = [*range(0, count // 2, WIDEST), count // 2]
    return sorted({0, *half, *(count - place for place in half), count})


def blocks_along(line: Callable[[Reals], Reals], places: Reals, pitch: float, peak: float) -> list[Block] | None:
    """Blocks of pixels on which some lines are polynomials; None if even one pixel needs more than a few nodes.

    Parameters
    ----------
    line : pictures on lines along this side, from places [m], shape (..., len(places)).
    places : pixel centres [m].
    peak : of the pictures.
    """
    waiting = list(pairwise(_edges(len(places))))
    found: dict[int, Block] = {}
    nodes, to_coefficients = _rule(PROBES)
    while waiting:
        middles = np.array([(places[a] + places[b - 1]) / 2 for a, b in waiting])
        halves = np.array([(b - a) * pitch / 2 for a, b in waiting])
        values = line((middles[:, np.newaxis] + halves[:, np.newaxis] * nodes).ravel())
        sizes = abs(values.reshape(-1, len(waiting), PROBES) @ to_coefficients.T).max(axis=0)
        left = np.cumsum(sizes[:, ::-1], axis=1)[:, ::-1]
        again = []
        for (a, b), rest, middle, half in zip(waiting, left, middles, halves, strict=True):
            count = int((rest > SETTLED * peak).sum()) + SPARE
            if count <= MOST:
                found[a] = Block(slice(a, b), middle + half * _rule(count)[0], _means(b - a, count))
            elif b - a == 1:
                return None
            else:
                again += [(a, (a + b) // 2), ((a + b) // 2, b)]
        waiting = again
    return [found[a] for a in sorted(found)]


def lines_across(places: Reals, pitch: float = 0.0) -> Reals:
    """A few of the places, from the nearest to the axis to the farthest: of pixels so wide, to their own edges.

    A picture may lie between the axis and the middle of the nearest pixel, if that is wider than the light.
    """
    distances = abs(places)
    near, far = places[distances.argmin()], places[distances.argmax()]
    near -= np.sign(near) * min(abs(near), pitch / 2)
    far += np.sign(far) * pitch / 2
    return np.unique(near + LINES * (far - near))


def collected(images: Images, rows: list[Block], columns: list[Block], scale: float, out: Reals) -> None:
    """Means over the pixels times ``scale``, written to the rows of ``out`` (images, pixels down, pixels across)."""
    values = images(np.concatenate([b.nodes for b in columns]), np.concatenate([b.nodes for b in rows]))
    across = np.empty((*values.shape[:2], out.shape[2]))
    start = 0
    for block in columns:
        stop = start + len(block.nodes)
        multiplied(values[:, :, start:stop], scale * block.means.T, out=across[:, :, block.pixels])
        start = stop
    start = 0
    for block in rows:
        stop = start + len(block.nodes)
        multiplied(block.means, across[:, start:stop], out=out[:, block.pixels])
        start = stop
