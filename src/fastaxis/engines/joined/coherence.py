"""How well the arms of one light remember each other, as sums of arms that do not interfere among themselves."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from fastaxis.plan import Branch
from fastaxis.plan.network import carrier_turns

__all__ = ["carriers", "coherence", "mixtures"]

Complexes = NDArray[np.complex128]


def carriers(arms: Sequence[Branch]) -> Complexes:
    """exp(i k (L - L_min)) of each arm, from exact path differences: arms of equal length are in phase exactly."""
    shortest = min(arm.length for arm in arms)
    turns = [carrier_turns(arm.length - shortest, arm.wavelength) for arm in arms]
    return np.exp(2j * np.pi * np.array(turns))


def coherence(arms: Sequence[Branch]) -> Complexes:
    """The matrix of complex degrees of coherence, without carriers."""
    line = arms[0].line
    if line.sharp:
        return np.ones((len(arms), len(arms)), dtype=complex)
    lengths = [arm.length for arm in arms]
    return np.array([[line.degree(float(a - b)) for b in lengths] for a in lengths], dtype=complex)


def mixtures(arms: Sequence[Branch]) -> Complexes:
    """Rows of numbers, one an arm: each row makes a coherent sum of arms, and the powers of these sums add.

    The mean irradiance sum_ij G_ij E_i E_j^* of arms with degrees G is that of the sums sqrt(w_m) sum_i V_im E_i over
    the eigenvectors V of G, whose eigenvalues w are positive since G is a correlation. Fully coherent arms make one
    sum. L. Mandel and E. Wolf, Optical Coherence and Quantum Optics (1995), section 4.7.
    """
    degrees = coherence(arms)
    if np.all(degrees == 1):
        return carriers(arms)[np.newaxis]
    weights, vectors = np.linalg.eigh(degrees)
    # Eigenvalues are good to a few roundings of the largest, which is at most the number of arms.
    kept = weights > 8 * np.finfo(float).eps * len(arms)
    return np.asarray((np.sqrt(weights[kept]) * vectors[:, kept]).T * carriers(arms))
