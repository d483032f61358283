"""Matrix products in pieces that the linear algebra library does in our own thread.

Beyond a certain size it starts threads. They take turns with ours: the clock gains little, the processor's time
doubles, since each goes on waiting busily for a tenth of a second, and on a busy machine ours waits as long for them.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["PRODUCT", "multiplied", "product", "transformed", "weighted"]

PRODUCT = 1 << 18
"""Multiplications of real numbers in one product that the library does alone."""
VECTOR = 1 << 12  # and those of a matrix and a single column or row


def multiplied(left: NDArray[Any], right: NDArray[Any], out: NDArray[Any]) -> None:
    """Left @ right into ``out``, any of which may be a stack of matrices; some rows or columns at a time."""
    rows, inner, columns = left.shape[-2], left.shape[-1], right.shape[-1]
    most = VECTOR if 1 in (rows, columns) else PRODUCT
    if out.dtype.kind == "c":
        most //= 4
    if columns >= rows:
        few = max(most // max(rows * inner, 1), 1)
        for start in range(0, columns, few):
            np.matmul(left, right[..., start : start + few], out=out[..., start : start + few])
    else:
        few = max(most // max(columns * inner, 1), 1)
        for start in range(0, rows, few):
            np.matmul(left[..., start : start + few, :], right, out=out[..., start : start + few, :])


def product(left: NDArray[Any], right: NDArray[Any]) -> NDArray[Any]:
    """Left @ right, either a matrix or a stack of as many."""
    lead = np.broadcast_shapes(left.shape[:-2], right.shape[:-2])
    out = np.empty((*lead, left.shape[-2], right.shape[-1]), dtype=np.result_type(left, right))
    multiplied(left, right, out)
    return out


def weighted(numbers: NDArray[Any], values: NDArray[Any]) -> NDArray[Any]:
    """Linear combinations: row i of the numbers gives new values i, shape (len(numbers), *values.shape[1:])."""
    return product(numbers, values.reshape(len(values), -1)).reshape(len(numbers), *values.shape[1:])


def transformed(values: NDArray[np.complex128], matrix: NDArray[np.float64]) -> NDArray[np.complex128]:
    """Values @ matrix for complex values (..., n) and a real matrix (n, m): half the work of a complex product."""
    parts = np.stack([values.real, values.imag]).reshape(-1, values.shape[-1])
    real, imaginary = product(parts, matrix).reshape(2, *values.shape[:-1], matrix.shape[1])
    out = np.empty(real.shape, dtype=complex)
    out.real, out.imag = real, imaginary
    return out
