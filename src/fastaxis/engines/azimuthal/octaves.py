"""Sums with Bessel kernels at many radii of many nodes: by octaves, each of them a few Fourier transforms.

Of large arguments J_l(k r rho) is exp(i k r rho) times a few powers of 1/r times as many of 1/rho, so that sums of them
are sums of waves (Beckman and O'Neil, 2022, from memory). In an octave of r most arguments are large; those to the
nodes next to the axis are not, and are left to Bessel functions one by one.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator

import numpy as np

from fastaxis.engines.azimuthal.far import HIGHEST, LEAST, amplitudes, far_from
from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.engines.azimuthal.uneven import wave_sums

__all__ = ["octave_sums", "octaves_of"]

MANY = 256  # radii of an octave, beyond which transforms are quicker than products of matrices
LARGE = 1 << 11  # nodes
SPAN = 4  # from the first to the last node that share the powers of 1/rho

Near = Callable[[Reals, Complexes, Reals], Complexes]
"""Nodes, values (functions, nodes) and radii to sums (functions, radii), one by one."""


def octaves_of(order: int, scale: float, r: Reals, rho: Reals) -> list[slice]:
    """Radii that have so many others in their octave that transforms are quicker, from the farthest inwards."""
    if order > HIGHEST or len(rho) < LARGE:
        return []
    found = []
    for some in _octaves(r, 2):
        far = len(rho) - np.searchsorted(rho, far_from(order) / (scale * max(float(r[some.start]), 1e-300)))
        if some.stop - some.start < MANY or 2 * far < len(rho):
            break
        found.append(some)
    return found


def octave_sums(order: int, scale: float, r: Reals, rho: Reals, values: Complexes, near: Near) -> Complexes:  # noqa: PLR0917 - one sum
    """Sums of values J_order(scale r rho) over the nodes rho, shape (functions, radii).

    Parameters
    ----------
    scale : k/|b| [1/m^2].
    r : radii [m] of one octave, ascending.
    rho : nodes [m], ascending.
    values : at the nodes, weights included, shape (functions, nodes).
    near : sums one by one.
    """
    total = np.zeros((len(values), len(r)), dtype=complex)
    first = int(np.searchsorted(rho, far_from(order) / (scale * r[0])))
    if first:
        total += near(rho[:first], values[:, :first], r)
    for nodes in _octaves(rho[first:], SPAN):
        here = slice(first + nodes.start, first + nodes.stop)
        total += _far_sums(order, scale, r, rho[here], values[:, here])
    return total


def _octaves(places: Reals, span: float) -> Iterator[slice]:
    """Places that are no more than so many times the first one of them, from the farthest inwards."""
    stop = len(places)
    while stop:
        start = int(np.searchsorted(places[:stop], places[stop - 1] / span))
        yield slice(start, stop)
        stop = start


def _far_sums(order: int, scale: float, r: Reals, rho: Reals, values: Complexes) -> Complexes:
    """J_l = Re of sqrt(2/pi x) exp(i chi) (P + i Q), each power of 1/x a number of r times a number of rho."""
    numbers, lowest = amplitudes(order), r[0]
    v = far_from(order) / (scale * lowest * rho)
    degrees = np.arange(1 + int(np.flatnonzero(abs(numbers) * v.max() ** np.arange(len(numbers)) > LEAST).max()))
    terms = (values * np.sqrt(2 / (np.pi * scale * rho))).T
    parts = np.stack([terms.real, terms.imag], axis=2)
    columns = parts[:, np.newaxis] * (v[:, np.newaxis] ** degrees * numbers[degrees])[:, :, np.newaxis, np.newaxis]
    waves = wave_sums(rho, scale * r, columns.reshape(len(rho), -1)).reshape(len(r), len(degrees), len(values), 2)
    stages = (lowest / r)[:, np.newaxis] ** degrees * np.where(degrees % 2, 1j, 1)
    sums = np.einsum("rnfp,rn->fpr", waves, stages) * np.exp(-1j * np.pi * (order / 2 + 0.25))
    real, imaginary = np.moveaxis(sums.real, 1, 0)
    return np.asarray((real + 1j * imaginary) / np.sqrt(r))
