"""Sums over nodes with Bessel kernels of large arguments, as matrix products instead of so many Bessel functions.

Far from zero J_l(x) = sqrt(2/pi x) (cos chi P(v) - sin chi Q(v)), chi = x - (l/2 + 1/4) pi, where P is a short even and
Q a short odd polynomial in v = x_0/x (DLMF 10.17.3 has their asymptotic series). With x = k r rho, v is a number of r
times a number of rho, and on equal parts of width 2h about middles m, rho = m + h xi, chi is one angle for r and m and
one for r and xi. So all parts share the few sines and cosines of the second; the rest is products of small matrices.
"""

from __future__ import annotations

from functools import lru_cache
from itertools import pairwise

import numpy as np
from numpy.polynomial import chebyshev
from scipy.special import hankel1e

from fastaxis.engines.azimuthal.panels import NODES, ORDER, Complexes, Reals
from fastaxis.engines.azimuthal.products import product

__all__ = ["amplitudes", "far_from", "far_runs", "far_sums", "phasors"]

HIGHEST = 24  # order; beyond, x_0 is so large that little is left of a kernel behind it
DEGREE = 17  # of the polynomials: from x_0 on, what is left of them is below 2e-16 for all of these orders
FITTED = 24  # Chebyshev points
LEAST = 1e-17  # of a term that counts
HALF = ORDER // 2
FEW, SUMMED = 4, 1 << 13  # parts, and kernel values, below which matrices cost more than Bessel functions


def far_from(order: int) -> float:
    """x_0: from here on a dozen powers of 1/x carry all digits. Series in l^2/x begin later for high orders.

    >>> far_from(1)
    12.5
    """
    return 12.0 + order**2 / 2


@lru_cache(maxsize=HIGHEST + 1)
def amplitudes(order: int) -> Reals:
    """Coefficients of v^n, of P for even n and Q for odd n: H_l(x) = sqrt(2/pi x) exp(i chi) (P + i Q)."""
    angles = np.pi * (np.arange(FITTED) + 0.5) / FITTED
    v, degrees = np.cos(angles), np.arange(DEGREE + 1)
    x = far_from(order) / abs(v)
    slow = hankel1e(order, x) * np.sqrt(np.pi * x / 2) * np.exp(1j * np.pi * (order / 2 + 0.25))
    fit = 2 / FITTED * np.cos(np.multiply.outer(degrees, angles))
    series = np.where(degrees % 2, fit @ (slow.imag * np.sign(v)), fit @ slow.real)
    series[0] /= 2
    return np.asarray(chebyshev.cheb2poly(series))


def far_runs(order: int, scale: float, r: Reals, borders: Reals) -> list[slice]:
    """Neighbouring parts of one width on which all arguments are large enough and that are worth it.

    Parameters
    ----------
    borders : of the parts [m], ascending.
    """
    if order > HIGHEST:
        return []
    widths = np.diff(borders)
    far = borders[:-1] * (scale * r.min()) >= far_from(order)
    # Borders are rounded, and a width may be so much off.
    other = abs(np.diff(widths)) > 4 * np.finfo(float).eps * borders[-1]
    cuts = np.flatnonzero(other | (far[1:] != far[:-1])) + 1
    ends = [0, *(int(cut) for cut in cuts), len(widths)]
    worth = max(FEW, SUMMED // (ORDER * len(r)))
    return [slice(start, stop) for start, stop in pairwise(ends) if far[start] and stop - start >= worth]


def far_sums(order: int, scale: float, r: Reals, borders: Reals, values: Complexes) -> Complexes:
    """Sums of values J_order(scale r rho) over the nodes rho of equal parts, shape (functions, radii).

    Parameters
    ----------
    order : 0 ... ``HIGHEST``.
    scale : k/|b| [1/m^2].
    r : output radii [m].
    borders : of the parts [m]; scale r rho is at least ``far_from(order)`` everywhere.
    values : at the nodes, weights included, shape (functions, parts, ORDER).
    """
    numbers, lowest = amplitudes(order), r.min()
    middles, half = (borders[1:] + borders[:-1]) / 2, float(borders[-1] - borders[0]) / (2 * len(borders) - 2)
    rho = middles[:, np.newaxis] + half * NODES
    v = far_from(order) / (scale * lowest * rho)
    numbers = numbers[: 1 + int(np.flatnonzero(abs(numbers) * v.max() ** np.arange(len(numbers)) > LEAST).max())]
    powers = _powers(v, len(numbers)) * numbers[:, np.newaxis, np.newaxis]
    terms = powers[:, np.newaxis] * (values * np.sqrt(2 / (np.pi * scale * rho)))
    upper, lower = terms[..., HALF:], terms[..., HALF - 1 :: -1]
    angles = np.multiply.outer(scale * half * NODES[HALF:], r)
    bent = phasors(scale * middles[0] * r - np.pi * (order / 2 + 0.25), 2 * scale * half * r, len(middles))
    cos, sin, stages = np.cos(angles), np.sin(angles), _powers(lowest / r, len(numbers))
    even, odd = upper + lower, lower - upper
    total = (bent.real[:, np.newaxis] * _matched((even, odd), (cos, sin), stages)).sum(axis=0)
    total += (bent.imag[:, np.newaxis] * _matched((odd, -even), (sin, cos), stages)).sum(axis=0)
    total /= np.sqrt(r)
    return np.asarray(total[0::2] + 1j * total[1::2])


def phasors(first: Reals, step: Reals, count: int) -> Complexes:
    """exp(i (first + n step)) for n < count, shape (count, len(first)), by doubling from a few exponentials."""
    out = np.empty((count, len(first)), dtype=complex)
    out[0], known = np.exp(1j * first), 1
    while known < count:
        more = min(known, count - known)
        np.multiply(out[:more], np.exp(1j * known * step), out=out[known : known + more])
        known += more
    return out


def _powers(base: Reals, count: int) -> Reals:
    """1, base, base^2 ..., shape (count, *base.shape)."""
    out = np.ones((count, *base.shape))
    for n in range(1, count):
        np.multiply(out[n - 1], base, out=out[n])
    return out


def _matched(terms: tuple[Complexes, Complexes], waves: tuple[Reals, Reals], stages: Reals) -> Reals:
    """Sums over powers n and nodes; the first of each pair is for even n, the second for odd n.

    Shape (parts, 2 functions, radii): a real and an imaginary part of each function.
    """
    (count, functions, parts, nodes), radii = terms[0].shape, stages.shape[1]
    left, right = np.empty((parts, functions, 2, count, nodes)), np.empty((count, nodes, radii))
    for start in (0, 1):
        some = terms[start][start::2].transpose(2, 1, 0, 3)
        left[:, :, 0, start::2], left[:, :, 1, start::2] = some.real, some.imag
        np.multiply(stages[start::2, np.newaxis], waves[start], out=right[start::2])
    sums = product(left.reshape(-1, count * nodes), right.reshape(count * nodes, radii))
    return np.asarray(sums.reshape(parts, 2 * functions, radii))
