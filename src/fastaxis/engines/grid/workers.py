"""Work on a plane handed out to threads in strips of rows that stay in a core's cache."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable
from concurrent.futures import ThreadPoolExecutor
from functools import cache
from typing import TypeVar

__all__ = ["WORKERS", "strips", "together"]

WORKERS = os.cpu_count() or 1
STRIP = 1 << 15  # samples in a strip: half a megabyte of complex numbers
ALONE = 1 << 18  # samples below which handing out the work takes longer than it saves

Job = TypeVar("Job")
Done = TypeVar("Done")


@cache
def _pool() -> ThreadPoolExecutor:
    return ThreadPoolExecutor(WORKERS)


# A forked process inherits the pool but none of its threads, and would wait for them for ever.
if hasattr(os, "register_at_fork"):
    os.register_at_fork(after_in_child=_pool.cache_clear)


def together(work: Callable[[Job], Done], jobs: Iterable[Job]) -> list[Done]:
    """The results of all jobs, in order; jobs must not hand out work themselves."""
    return list(_pool().map(work, jobs))


def strips(work: Callable[[slice], Done], rows: int, columns: int, *, times: int = 1) -> list[Done]:
    """The results of some work on every strip of rows of a plane, in order.

    Parameters
    ----------
    times : how often each sample is taken up, for work of more than a few multiplications.
    """
    height = max(STRIP // columns, 1)
    jobs = [slice(start, min(start + height, rows)) for start in range(0, rows, height)]
    return [work(job) for job in jobs] if rows * columns * times < ALONE else together(work, jobs)
