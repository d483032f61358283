"""What interference adds to the power at a port, and takes from another."""

from __future__ import annotations

import math
from collections.abc import Sequence
from importlib import import_module
from itertools import combinations
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import PlaneField
from fastaxis.engines.joined.extent import Extent
from fastaxis.light import stokes

__all__ = ["places", "total", "total_of_sums"]

Complexes = NDArray[np.complex128]
Reals = NDArray[np.float64]

FEW = 6  # arms, 15 pairs
MOST = 4096  # samples along a side; edges and singularities ask for more than pays
BLOCK = 1 << 18  # places at which fields are held at a time


def total(field: PlaneField) -> Reals:
    """S0 .. S3 of all the light of one field [W]; of a plane wave, on the area its power is counted on."""
    return np.asarray(field.total_stokes)


def total_of_sums(arms: Sequence[PlaneField], mixtures: Complexes, extent: Extent, engines: Sequence[str]) -> Reals:
    """S0 .. S3 [W] of coherent sums of arms, whose powers add.

    What the arms have by themselves is their own engines'. What interference adds is |sum|^2 less the sum of
    |arm|^2 on equally spaced samples, which for light that falls off on all sides and has a band is exact to
    rounding. The samples are the same at every port of a splitter and stand symmetric about the axis, so that what
    one port gains another loses to the last digits. Of a few arms of harmonics, which add only where they turn alike,
    it is an integral along the radius for each pair.
    """
    shares = np.sum(abs(mixtures) ** 2, axis=0)
    alone = sum(share * total(arm) for share, arm in zip(shares, arms, strict=True))
    if np.count_nonzero(mixtures, axis=1).max() == 1:  # each sum has an arm to itself
        return np.asarray(alone)
    if len(arms) <= FEW and all(engine == "azimuthal" for engine in engines):
        return np.asarray(alone + _by_pairs(arms, mixtures, math.sqrt(2) * extent.shared_half))
    x, pitch = places(extent)
    for arm in arms:  # engines that work out a plane as far as they are asked do so once if the corner comes first
        arm.at(x[-1:] + pitch, x[-1:] + pitch)
    added, rows = np.zeros(4), max(1, BLOCK // len(x))
    for first in range(0, len(x), rows):
        added += _added(arms, mixtures, shares, x, x[first : first + rows])
    return np.asarray(alone + added * pitch**2 + _beyond(arms, mixtures, engines))


def _beyond(arms: Sequence[PlaneField], mixtures: Complexes, engines: Sequence[str]) -> Any:
    """What is beyond the band of all samples interferes as well, and is in no field: dark ports would be too bright."""
    sampled = [place for place, engine in enumerate(engines) if engine == "grid"]
    if len(sampled) < 2:
        return 0.0
    return import_module("fastaxis.engines.grid").steep_added([arms[i] for i in sampled], mixtures[:, sampled])


def _by_pairs(arms: Sequence[PlaneField], mixtures: Complexes, reach: float) -> Reals:
    overlap = import_module("fastaxis.engines.azimuthal").overlap
    degrees = mixtures.conj().T @ mixtures
    both = sum(
        degrees[i, j] * overlap(arms[i], arms[j], reach) for i, j in combinations(range(len(arms)), 2) if degrees[i, j]
    )
    (xx, xy), (yx, yy) = np.zeros((2, 2)) + both  # integrals of conj(E_i) E_j; the other order is the adjoint
    s2, s3 = 2 * (xy + yx.conj()).real, -2 * (xy + yx.conj()).imag
    return np.array([2 * (xx + yy).real, 2 * (xx - yy).real, s2, s3])


def _added(arms: Sequence[PlaneField], mixtures: Complexes, shares: Reals, x: Reals, y: Reals) -> Reals:
    sums = np.zeros((len(mixtures), 2, len(y), len(x)), dtype=complex)
    added = np.zeros(4)
    for arm, numbers, share in zip(arms, mixtures.T, shares, strict=True):
        field = arm.at(x, y)
        added -= share * stokes(field).sum(axis=(1, 2))
        for index, number in enumerate(numbers):
            sums[index] += number * field
    return np.asarray(added + sum(stokes(one).sum(axis=(1, 2)) for one in sums))


def places(extent: Extent) -> tuple[Reals, float]:
    """Samples along an axis [m], and their distance, that hold all beams of an extent and the products of any two."""
    half = extent.shared_half
    samples = min(MOST, 2 * math.ceil(max(2 * half * extent.finest(half), 64) / 2))
    pitch = 2 * half / samples
    return np.asarray((np.arange(samples) - (samples - 1) / 2) * pitch), pitch
