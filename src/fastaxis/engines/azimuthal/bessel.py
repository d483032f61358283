"""Bessel functions of whole order, quickly: the kernels of the Collins integral."""

from __future__ import annotations

import numpy as np
from scipy.special import j0, j1, jv

from fastaxis.engines.azimuthal.panels import Reals

__all__ = ["bessel"]


def bessel(order: int, x: Reals) -> Reals:
    """J_order(x) for order >= 0 and x >= 0.

    J_0 and J_1 are five times as fast as the general routine. Higher orders climb by
    J_{n+1} = (2n/x) J_n - J_{n-1}, which keeps its digits for x > n (DLMF 3.6.2); below, the general routine serves.

    >>> float(bessel(2, np.array([5.0]))[0].round(12))
    0.046565116278
    """
    if order == 0:
        return np.asarray(j0(x))
    if order == 1:
        return np.asarray(j1(x))
    climbing = x > order
    safe = np.where(climbing, x, 1.0)
    last, this = j0(safe), j1(safe)
    for n in range(1, order):
        last, this = this, (2 * n / safe) * this - last
    if not climbing.all():
        below = ~climbing
        this[below] = jv(order, x[below])
    return np.asarray(this)
