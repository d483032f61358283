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
ROUNDINGS = 32  # of a sum of four products, its weights and the squares that tell how far from zero it is; at most


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
    within = _within(weights.T, 1 + 4 * np.finfo(images.dtype).eps)

    def fill(first: int) -> None:
        scratch = np.empty((FRAMES, PIXELS), dtype=images.dtype)
        for start in range(first * PIXELS, pixels, share * PIXELS):
            few = images[:, start : start + PIXELS]
            _fill(frames[:, start : start + PIXELS], weights, few, None if within and _lit(few) else scratch)

    if share == 1:
        fill(0)
    else:
        list(_pool().map(fill, range(share)))
    return frames


def _fill(frames: Images, weights: Images, images: Images, scratch: Images | None) -> None:
    """Some pixels of all frames; by way of ``scratch`` where a sum may come out below zero."""
    for first in range(0, len(weights), FRAMES):
        out, some = frames[first : first + FRAMES], weights[first : first + FRAMES]
        if scratch is None:
            np.matmul(some, images, out=out)
        else:
            part = scratch[: len(some), : images.shape[1]]
            np.matmul(some, images, out=part)
            np.maximum(part, 0, out=out)


def _within(images: Images, most: float) -> bool:
    """Whether the first of four images is positive and, times ``most``, above the root of the others' squares."""
    if len(images) != 4:
        return False
    first, *others = images.astype(float, copy=False)
    return bool(np.all(first > 0) and np.all(sum(other * other for other in others) < (most * first) ** 2))


def _lit(images: Images) -> bool:
    """Whether each pixel has so much unpolarized light that behind no analyzer a rounding takes it below zero."""
    return _within(images, 1 - ROUNDINGS * float(np.finfo(images.dtype).eps))
