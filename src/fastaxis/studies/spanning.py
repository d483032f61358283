"""A few rows of a table that all others are linear combinations of."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.linalg import qr, solve_triangular

__all__ = ["Span", "compressed", "products", "spanning", "squares"]

# Coordinates are of order 1 and carry a few roundings of 2e-16; what is left at a hundred of them is noise.
NOISE = 2e-14


@dataclass(frozen=True)
class Span:
    """Rows ``nodes`` of a table, and every row as a combination of them: table = coefficients @ table[nodes].

    Parameters
    ----------
    nodes : indices of rows, shape (r,).
    coefficients : shape (rows, r); a node has itself.
    """

    nodes: NDArray[np.intp]
    coefficients: NDArray[Any]

    @property
    def rank(self) -> int:
        """Number of rows needed."""
        return len(self.nodes)


def spanning(table: NDArray[Any]) -> Span:
    """The fewest rows that span a table, chosen so that no coefficient is large.

    QR with pivoting takes at each step the row farthest from all taken before, and stops when what is left is
    noise: coefficients stay near 1 even where all rows are nearly alike. P. A. Businger and G. H. Golub, Numer. Math.
    7, 269 (1965).

    Parameters
    ----------
    table : shape (rows, columns), complex or real.

    Examples
    --------
    >>> angles = np.linspace(0, 3, 100)
    >>> len(spanning(np.stack([np.ones(100), np.cos(2 * angles), np.sin(2 * angles)], axis=1)).nodes)
    3
    """
    _, upper, order = qr(table.T, mode="economic", pivoting=True)
    sizes = abs(np.diagonal(upper))
    rank = max(1, int(np.count_nonzero(sizes > NOISE * sizes[0])))
    coefficients = np.zeros((len(table), rank), dtype=table.dtype)
    coefficients[order[:rank]] = np.eye(rank)
    if sizes[0] > 0:
        coefficients[order[rank:]] = solve_triangular(upper[:rank, :rank], upper[:rank, rank:]).T
    return Span(order[:rank], coefficients)


def products(one: NDArray[Any], other: NDArray[Any]) -> NDArray[Any]:
    """All products of an entry of one table and an entry of the other, row by row: (rows, m n)."""
    return np.asarray(np.einsum("vi,vj->vij", one, other)).reshape(len(one), -1)


def squares(table: NDArray[np.complex128]) -> NDArray[np.float64]:
    """The real numbers that a power is linear in, where a field is linear in the rows: (rows, columns^2).

    |c_i|^2, and the real and imaginary parts of c_i* c_j for each pair.
    """
    first, second = np.triu_indices(table.shape[1])
    pairs = table[:, first].conj() * table[:, second]
    return np.concatenate([pairs.real, pairs.imag[:, first < second]], axis=1)


def compressed(table: NDArray[np.complex128]) -> NDArray[np.complex128]:
    """A table with as few columns as possible whose rows have the same linear relations."""
    left, sizes, _ = np.linalg.svd(table, full_matrices=False)
    kept = sizes > NOISE / 10 * sizes[0]
    return np.asarray(left[:, kept] * sizes[kept])
