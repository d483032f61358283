"""Frames as weighted sums of a few images, a few hundred pixels at a time."""

from __future__ import annotations

import os
from concurrent.futures import ThreadPoolExecutor
from functools import cache
from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["mixed"]

Images = NDArray[Any]

WORKERS = os.cpu_count() or 1
# Multiplications in one block: it stays in a core's cache, and the linear algebra library does not start threads of
# its own inside ours, which on a busy machine wait for each other for seconds.
BLOCK = 1 << 18
ALONE = 1 << 22  # multiplications below which handing out the work takes longer than it saves


@cache
def _pool() -> ThreadPoolExecutor:
    return ThreadPoolExecutor(WORKERS)


def mixed(weights: Images, images: Images) -> Images:
    """The products weights . images without negative roundings: (frames, images), (images, pixels) -> (frames, pixels).

    A dark pixel of a physical field comes out a rounding below zero; power has no sign.
    """
    pixels = images.shape[1]
    weights = np.ascontiguousarray(weights, dtype=images.dtype)
    frames = np.empty((len(weights), pixels), dtype=images.dtype)
    size = max(256, BLOCK // max(weights.size, 1))
    share = 1 if weights.size * pixels < ALONE else WORKERS

    def fill(first: int) -> None:
        # A block of its own: rows of the frames lie a power of two apart and would drive each other from the cache.
        scratch = np.empty((len(weights), size), dtype=images.dtype)
        for start in range(first * size, pixels, share * size):
            part = scratch[:, : min(size, pixels - start)]
            np.matmul(weights, images[:, start : start + size], out=part)
            np.maximum(part, 0, out=frames[:, start : start + size])

    if share == 1:
        fill(0)
    else:
        list(_pool().map(fill, range(share)))
    return frames
