"""All the light on one square about the axis, however wide: integrated around first, then along the radius."""

from __future__ import annotations

import math

import numpy as np

from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.panels import Reals
from fastaxis.light.gauss import gauss_legendre

__all__ = ["square_stokes"]

NODES, WEIGHTS = gauss_legendre(96)


def _arcs(m: int, r: Reals, half: float) -> Reals:
    """Integral of exp(i m phi) over the part of a circle of radius r inside the square |x|, |y| <= half.

    Four arcs [psi, pi/2 - psi] and their quarter turns are left, psi = arccos(half/r); only m = 0, 4, 8 ... survive.
    """
    psi = np.arccos(np.minimum(half / np.maximum(r, half), 1.0))
    if m % 4:
        return np.zeros_like(r)
    return np.asarray(2 * math.pi - 8 * psi if m == 0 else -8 * np.sin(m * psi) / m)


def square_stokes(field: Harmonics, side: float) -> Reals:
    """S0 .. S3 [W] on a square of this side [m] about the axis, shape (4,). The field must reach its corners."""
    half = side / 2
    inner = field.profile.clipped(0.0, half)
    r, weights, values = inner.nodes, inner.weights, inner.flat()
    # Beyond the inscribed circle the arcs open like a root, which the square of the variable makes smooth.
    span = (math.sqrt(2) - 1) * half
    u = (1 + NODES) / 2
    outer = half + span * u**2
    r = np.concatenate([r, outer])
    weights = np.concatenate([weights, span * u * WEIGHTS])
    values = np.concatenate([values, field.profile(outer)], axis=1)
    coherence = np.zeros((2, 2), dtype=complex)
    for one, (hand, l) in zip(values, field.orders, strict=True):
        for other, (hand_other, l_other) in zip(values, field.orders, strict=True):
            coherence[hand, hand_other] += np.sum(one.conj() * other * _arcs(l_other - l, r, half) * r * weights)
    cross, left, right = 2 * coherence[LEFT, RIGHT], coherence[LEFT, LEFT].real, coherence[RIGHT, RIGHT].real
    return np.array([left + right, cross.real, cross.imag, right - left])
