"""Jones matrices to Mueller matrices: what a uniform part does to Stokes parameters."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["muellers"]

# E^H sigma_k E is S_k, with S3 = 2 Im(Ex Ey*).
SIGMA = np.array([[[1, 0], [0, 1]], [[1, 0], [0, -1]], [[0, 1], [1, 0]], [[0, 1j], [-1j, 0]]])


def muellers(matrices: NDArray[Any]) -> NDArray[np.float64]:
    """Mueller matrices (rows, 4, 4) of Jones matrices (rows, 2, 2): M_ij = tr(sigma_i J sigma_j J^H) / 2.

    >>> muellers(np.diag([1.0, -1.0])[None].astype(complex))[0].diagonal().tolist()
    [1.0, 1.0, -1.0, -1.0]
    """
    turned = matrices[:, None] @ SIGMA @ matrices.conj().swapaxes(1, 2)[:, None]
    # The trace of a product of two matrices is a product of their entries, one of them transposed.
    flat = turned.swapaxes(2, 3).reshape(len(matrices), 4, 4)
    return np.asarray(np.einsum("vjk,ik->vij", flat, SIGMA.reshape(4, 4), optimize=True).real / 2)
