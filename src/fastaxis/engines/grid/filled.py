"""How much of the band of its samples a field fills, and how much its irradiance."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.workers import strips

__all__ = ["EMPTY", "beat", "filled", "lit", "marginals"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complexfloating[Any, Any]]

# Share of the power that is rounding: 3e-13 of the field, a thousand roundings; in single precision 1e-6 of it, ten.
EMPTY = {np.dtype(np.complex128): 1e-25, np.dtype(np.complex64): 1e-12}
# A wave of irradiance, as a share of the power, that is no more than what the kernel of a pixel leaves of each.
FAINT = {np.dtype(np.complex128): 1e-14, np.dtype(np.complex64): 1e-7}


def marginals(samples: Complexes) -> tuple[Reals, Reals]:
    """Squares of all components summed along rows and along columns: one number a row, one a column."""
    rows, columns = samples.shape[-2:]
    down = np.zeros(rows)

    def add(strip: slice) -> Reals:
        real = samples[:, strip].view(samples.real.dtype)
        squares = np.einsum("kij,kij->ij", real, real)
        down[strip] = squares.sum(axis=1)
        return np.asarray(squares.sum(axis=0).reshape(columns, 2).sum(axis=1), dtype=float)

    across = sum(strips(add, rows, columns))
    return down, np.asarray(across)


def filled(samples: Complexes, order: NDArray[np.floating[Any]]) -> int:
    """Waves along a side, from -m to +m, that hold all but rounding of the power.

    Parameters
    ----------
    samples : (components, n, n), one for each wave.
    order : of the waves along either side, in cycles a window.
    """
    down, across = marginals(samples)
    by_order = np.bincount(np.ceil(abs(order)).astype(int), down + across)
    beyond = np.cumsum(by_order[::-1])[::-1]
    needed = np.nonzero(beyond > EMPTY[samples.dtype] * beyond[0])[0]
    return 2 * (int(needed[-1]) + 1) if needed.size else 2


def lit(marginal: Reals, kind: np.dtype[Any]) -> slice:
    """The stretch of a line that holds all but rounding of its power; one sample of a dark one."""
    least = EMPTY[kind] / 2 * marginal.sum()
    before, after = np.cumsum(marginal), np.cumsum(marginal[::-1])
    if before[-1] == 0:
        return slice(0, 1)
    first, left = int(np.argmax(before > least)), int(np.argmax(after > least))
    return slice(first, len(marginal) - left)


def beat(marginal: Reals, kind: np.dtype[Any]) -> int:
    """Highest order of irradiance that waves make together, in cycles a window, but for faint ones.

    Waves d apart make the order d. By Cauchy and Schwarz they make no more of it, whatever their phases, than the sum
    of root(power of one x power of the other); power here is that of all waves of one order along the line.
    """
    root = np.sqrt(marginal)
    most = np.correlate(root, root, mode="full")[len(root) - 1 :]
    return int(np.nonzero(most >= FAINT[kind] * most[0])[0][-1]) + 1
