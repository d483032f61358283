"""Sums of waves exp(i s x) over uneven places x at uneven frequencies s, by one fast Fourier transform.

Each place is spread over a few points of an even grid, the grid is transformed to a finer one in s, and that is read at
the frequencies in the same way; both times what spreading does to the transform is divided out. The work grows as the
number of places plus that of frequencies, and not as their product (Dutt and Rokhlin, SIAM J. Sci. Comput. 14, 1368,
1993; Lee and Greengard, J. Comput. Phys. 206, 1, 2005; the bell is that of Barnett, Magland and af Klinteberg, SIAM J.
Sci. Comput. 41, C479, 2019).
"""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.fft import fft, next_fast_len
from scipy.sparse import csr_array

from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.light.gauss import gauss_legendre

__all__ = ["wave_sums"]

WIDTH = 16  # grid points of a bell: what it leaves beyond its band is below 1e-14 of it
SHARP = 2.30 * WIDTH
FINER = 2.0  # grid points over those that the band needs
QUADRATURE = 64


def _bell(place: Reals) -> Reals:
    """exp(sqrt(1 - z^2)) of a kind, for z in [-1, 1]: narrow in place as well as in frequency."""
    return np.asarray(np.exp(SHARP * (np.sqrt(np.maximum(1 - place**2, 0)) - 1)))


def _bell_transform(frequency: Reals) -> Reals:
    """Integral of the bell times exp(i f z) over z in grid points, at frequencies in radians a grid point."""
    nodes, weights = gauss_legendre(QUADRATURE)
    half = QUADRATURE // 2
    values = WIDTH * weights[half:] * _bell(nodes[half:])
    return np.asarray(np.cos(np.multiply.outer(frequency, nodes[half:] * (WIDTH / 2))) @ values)


def _spread(places: Reals, count: int) -> Any:
    """Bells about places in grid points, on a grid of so many points that closes on itself, shape (places, count)."""
    first = np.ceil(places - WIDTH / 2)
    offsets = np.arange(WIDTH)
    values = _bell((first - places)[:, np.newaxis] / (WIDTH / 2) + offsets / (WIDTH / 2))
    points = (first.astype(np.int32)[:, np.newaxis] + offsets.astype(np.int32)) % count
    ends = np.arange(0, points.size + 1, WIDTH, dtype=np.int32)
    return csr_array((values.ravel(), points.ravel(), ends), shape=(len(places), count))


def wave_sums(x: Reals, s: Reals, values: NDArray[Any]) -> Complexes:
    """Sum over j of values_jm exp(i s_k x_j), shape (len(s), m).

    Exact to some 1e-14 of the sum of the values' moduli, and less where they do not all agree.

    Parameters
    ----------
    x : places, shape (places,).
    s : frequencies [1/unit of x], shape (frequencies,).
    values : shape (places, m).
    """
    middle, centre = (x.max() + x.min()) / 2, (s.max() + s.min()) / 2
    reach, band = (max(float(np.ptp(side)) / 2, 1e-300) for side in (x, s))
    count = next_fast_len(math.ceil(2 * FINER * reach * band / math.pi) + 2 * WIDTH + 2)
    count += count % 2
    step = math.pi / (FINER * max(band, 2 * math.pi * WIDTH / count / reach))
    turned = values * np.exp(1j * centre * (x - middle))[:, np.newaxis]
    # Real and imaginary parts as columns: half the work of a complex product.
    grid = (_spread((x - middle) / step, count).T @ turned.view(float)).view(complex)
    # Each frequency is a place on the transform of that grid, made twice as fine.
    places, fine = (s - centre) * step, next_fast_len(2 * count)
    modes: Reals = np.fft.fftfreq(count, 1 / count).astype(float)
    padded = np.zeros((fine, values.shape[1]), dtype=complex)
    padded[modes.astype(int)] = grid / _bell_transform(modes * (2 * math.pi / fine))[:, np.newaxis]
    waves = fft(padded, axis=0, overwrite_x=True)
    sums = (_spread(-places * (fine / (2 * math.pi)), fine) @ waves.view(float)).view(complex)
    return np.asarray(sums * (np.exp(1j * s * middle) / _bell_transform(places))[:, np.newaxis])
