"""The soft end of a field that is cut: it falls as an error function, so that the cut itself diffracts nothing."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from scipy.special import erfc

from fastaxis.engines.azimuthal.panels import Reals

__all__ = ["Taper"]

STEEPNESS = 5.5  # erfc(5.5) = 7e-15: one at the start and zero at the end to the last digits
STEPS = 16  # along the fall: a third of the length of its error function each


@dataclass(frozen=True)
class Taper:
    """One up to ``start`` [m], zero from ``end`` [m] on."""

    start: float
    end: float

    def __call__(self, r: Reals) -> Reals:
        place = (2 * r - self.start - self.end) / (self.end - self.start)
        return np.asarray(erfc(STEEPNESS * place) / 2)

    @property
    def step(self) -> float:
        """Length [m] on which it is a polynomial of degree 13 to the last digits, so that panels carry it as well."""
        return (self.end - self.start) / STEPS

    def earlier(self) -> Taper:
        """The same ending at 4/5 of the radius."""
        return Taper(0.8 * self.start, 0.8 * self.end)
