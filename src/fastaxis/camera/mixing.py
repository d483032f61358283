"""Frames as weighted sums of a few images, a few thousand pixels and a few frames at a time."""

from __future__ import annotations

import os
from concurrent.futures import ThreadPoolExecutor
from functools import cache
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.recycled import empty

__all__ = ["mixed"]

Images = NDArray[Any]

WORKERS = os.cpu_count() or 1
# One product stays in a core's cache: rows of the frames lie a power of two apart, so that more than these would drive
# each other out. And the linear algebra library does not start threads of its own inside ours, which on a busy machine
# wait for each other for seconds.
PIXELS, FRAMES = 8192, 8
STRETCH = 8  # products along a frame before the next few frames: pages of memory are then met one after the other
ALONE = 1 << 22  # multiplications below which handing out the work takes longer than it saves


@cache
def _pool() -> ThreadPoolExecutor:
    return ThreadPoolExecutor(WORKERS)


# A forked process inherits the pool but none of its threads, and would wait for them for ever.
if hasattr(os, "register_at_fork"):
    os.register_at_fork(after_in_child=_pool.cache_clear)


def mixed(weights: Images, images: Images) -> Images:
    """The products weights . images without negative roundings: (frames, images), (images, pixels) -> (frames, pixels).

    A dark pixel of a physical field comes out a rounding below zero; power has no sign.
    """
    pixels = images.shape[1]
    weights = np.ascontiguousarray(weights, dtype=images.dtype)
    frames: Images = empty((len(weights), pixels), dtype=images.dtype)

    def fill(start: int) -> None:
        stretch = slice(start, start + STRETCH * PIXELS)
        _fill(frames[:, stretch], weights, images[:, stretch])

    jobs = range(0, pixels, STRETCH * PIXELS)
    if weights.size * pixels < ALONE:
        for start in jobs:
            fill(start)
    else:
        list(_pool().map(fill, jobs))
    return frames


def _fill(frames: Images, weights: Images, images: Images) -> None:
    """Some pixels of all frames, a few frames at a time."""
    for first in range(0, len(weights), FRAMES):
        few = slice(first, first + FRAMES)
        for start in range(0, frames.shape[1], PIXELS):
            here = slice(start, start + PIXELS)
            part = frames[few, here]
            np.matmul(weights[few], images[:, here], out=part)
            # To look is cheaper than to write: in most places no analyzer takes the light to the last rounding.
            if part.min() < 0:
                np.maximum(part, 0, out=part)
