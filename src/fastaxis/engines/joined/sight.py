"""Joined light at places: by scalar fields where each arm has one state, else by both components."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Protocol

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import PlaneField
from fastaxis.light import stokes

__all__ = ["Sight", "sight"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

SAME_STATE = 1e-13  # of two unit vectors: a hundred roundings each
FARTHER = 1e-6  # a few roundings would do
PLACES = 1 << 15  # at a time: half a megabyte a component, which stays in the cache
SAMPLED = 1 << 18  # of samples, for which each strip asks for matrices of its own


class Sight(Protocol):
    """What is looked at."""

    @property
    def even(self) -> bool:
        """Whether half a turn about the axis changes nothing."""

    def images(self, x: Reals, y: Reals) -> Reals:
        """Real pictures at columns x and rows y, shape (images, ny, nx), the first of them S0 or a share of it."""

    def apart(self, x: Reals, y: Reals) -> Reals:
        """The first picture as it would be without interference, shape (ny, nx)."""

    def polarized(self, images: Reals) -> Reals:
        """S0 .. S3, shape (4, ...), from such pictures or from sums of their pixels."""


@dataclass(frozen=True, eq=False)
class _Fields:
    """(Ex, Ey) of arms, in sums whose powers add."""

    arms: Sequence[PlaneField]
    mixtures: Complexes
    even: bool

    def images(self, x: Reals, y: Reals) -> Reals:
        out = np.empty((4, len(y), len(x)))
        places = PLACES if all(hasattr(arm, "scalar") for arm in self.arms) else SAMPLED
        for rows in _strips(y, len(x), places):
            fields = [arm.at(x, y[rows]) for arm in self.arms]
            out[:, rows] = sum(stokes(_sum(numbers, fields)) for numbers in self.mixtures)
        return out

    def apart(self, x: Reals, y: Reals) -> Reals:
        powers = [_power(arm.at(x, y)).sum(axis=0) for arm in self.arms]
        return np.tensordot(_shares_of(self.mixtures), powers, axes=1)

    def polarized(self, images: Reals) -> Reals:
        return images


@dataclass(frozen=True, eq=False)
class _Scalars:
    """Scalar fields, each with a state of its own."""

    scalars: Sequence[Any]
    mixtures: Complexes
    even: bool

    def images(self, x: Reals, y: Reals) -> Reals:
        out = np.empty((4, len(y), len(x)))
        states = np.array([scalar.state for scalar in self.scalars]).T
        for rows in _strips(y, len(x), PLACES):
            fields = self._fields(x, y[rows])
            out[:, rows] = sum(
                stokes(np.stack([_sum(numbers * one, fields) for one in states])) for numbers in self.mixtures
            )
        return out

    def _fields(self, x: Reals, y: Reals) -> list[Complexes]:
        # Irradiance does not ask which front it is relative to; the most curved one saves harmonics a product.
        front = max((scalar.curvature for scalar in self.scalars), key=abs)
        return [scalar.on(x, y, front) for scalar in self.scalars]

    def apart(self, x: Reals, y: Reals) -> Reals:
        sizes = [np.linalg.norm(scalar.state) ** 2 for scalar in self.scalars]
        powers = [size * _power(field) for size, field in zip(sizes, self._fields(x, y), strict=True)]
        return np.tensordot(_shares_of(self.mixtures), powers, axes=1)

    def polarized(self, images: Reals) -> Reals:
        return images


@dataclass(frozen=True, eq=False)
class _OneState(_Scalars):
    """Scalar fields whose sums have one state; their numbers are multiples of it."""

    state: Complexes

    def images(self, x: Reals, y: Reals) -> Reals:
        out = np.empty((1, len(y), len(x)))
        for rows in _strips(y, len(x), PLACES):
            fields = self._fields(x, y[rows])
            out[0, rows] = sum(_power(_sum(numbers, fields)) for numbers in self.mixtures)
        return out

    def apart(self, x: Reals, y: Reals) -> Reals:
        return np.tensordot(_shares_of(self.mixtures), [_power(field) for field in self._fields(x, y)], axes=1)

    def polarized(self, images: Reals) -> Reals:
        return np.asarray(np.multiply.outer(stokes(self.state), images[0]))


def sight(arms: Sequence[Any], mixtures: Complexes, farthest: float) -> Sight:
    """Joined light out to a distance [m] along both axes.

    Parameters
    ----------
    arms : the field of each.
    mixtures : rows of numbers, one an arm.
    """
    reach = farthest * (1 + FARTHER)
    scalars: list[Any] = [arm.scalar(math.sqrt(2) * reach) if hasattr(arm, "scalar") else None for arm in arms]
    if all(scalar is not None for scalar in scalars):
        shares = _shares([scalar.state for scalar in scalars])
        if shares is None:
            return _Scalars(scalars, mixtures, _even(arms))
        return _OneState(scalars, mixtures * shares, _even(arms), scalars[0].state)
    corner = np.array([reach])
    for arm in arms:  # engines that work out a plane as far as they are asked do so once if the corner comes first
        arm.at(corner, corner)
    return _Fields(arms, mixtures, _even(arms))


def _even(arms: Sequence[Any]) -> bool:
    """Harmonics that half a turn changes alike, exp(i l pi), keep their irradiance."""
    charges = [arm.harmonics.charges if hasattr(arm, "harmonics") else (0, 1) for arm in arms]
    return len({l % 2 for some in charges for l in some}) == 1


def _shares(states: Sequence[Complexes]) -> Complexes | None:
    """States as multiples of the first; None if they differ."""
    first = states[0]
    shares = np.array([np.vdot(first, state) for state in states]) / np.vdot(first, first).real
    apart = [np.linalg.norm(state - share * first) for state, share in zip(states, shares, strict=True)]
    same = all(far <= SAME_STATE * np.linalg.norm(state) for far, state in zip(apart, states, strict=True))
    return shares if same else None


def _sum(numbers: Complexes, fields: Sequence[Complexes]) -> Complexes:
    first, *rest = (field if number == 1 else number * field for number, field in zip(numbers, fields, strict=True))
    return np.asarray(sum(rest, first))


def _shares_of(mixtures: Complexes) -> Reals:
    return np.asarray(np.sum(abs(mixtures) ** 2, axis=0))


def _power(field: Complexes) -> Reals:
    return np.asarray(field.real**2 + field.imag**2)


def _strips(y: Reals, columns: int, places: int) -> list[Any]:
    """Rows to be done at a time; of rows symmetric about the axis each with its mirror image, which shares radii."""
    count, at_once = len(y), max(1, places // columns)
    if not np.array_equal(y, -y[::-1]):
        return [slice(first, first + at_once) for first in range(0, count, at_once)]
    pairs, half = max(1, at_once // 2), count // 2
    upper = [np.arange(first, min(first + pairs, half)) for first in range(0, half, pairs)]
    strips: list[Any] = [np.concatenate([some, count - 1 - some[::-1]]) for some in upper]
    return [*strips, slice(half, half + 1)] if count % 2 else strips
