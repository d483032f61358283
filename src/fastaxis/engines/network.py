"""Light without a shape on all ways at once: the steady state of a bench by one sparse solve."""

from __future__ import annotations

import warnings
from functools import lru_cache
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy import sparse
from scipy.sparse.linalg import MatrixRankWarning, splu

from fastaxis.engines.uniform import UniformField, started
from fastaxis.errors import ParameterError
from fastaxis.plan import Branch
from fastaxis.plan.network import Network

__all__ = ["fields_at", "run"]

Complexes = NDArray[np.complex128]


def run(branch: Branch) -> UniformField:
    """The light of a branch at its target, whichever way it came and however often round."""
    assert branch.network is not None
    start = started(branch)
    jones = fields_at(branch.network, branch.feed, start.jones)[branch.network.target]
    return UniformField(branch.wavelength, jones, start.area)


def fields_at(network: Network, feed: int, jones: Complexes) -> Complexes:
    """(Ex, Ey) [sqrt(W)] at every port state, shape (n, 2), for light ``jones`` that begins at one of them.

    The field e at each port state is what the others hand on, plus the source: e = M e + s, so (1 - M) e = s.

    Raises
    ------
    ParameterError : light that runs round without loss and in phase has no steady state.
    """
    given = np.zeros(2 * len(network.nodes), dtype=complex)
    given[2 * feed : 2 * feed + 2] = jones
    try:
        found = _solver(network).solve(given)
    except RuntimeError:  # exactly singular
        found = np.full_like(given, np.nan)
    if not _solves(network, found, given):
        found = _least(network, given)
    if not _solves(network, found, given):
        raise ParameterError(
            "light that comes round in phase and without loss builds up for ever",
            got=f"steady state among {', '.join(dict.fromkeys(node[0] for node in network.nodes))}",
            fix='fa.NeutralDensity(transmission=0.99, name="loss")',
        )
    return np.asarray(found.reshape(-1, 2))


def _solves(network: Network, found: Complexes, given: Complexes) -> bool:
    # The residual of a stable solve is a few roundings of the largest field, which a good cavity builds up.
    return bool(np.isfinite(found).all() and abs(_system(network) @ found - given).max() < 1e-9 * abs(given).max())


def _least(network: Network, given: Complexes) -> Complexes:
    """The solution with the least light in it: a ring in resonance that no light enters stays dark."""
    return np.asarray(np.linalg.lstsq(_system(network).toarray(), given, rcond=None)[0])


@lru_cache(maxsize=4)
def _solver(network: Network) -> Any:
    # Four solvers: a question to a bench is usually followed by the next one to the same bench.
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", MatrixRankWarning)
        return splu(_system(network))


@lru_cache(maxsize=4)
def _system(network: Network) -> Any:
    """1 - M, on (Ex, Ey) of all port states."""
    size = 2 * len(network.nodes)
    system = sparse.lil_matrix((size, size), dtype=complex)
    system.setdiag(1)
    for edge in network.edges:
        block = np.array(edge.matrix.matrix) * np.exp(2j * np.pi * edge.turns)
        rows, columns = 2 * edge.end, 2 * edge.start
        system[rows : rows + 2, columns : columns + 2] -= block
    return system.tocsc()
