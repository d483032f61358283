"""From values at pixel centres to values integrated over pixels, by a short filter along each axis."""

from __future__ import annotations

from functools import lru_cache

import numpy as np
from scipy.ndimage import correlate1d

from fastaxis.engines.azimuthal.panels import Reals
from fastaxis.light.gauss import gauss_legendre

__all__ = ["LONGEST", "averaged", "taps"]

LONGEST = 6
"""Neighbours on each side that the longest filter uses."""


@lru_cache(maxsize=LONGEST + 1)
def taps(reach: int) -> Reals:
    """Weights of the neighbours -reach .. reach in the mean over the middle cell.

    The mean of the polynomial through all of them, so exact up to degree 2 reach + 1.

    >>> (taps(1) * 24).round(12)
    array([ 1., 22.,  1.])
    """
    nodes, weights = gauss_legendre(reach + 1)
    near = np.arange(-reach, reach + 1)
    others = [near[near != j] for j in near]
    lagrange = [
        np.prod((nodes[:, np.newaxis] / 2 - rest) / (j - rest), axis=1) for j, rest in zip(near, others, strict=True)
    ]
    return np.asarray(np.array(lagrange) @ weights / 2)


def averaged(samples: Reals, reach: int, parts: int) -> Reals:
    """Means over pixels of ``parts`` x ``parts`` cells; the samples have ``reach`` more cells on every side.

    Parameters
    ----------
    samples : values at the middles of the cells, shape (..., rows + 2 reach, columns + 2 reach).
    """
    inner = slice(reach, -reach) if reach else slice(None)
    if reach:
        samples = correlate1d(samples, taps(reach), axis=-1)[..., inner]
        samples = correlate1d(samples, taps(reach), axis=-2)[..., inner, :]
    if parts == 1:
        return np.asarray(samples)
    *lead, rows, columns = samples.shape
    return np.asarray(samples.reshape(*lead, rows // parts, parts, columns // parts, parts).mean(axis=(-3, -1)))
