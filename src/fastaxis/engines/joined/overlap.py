"""Overlap integrals of arms: what their interference adds to the power at a port."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import PlaneField
from fastaxis.engines.joined.extent import Extent
from fastaxis.light import Raster

__all__ = ["overlaps"]

Complexes = NDArray[np.complex128]
Reals = NDArray[np.float64]

EVERYTHING = Raster(10.0, (1, 1))  # one pixel of 10 m: no table carries a wider beam
MOST = 4096  # samples along a side; edges and singularities ask for more than pays
BLOCK = 1 << 20  # samples of one arm held at a time


def overlaps(fields: Sequence[PlaneField], extent: Extent) -> Complexes:
    """Integrals of E_i E_j^H over the plane [W], shape (arms, arms, 2, 2).

    What an arm has alone is its own engine's; what two have in common is a sum over equally spaced samples, which for
    light that falls off on all sides and has a band is exact to rounding. The samples are the same at every port of
    a splitter and stand symmetric about the axis, so that what interference takes from one port it gives to the
    other to the last digits.
    """
    count = len(fields)
    table = np.zeros((count, count, 2, 2), dtype=complex)
    if count > 1:
        table += _sampled(fields, extent)
    for index, field in enumerate(fields):
        table[index, index] = _alone(field)
    return table


def _alone(field: PlaneField) -> Complexes:
    """The coherency matrix of all light of one arm, S3 = 2 Im(Ex Ey*)."""
    s0, s1, s2, s3 = _total(field)
    matrix = np.array([[s0 + s1, s2 + 1j * s3], [s2 - 1j * s3, s0 - s1]], dtype=complex)
    return np.asarray(matrix / 2)


def _total(field: Any) -> Reals:
    stokes = np.asarray(field.stokes_on(EVERYTHING)[:, 0, 0])
    return stokes * (field.power / stokes[0]) if stokes[0] > 0 else stokes


def _sampled(fields: Sequence[PlaneField], extent: Extent) -> Complexes:
    x, pitch = _places(extent)
    count = len(fields)
    table = np.zeros((count, count, 2, 2), dtype=complex)
    rows = max(1, BLOCK // len(x))
    for first in range(0, len(x), rows):
        values = np.stack([field.at(x, x[first : first + rows]).reshape(2, -1) for field in fields])
        flat = values.reshape(2 * count, -1)
        table += (flat @ flat.conj().T).reshape(count, 2, count, 2).transpose(0, 2, 1, 3)
    return np.asarray(table * pitch**2)


def _places(extent: Extent) -> tuple[Reals, float]:
    half = extent.half_window
    needed = 2 * half * extent.frequency(half)
    samples = min(MOST, 2 * math.ceil(max(needed, 64) / 2))
    pitch = 2 * half / samples
    return np.asarray((np.arange(samples) - (samples - 1) / 2) * pitch), pitch
