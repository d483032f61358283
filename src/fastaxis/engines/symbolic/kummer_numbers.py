"""Kummer's function 1F1(a; b; z) in numbers for Re z <= 0, where the library's complex one loses digits at |z| = 30.

Three ways meet: with a - b a whole number n >= 0, exp(z) times a polynomial; up to |z| = 40, Gauss-Jacobi quadrature of
int_0^1 exp(z t) t^(a-1) (1-t)^(b-a-1) dt, after raising b above a; beyond, the asymptotic series. NIST DLMF 13.2.39,
13.4.1, 13.3.2, 13.7.2.
"""

from __future__ import annotations

from typing import Any

import numpy as np
import scipy.special
from numpy.typing import NDArray

__all__ = ["kummer"]

FAR = 40.0  # the asymptotic series is good to exp(-|z|) and the quadrature to rounding up to here
NODES = 96
SERIES = 30

Complexes = NDArray[np.complex128]


def kummer(a: float, b: float, z: Any) -> Any:
    """1F1(a; b; z) for a, b > 0 and Re z <= 0; arrays in z.

    >>> round(float(kummer(1.5, 2.0, -1.0)), 12) == round(float(scipy.special.hyp1f1(1.5, 2.0, -1.0)), 12)
    True
    """
    real = not np.iscomplexobj(z)
    points = np.atleast_1d(np.asarray(z, complex))
    excess = a - b
    if excess >= 0 and excess == int(excess):
        # 1F1(-n; b; -z) has n + 1 terms.
        value = np.exp(points) * _polynomial(int(excess), b, -points)
    else:
        far = np.abs(points) > FAR
        value = np.empty_like(points)
        value[~far] = _near(a, b, points[~far])
        value[far] = _far(a, b, points[far])
    value = value.reshape(np.shape(z))
    return value.real if real else value


def _polynomial(n: int, b: float, z: Complexes) -> Complexes:
    total, term = np.ones_like(z), np.ones_like(z)
    for k in range(n):
        term = term * (k - n) / (b + k) * z / (k + 1)
        total = total + term
    return total


def _near(a: float, b: float, z: Complexes) -> Complexes:
    raised = b
    while raised <= a:
        raised += 1
    value, next_value = _quadrature(a, raised, z), _quadrature(a, raised + 1, z)
    while raised > b:
        lower = ((raised - 1 + z) * value - z * (raised - a) / raised * next_value) / (raised - 1)
        value, next_value, raised = lower, value, raised - 1
    return value


def _quadrature(a: float, b: float, z: Complexes) -> Complexes:
    nodes, weights = scipy.special.roots_jacobi(NODES, b - a - 1, a - 1)
    return np.asarray(np.exp(np.multiply.outer(z, (1 + nodes) / 2)) @ weights / weights.sum(), complex)


def _far(a: float, b: float, z: Complexes) -> Complexes:
    falling = scipy.special.gamma(b) * scipy.special.rgamma(b - a) * (-z) ** (-a) * _series(a, a - b + 1, -1 / z)
    damped = scipy.special.gamma(b) * scipy.special.rgamma(a) * np.exp(z) * z ** (a - b) * _series(b - a, 1 - a, 1 / z)
    return np.asarray(falling + damped, complex)


def _series(p: float, q: float, u: Complexes) -> Complexes:
    total, term = np.ones_like(u), np.ones_like(u)
    for k in range(SERIES):
        term = term * (p + k) * (q + k) / (k + 1) * u
        total = total + term
    return total
