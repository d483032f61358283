"""Hermite-Gauss modes: rectangular arrays of spots."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np

from fastaxis import checks
from fastaxis.light.modes.base import order, waist, waist_at
from fastaxis.light.modes.family import GaussFamily
from fastaxis.maths import Scalar

__all__ = ["HermiteGauss"]


@dataclass(frozen=True)
class HermiteGauss(GaussFamily):
    """u = sqrt(2/(pi 2^(m+n) m! n!))/w H_m(sqrt2 x/w) H_n(sqrt2 y/w) exp(-r^2/w^2 + i k r^2/2R - i (m+n+1) zeta).

    Parameters
    ----------
    m : number of dark lines met along x, 0, 1, 2 ...
    n : number of dark lines met along y, 0, 1, 2 ...
    waist : radius w0 of the fundamental mode at the waist [m].
    waist_at : distance from the source plane downstream to the waist [m].
    centre : (x, y) of the axis of the mode [m].

    Raises
    ------
    ParameterError : m or n below 0 or not whole; a waist that is not positive, or above 1 m.

    Notes
    -----
    Paraxial. H. Kogelnik and T. Li, Appl. Opt. 5, 1550 (1966), with the conjugate time factor.

    Examples
    --------
    >>> from fastaxis.units import mm, nm
    >>> round(HermiteGauss(m=2, n=0, waist=1*mm).moments(532*nm).x2 / (1*mm)**2, 12)
    1.25
    """

    m: Scalar
    n: Scalar
    waist: Scalar
    waist_at: Scalar = 0.0
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    def __post_init__(self) -> None:
        object.__setattr__(self, "m", order("HermiteGauss", "m", self.m))
        object.__setattr__(self, "n", order("HermiteGauss", "n", self.n))
        object.__setattr__(self, "waist", waist("HermiteGauss", "waist", self.waist))
        object.__setattr__(self, "waist_at", waist_at("HermiteGauss", self.waist_at))
        object.__setattr__(self, "centre", checks.centre("HermiteGauss", self.centre))

    @property
    def charge(self) -> int | None:
        return 0 if self.centred and self.m == self.n == 0 else None

    @property
    def degree(self) -> int:
        return int(self.m + self.n)

    @property
    def quality(self) -> int:
        return int(2 * max(self.m, self.n) + 1)

    def polynomial(self, u: Any, v: Any, *, conjugate: bool = False) -> Any:
        return math.sqrt(2 / math.pi) * _hermite(self.m, u) * _hermite(self.n, v)


def _hermite(n: int, u: Any) -> Any:
    """H_n(u)/sqrt(2^n n!) by a recurrence whose terms stay near 1, where 2^n n! alone overflows."""
    last, this = np.zeros_like(u), np.ones_like(u)
    for j in range(n):
        last, this = this, math.sqrt(2 / (j + 1)) * u * this - math.sqrt(j / (j + 1)) * last
    return this
