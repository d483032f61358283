"""Matrix products in pieces that the linear algebra library does in our own thread."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["PRODUCT", "multiplied"]

PRODUCT = 1 << 18
"""Multiplications in one product, few enough for the library not to start threads.

Those take turns with ours: the clock gains little, the processor's time doubles, and on a busy machine they wait for
each other for tenths of a second.
"""


def multiplied(left: NDArray[Any], right: NDArray[Any], out: NDArray[Any]) -> None:
    """left @ right into ``out``, any of which may be a stack of matrices; some rows or columns at a time."""
    rows, inner, columns = left.shape[-2], left.shape[-1], right.shape[-1]
    if columns >= rows:
        few = max(PRODUCT // (rows * inner), 1)
        for start in range(0, columns, few):
            np.matmul(left, right[..., start : start + few], out=out[..., start : start + few])
    else:
        few = max(PRODUCT // (columns * inner), 1)
        for start in range(0, rows, few):
            np.matmul(left[..., start : start + few, :], right, out=out[..., start : start + few, :])
