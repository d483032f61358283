"""Readings behind a turned plate, condensed to the few angles that tell all others."""

from __future__ import annotations

from dataclasses import replace
from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.studies.tolerance.reading import Reading

__all__ = ["condensed"]

Reals: TypeAlias = NDArray[np.float64]


def condensed(reading: Reading, count: int) -> Reading:
    """The same figures of merit, read at ``count`` equal steps of half a turn.

    Powers behind a plate met once hold 0, 2 and 4 times its angle, so that five readings tell them at any angle:
    S(t + s) = sum_j D(s - s_j) S(t + s_j), with D(x) = (1 + 2 cos 2x + 2 cos 4x)/5. A plate met twice takes nine.

    Parameters
    ----------
    reading : of powers, with a knob.
    count : 2 n + 1, for powers of up to 2 n times the angle.
    """
    nodes = np.pi * np.arange(count) / count
    apart = np.array(reading.steps)[:, None] - nodes
    kernel = (1 + 2 * np.cos(2 * apart[..., None] * np.arange(1, count // 2 + 1)).sum(axis=2)) / count

    def told(rows: Reals) -> Reals:
        return np.asarray(np.einsum("rsk,sj->rjk", rows.reshape(len(rows), -1, 4), kernel)).reshape(len(rows), -1)

    merits = tuple(replace(m, rows=told(m.rows), steps=tuple(nodes.tolist())) for m in reading.merits)
    return replace(reading, merits=merits)
