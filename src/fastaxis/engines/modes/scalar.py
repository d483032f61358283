"""Modes that all have one polarization: a state, and a scalar field."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.modes.waves import Waves

__all__ = ["ScalarModes"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

SAME_STATE = 1e-14  # of each wave's own amplitude: some dozen products of matrices


@dataclass(frozen=True, eq=False)
class ScalarModes:
    """state * sum of waves.

    Parameters
    ----------
    state : (Ex, Ey).
    waves : with one number [sqrt(W)] for each in the place of (Ex, Ey).
    wavelength : [m].
    curvature : of the front that they are relative to: none.
    """

    state: Complexes
    waves: tuple[Waves, ...]
    wavelength: float
    curvature: float = 0.0

    @classmethod
    def of(cls, wavelength: float, waves: Sequence[Waves]) -> ScalarModes | None:
        """None if the polarization varies from place to place."""
        jones = np.concatenate([some.jones for some in waves])
        main = int(np.linalg.norm(jones[:, 1]) > np.linalg.norm(jones[:, 0]))
        numbers, others = jones[:, main], jones[:, 1 - main]
        power = np.vdot(numbers, numbers).real
        share = np.vdot(numbers, others) / power if power else 0.0
        if (abs(others - share * numbers) > SAME_STATE * np.linalg.norm(jones, axis=1)).any():
            return None
        state = np.array([share, 1] if main else [1, share], dtype=complex)
        return cls(state, tuple(replace(some, jones=some.jones[:, main : main + 1]) for some in waves), wavelength)

    def on(self, x: Reals, y: Reals, curvature: float) -> Complexes:
        """Relative to a front of any curvature [1/m], at columns x and rows y, shape (ny, nx)."""
        bend = math.pi * curvature / self.wavelength
        first, *rest = (waves.at(x, y, bend)[0] for waves in self.waves)
        return np.asarray(sum(rest, first))
