"""Seeded draws, worked off in batches by any executor, in the order they finish."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from concurrent.futures import FIRST_COMPLETED, Executor, Future, wait
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.studies.tolerance.checkpoint import Checkpoint
from fastaxis.studies.tolerance.working import Anew, Work

__all__ = ["batch_size", "shares", "work_off"]

Reals: TypeAlias = NDArray[np.float64]
WAITING = 16  # batches handed to an executor at a time; enough to keep it busy


def shares(draws: int, errors: int, seed: int) -> Reals:
    """Even random numbers (draws, errors): the same for a seed, whoever works them off in whatever batches."""
    return np.random.default_rng(seed).random((draws, errors))


def batch_size(works: Sequence[Work]) -> int:
    """Draws of a batch: about a second of work."""
    return 4 if any(isinstance(work, Anew) for work in works) else 500


def batch(parts: Sequence[Work]) -> Reals:
    """The figures of merit (draws, merits) of one batch; runs anywhere, since all it needs comes along."""
    columns = np.concatenate([part.reading.columns for part in parts]).astype(int)
    return np.concatenate([part.values() for part in parts], axis=1)[:, np.argsort(columns)]


def work_off(
    works: Sequence[Work],
    kept: Checkpoint,
    *,
    size: int,
    executor: Executor | None,
    progress: Callable[[int, int], None] | None,
) -> Reals:
    """The figures of merit of all draws, (draws, merits); what the checkpoint holds is not done again."""
    draws = len(kept.done)
    starts = [start for start in range(0, draws, size) if not kept.done[start : start + size].all()]

    def finished(start: int, values: Reals) -> None:
        kept.keep(start, values)
        if progress is not None:
            progress(int(kept.done.sum()), draws)

    def parts(start: int) -> list[Work]:
        return [work.rows(slice(start, min(start + size, draws))) for work in works]

    if executor is None:
        for start in starts:
            finished(start, batch(parts(start)))
        return kept.values
    running: dict[Future[Reals], int] = {}
    waiting: list[Any] = starts[::-1]
    try:
        while waiting or running:
            while waiting and len(running) < WAITING:
                start = waiting.pop()
                running[executor.submit(batch, parts(start))] = start
            for future in wait(running, return_when=FIRST_COMPLETED).done:
                finished(running.pop(future), future.result())
    finally:
        for future in running:
            future.cancel()
    return kept.values
