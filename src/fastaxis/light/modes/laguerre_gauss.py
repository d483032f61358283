"""Laguerre-Gauss modes: rings that carry orbital angular momentum."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np

from fastaxis import checks
from fastaxis.light.modes.base import order, waist, waist_at
from fastaxis.light.modes.family import GaussFamily
from fastaxis.maths import Scalar

__all__ = ["LaguerreGauss"]


@dataclass(frozen=True)
class LaguerreGauss(GaussFamily):
    """u = sqrt(2 p!/(pi (p+|l|)!))/w (sqrt2 r/w)^|l| L_p^|l|(2r^2/w^2) exp(-r^2/w^2 + i k r^2/2R + i l phi - i N zeta).

    N = 2p + |l| + 1. With exp(-i w t), l > 0 carries +l hbar a photon; l counts 2 pi of phase per counter-clockwise
    turn, facing the source.

    Parameters
    ----------
    p : number of dark rings, 0, 1, 2 ...
    l : charge, any whole number.
    waist : radius w0 of the fundamental mode at the waist [m].
    waist_at : distance from the source plane downstream to the waist [m].
    centre : (x, y) of the axis of the mode [m].

    Raises
    ------
    ParameterError : p below 0 or not whole; l not whole; a waist that is not positive, or above 1 m.

    Notes
    -----
    Paraxial. L. Allen et al., Phys. Rev. A 45, 8185 (1992), with the conjugate time factor.

    Examples
    --------
    >>> from fastaxis.units import mm, nm
    >>> round(LaguerreGauss(p=0, l=2, waist=1*mm).moments(532*nm).x2 / (1*mm)**2, 12)
    0.75
    """

    p: Scalar
    l: Scalar
    waist: Scalar
    waist_at: Scalar = 0.0
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    def __post_init__(self) -> None:
        object.__setattr__(self, "p", order("LaguerreGauss", "p", self.p))
        object.__setattr__(self, "l", order("LaguerreGauss", "l", self.l, signed=True))
        object.__setattr__(self, "waist", waist("LaguerreGauss", "waist", self.waist))
        object.__setattr__(self, "waist_at", waist_at("LaguerreGauss", self.waist_at))
        object.__setattr__(self, "centre", checks.centre("LaguerreGauss", self.centre))

    @property
    def charge(self) -> int | None:
        return self.l if self.centred else None

    @property
    def degree(self) -> int:
        return int(2 * self.p + abs(self.l))

    @property
    def quality(self) -> int:
        return self.degree + 1

    def polynomial(self, u: Any, v: Any, *, conjugate: bool = False) -> Any:
        l = -self.l if conjugate else self.l
        turns = abs(l)
        # (u +- iv)^|l| is r^|l| exp(i l phi) without an angle that has a cut, and it is entire.
        spiral = (u + 1j * np.sign(l) * v) ** turns
        log_norm = math.log(2 / math.pi) + math.lgamma(self.p + 1) - math.lgamma(self.p + turns + 1)
        return math.exp(log_norm / 2) * spiral * _laguerre(self.p, turns, u * u + v * v)


def _laguerre(p: int, a: int, s: Any) -> Any:
    """L_p^a(s) by its three-term recurrence, which also takes complex s."""
    last, this = np.zeros_like(s), np.ones_like(s)
    for n in range(p):
        last, this = this, ((2 * n + 1 + a - s) * this - (n + a) * last) / (n + 1)
    return this
