"""Memory that earlier answers no longer need: new memory costs as long to get as frames take to fill it.

The system clears new memory before it hands it out. A camera looked at again and again, while knobs are turned, asks
for as much each time; so memory of frames that nobody holds any more is offered back to the system, which takes it when
it needs it, and is used for the next frames if it did not.
"""

from __future__ import annotations

import mmap
import weakref
from collections import deque
from contextlib import suppress
from typing import Any

import numpy as np
from numpy.typing import DTypeLike, NDArray

__all__ = ["empty", "give_up", "keep", "scratch"]

PAGE = 1 << 21  # bytes of the system's large pages
SMALLEST = 2 * PAGE  # below this much numpy's own memory is as fast
KEPT = 1 << 30  # bytes offered back in all, if not set otherwise
SCRATCH = 1 << 26  # bytes of a plane between two steps that are worth keeping for the next question

SMALL = 1 << 22  # bytes of arrays that engines take and give back all the time

# The GNU C library gets memory beyond 128 kB from the system and gives it back at once, so that half of the time goes
# into clearing pages, until a larger stretch has been given back: from then on it keeps what is smaller (mallopt(3),
# M_MMAP_THRESHOLD). Large planes no longer come from it, so one is asked for and let go here. It is never written to.
np.empty(SMALL, dtype=np.uint8)

# Only where the system can be offered memory without losing it at once.
OFFERED = getattr(mmap, "MADV_FREE", None)

_free: deque[mmap.mmap] = deque()
_kept = KEPT


class _Held:
    """A stretch of memory as long as any array looks at it; views of views of it keep this alone alive."""

    __slots__ = ("__array_interface__", "__weakref__", "_memory")

    def __init__(self, memory: mmap.mmap, shape: tuple[int, ...], dtype: np.dtype[Any]) -> None:
        self._memory = np.frombuffer(memory, dtype=np.uint8)
        place = self._memory.ctypes.data, False
        self.__array_interface__ = {"shape": shape, "typestr": dtype.str, "data": place, "version": 3}


def empty(shape: tuple[int, ...], dtype: DTypeLike = float) -> NDArray[Any]:
    """An array with anything in it, as of ``numpy.empty``, in memory used before if there is such.

    >>> empty((3, 2)).shape
    (3, 2)
    """
    kind = np.dtype(dtype)
    size = int(np.prod(shape)) * kind.itemsize
    if size < SMALLEST or OFFERED is None:
        return np.empty(shape, dtype=kind)
    try:
        memory = _taken(-(-size // PAGE) * PAGE)
    except OSError:  # none to be had in this way; numpy finds some, or says in its words that there is none
        return np.empty(shape, dtype=kind)
    held = _Held(memory, shape, kind)
    weakref.finalize(held, _give_back, memory).atexit = False
    return np.asarray(held)


def scratch(shape: tuple[int, ...], dtype: DTypeLike = float) -> NDArray[Any]:
    """As :func:`empty`, for planes that are gone with the answer; where they are so large that memory counts for more
    than time, they leave nothing behind.

    >>> scratch((3, 2), complex).dtype
    dtype('complex128')
    """
    size = int(np.prod(shape)) * np.dtype(dtype).itemsize
    return np.empty(shape, dtype=dtype) if size > SCRATCH else empty(shape, dtype)


def keep(up_to: int) -> None:
    """Hold so many bytes that nobody needs, at most; all others go for good."""
    global _kept  # noqa: PLW0603 - one setting of the process, as its memory is one
    _kept = up_to
    _let_go()


def give_up() -> None:
    """Let all memory go that nobody needs."""
    _free.clear()


def _taken(size: int) -> mmap.mmap:
    """Memory of exactly this size, so that few frames never hold the memory of many."""
    for _ in range(len(_free)):
        try:
            memory = _free.popleft()
        except IndexError:  # another thread took it
            break
        if len(memory) == size:
            return memory
        _free.append(memory)
    memory = mmap.mmap(-1, size, flags=mmap.MAP_PRIVATE | mmap.MAP_ANONYMOUS)
    if hasattr(mmap, "MADV_HUGEPAGE"):
        with suppress(OSError):  # a system built without large pages
            memory.madvise(mmap.MADV_HUGEPAGE)
    return memory


def _give_back(memory: mmap.mmap) -> None:
    """Offer memory to the system, unless it is too much to be kept.

    Called wherever the last array goes, in any thread and amid any work: a deque needs no lock. Where the system does
    not take the offer the memory goes at once.
    """
    if OFFERED is not None and len(memory) <= _kept:
        with suppress(OSError):
            memory.madvise(OFFERED)
            _free.append(memory)
    _let_go()


def _let_go() -> None:
    """What was longest unused goes for good."""
    with suppress(IndexError):  # another thread was faster
        while sum(map(len, list(_free))) > _kept:
            _free.popleft()
