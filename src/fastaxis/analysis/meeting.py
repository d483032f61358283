"""Light of several paths where it meets: sums over the plane that say how deep its fringes are."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from importlib import import_module
from itertools import combinations
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.settings import as_setting
from fastaxis.engines.joined.extent import Extent
from fastaxis.engines.joined.overlap import places, total
from fastaxis.plan import Branch
from fastaxis.plan.network import carrier_turns

__all__ = ["ZERO", "Meeting", "Overlap", "met"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

# Overlaps are sums of some 1e4 products of engines good to 1e-11; what is smaller is zero.
ZERO = 1e-9
BLOCK = 1 << 18  # places at which the fields of all paths and parts are held at a time


@dataclass(frozen=True)
class Overlap:
    """Of two paths, with W = sum_c G_c E1c E2c^dagger over the parts c of the light.

    Parameters
    ----------
    amplitudes : S a1 a2, the square roots of both irradiances [W].
    matrix : S W [W], shape (2, 2).
    best : S of the singular values of W [W].
    met : S |tr W| [W].
    whole : the same with all G_c = 1; None in that itself.
    """

    amplitudes: float
    matrix: Complexes
    best: float
    met: float
    whole: Overlap | None = None

    @property
    def together(self) -> float:
        """|S tr W| [W]: what is left of the fringes where all light is collected."""
        return float(abs(np.trace(self.matrix)))


@dataclass(frozen=True)
class Meeting:
    """The light of one laser by several paths.

    Parameters
    ----------
    overlaps : by the numbers of two paths.
    totals : S0 .. S3 [W] of each path, before the analyzer, shape (paths, 4).
    passed : the analyzer as a matrix A, with power E^dagger A E.
    """

    overlaps: dict[tuple[int, int], Overlap]
    totals: Reals
    passed: Complexes

    def overlap(self, i: int, j: int) -> Overlap:
        return self.overlaps[i, j]

    def stokes(self, i: int) -> Reals:
        return np.asarray(self.totals[i])

    def power(self, i: int) -> float:
        """Power of a path behind the analyzer [W]; samples hold only what paths have in common."""
        s0, s1, s2, s3 = self.totals[i]
        matrix = np.array([[s0 + s1, s2 + 1j * s3], [s2 - 1j * s3, s0 - s1]]) / 2
        # tr(A C) with the coherency matrix C_ab = <E_a E_b^*>, whose s3 is 2 Im(Ex Ey*).
        return max(0.0, float(np.trace(self.passed @ matrix).real))


def met(parts: Sequence[Sequence[Branch]], setting: Any) -> Meeting:
    """Run all arms and look at each two of them together.

    Parameters
    ----------
    parts : for each incoherent part of the light its arms, by the same paths in the same order.
    setting : a state that passes, an analyzer, or None.
    """
    fields = [[import_module(f"fastaxis.engines.{arm.engine}").run(arm) for arm in arms] for arms in parts]
    passed = _passed(setting)
    pairs = list(combinations(range(len(parts[0])), 2))
    degrees = {(i, j): np.array([_degree(arms[i], arms[j]) for arms in parts]) for i, j in pairs}
    sums = {pair: _Sums() for pair in pairs}
    for values in _looked_at(parts, fields):
        seen = np.einsum("ab,cpbn->cpan", _root(passed), values)
        own = np.sqrt((abs(seen) ** 2).sum(axis=(0, 2)))
        for (i, j), degree in degrees.items():
            sums[i, j].add(own[i] * own[j], seen[:, i], seen[:, j], degree)
    totals = np.array([[total(field) for field in row] for row in fields]).sum(axis=0)
    return Meeting({pair: found.overlap() for pair, found in sums.items()}, totals, passed)


def _passed(setting: Any) -> Complexes:
    if setting is None:
        return np.eye(2, dtype=complex)
    m0, m1, m2, m3 = as_setting(setting).weights
    return np.array([[m0 + m1, m2 + 1j * m3], [m2 - 1j * m3, m0 - m1]], dtype=complex)


def _root(matrix: Complexes) -> Complexes:
    """The positive square root of a positive matrix."""
    values, vectors = np.linalg.eigh(matrix)
    return np.asarray((vectors * np.sqrt(np.maximum(values, 0))) @ vectors.conj().T)


def _degree(one: Branch, other: Branch) -> complex:
    """Degree of coherence of E1 E2^dagger at the path difference, carrier included."""
    turns = carrier_turns(one.length - other.length, one.wavelength)
    return complex(one.line.degree(float(one.length - other.length)) * np.exp(2j * np.pi * turns))


def _looked_at(parts: Sequence[Sequence[Branch]], fields: Sequence[Sequence[Any]]) -> Iterator[Complexes]:
    """Fields of all parts by all paths at some places at a time, (parts, paths, 2, places) [sqrt(W)]."""
    if all(arm.engine == "uniform" for arms in parts for arm in arms):
        yield np.array([[field.jones[:, np.newaxis] for field in row] for row in fields])
        return
    arms = sorted((arm for arms in parts for arm in arms), key=lambda arm: arm.wavelength)
    x, pitch = places(Extent.of(arms))
    for field in (field for row in fields for field in row):
        field.at(x[-1:] + pitch, x[-1:] + pitch)  # engines that work out a plane as far as asked do so once
    rows = max(1, BLOCK // len(x))
    for first in range(0, len(x), rows):
        some = x[first : first + rows]
        values = np.array([[field.at(x, some).reshape(2, -1) for field in row] for row in fields], dtype=complex)
        values *= pitch
        yield values


class _Sums:
    """Running sums over places of one pair of paths, with and without the degrees of coherence."""

    def __init__(self) -> None:
        self._amplitudes = 0.0
        self._matrices = np.zeros((2, 2, 2), dtype=complex)
        self._best, self._met = np.zeros(2), np.zeros(2)

    def add(self, amplitudes: Reals, one: Complexes, other: Complexes, degrees: Complexes) -> None:
        self._amplitudes += float(amplitudes.sum())
        for n, weights in enumerate((degrees, np.ones_like(degrees))):
            mutual = np.einsum("c,can,cbn->abn", weights, one, other.conj())
            self._matrices[n] += mutual.sum(axis=-1)
            # The singular values s, t of a 2x2 matrix: s^2 + t^2 is its square norm and s t its |determinant|.
            determinant = abs(mutual[0, 0] * mutual[1, 1] - mutual[0, 1] * mutual[1, 0])
            self._best[n] += float(np.sqrt((abs(mutual) ** 2).sum(axis=(0, 1)) + 2 * determinant).sum())
            self._met[n] += float(abs(mutual[0, 0] + mutual[1, 1]).sum())

    def overlap(self) -> Overlap:
        kept, whole = (
            Overlap(self._amplitudes, self._matrices[n], float(self._best[n]), float(self._met[n])) for n in (0, 1)
        )
        return Overlap(kept.amplitudes, kept.matrix, kept.best, kept.met, whole)
