"""Values about a singular point with which sums over samples are integrals."""

from __future__ import annotations

import math
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray
from scipy.special import erfc

__all__ = ["factors", "reach"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

DEGREE = 4  # of the polynomials whose sums are made right
NEAREST, PER_CHARGE = 3.0, 1 / 3  # reach [pitches]; up to |l|/3 the phase turns by 3 rad and more from sample to sample
FINE = 8  # places per axis in a sample
# Where the sums fade out: the phase turns by less than 1 rad per sample there and the fading, exp(-(pi w f)^2) of its
# waves, hides none of the steps of the lattice (f = 1 less that turn); at the singular point it is 1 to the last digit.
FLAT, FADING = 12.0, 2.0


def reach(charge: int) -> float:
    """Pitches from a singular point within which samples are not point values."""
    return max(NEAREST, abs(charge) * PER_CHARGE)


@lru_cache(maxsize=64)
def factors(charge: int, x: float, y: float, half: int) -> Complexes:
    """What stands for exp(i charge phi) on the (2 half + 1)^2 samples about a singular point.

    With point values v_n = exp(il phi_n) the sum of v_n g_n over all samples differs from the integral of exp(il phi) g
    by terms c_ab p^(2 + a + b) in the pitch p, one for each z^a conj(z)^b of the smooth g. With four samples evenly
    about the point, c_00 is 0 unless l is a multiple of 4, and c_10 and c_01 unless l is odd: orders 2, 3 and 4; in any
    other place all count and the order is 2. Here v_n near the point is the mean over its sample, which is next to 0
    where the phase turns too fast for samples, and the least change beside that makes all sums up to a + b = 4 equal
    their integrals. What is left goes as p^7, wherever the point lies. A kernel instead, of whatever order, leaves
    c_00, because it stops somewhere and the phase turns as fast at n samples whatever the pitch.

    A rule of even steps corrected at a few samples about a singularity: S. Kapur and V. Rokhlin, SIAM J. Numer. Anal.
    34, 1331 (1997).

    Parameters
    ----------
    charge : l, above 0.
    x, y : the middle sample of the block, from the singular point [pitches].
    half : samples of the block on either side of the middle one.
    """
    size = math.ceil(FLAT + charge + 6 * FADING)
    across, down = np.arange(-size, size + 1) + x, np.arange(-size, size + 1) + y
    places = across + 1j * down[:, None]
    far = abs(places)
    near = far <= min(reach(charge), half)
    values = np.exp(1j * charge * np.angle(places))
    values[near] = _means(charge, places[near])
    scale = reach(charge)
    # Samples that count sum up to what is missing from the integrals.
    powers = [(a, total - a) for total in range(DEGREE + 1) for a in range(total + 1)]
    faded, z = values * erfc((far - FLAT - charge) / FADING) / 2, places / scale
    missing = [_integral(charge, a, b) / scale ** (a + b) - np.sum(faded * z**a * z.conj() ** b) for a, b in powers]
    sums = np.array([z[near] ** a * z[near].conj() ** b for a, b in powers])
    values[near] += np.linalg.lstsq(sums, np.array(missing), rcond=None)[0]
    block = slice(size - half, size + half + 1)
    found = values[block, block].copy()
    found.flags.writeable = False
    return found


def _means(charge: int, places: Complexes) -> Complexes:
    steps = (np.arange(FINE) - (FINE - 1) / 2) / FINE
    fine = places[:, None, None] + steps + 1j * steps[:, None]
    return np.asarray(np.exp(1j * charge * np.angle(fine)).mean(axis=(1, 2)))


def _integral(charge: int, a: int, b: int) -> float:
    """Of exp(il phi) z^a conj(z)^b times the fading, over the plane: 2 pi int r^(a+b+1) fading dr, or 0 by symmetry.

    By parts that is 2 pi/k times the mean of r^k, k = a + b + 2, over the Gaussian by which the fading falls.
    """
    if charge + a != b:
        return 0.0
    k = a + b + 2
    nodes, weights = np.polynomial.hermite.hermgauss(k)
    radii = FLAT + charge + FADING * nodes
    return float(2 * math.sqrt(math.pi) / k * np.sum(weights * radii**k))
