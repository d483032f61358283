"""Frames as weighted sums of a few images, a few thousand pixels and a few frames at a time."""

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
# One product stays in a core's cache: rows of the frames lie a power of two apart, so that more than these would drive
# each other out. And the linear algebra library does not start threads of its own inside ours, which on a busy machine
# wait for each other for seconds.
PIXELS, FRAMES = 8192, 8
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
    frames = np.empty((len(weights), pixels), dtype=images.dtype)
    share = 1 if weights.size * pixels < ALONE else WORKERS

    def fill(first: int) -> None:
        for start in range(first * PIXELS, pixels, share * PIXELS):
            _fill(frames[:, start : start + PIXELS], weights, images[:, start : start + PIXELS])

    if share == 1:
        fill(0)
    else:
        list(_pool().map(fill, range(share)))
    return frames


def _fill(frames: Images, weights: Images, images: Images) -> None:
    """Some pixels of all frames, a few frames at a time."""
    for first in range(0, len(weights), FRAMES):
        part = frames[first : first + FRAMES]
        np.matmul(weights[first : first + FRAMES], images, out=part)
        # To look is cheaper than to write: in most places no analyzer takes the light to the last rounding.
        if part.min() < 0:
            np.maximum(part, 0, out=part)
