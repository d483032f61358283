"""The Gaussian beam."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

from fastaxis import checks
from fastaxis.light.modes.base import waist, waist_at
from fastaxis.light.modes.family import GaussFamily
from fastaxis.maths import Scalar

__all__ = ["Gaussian"]


@dataclass(frozen=True)
class Gaussian(GaussFamily):
    """The fundamental mode: u = sqrt(2/pi)/w exp(-r^2/w^2) exp(+i k r^2/2R) exp(-i zeta).

    Parameters
    ----------
    waist : 1/e^2 radius w0 of the irradiance at the waist [m].
    waist_at : distance from the source plane downstream to the waist [m]; negative for a diverging beam.
    centre : (x, y) of the axis of the mode [m].

    Raises
    ------
    ParameterError : a waist that is not positive, or above 1 m (its unit is missing).

    Notes
    -----
    Paraxial. H. Kogelnik and T. Li, Appl. Opt. 5, 1550 (1966), with the conjugate time factor.

    Examples
    --------
    >>> from fastaxis.units import mm, nm
    >>> round(Gaussian(waist=0.5*mm).rayleigh(632.8*nm), 8)
    1.24114754
    """

    waist: Scalar
    waist_at: Scalar = 0.0
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    def __post_init__(self) -> None:
        object.__setattr__(self, "waist", waist("Gaussian", "waist", self.waist))
        object.__setattr__(self, "waist_at", waist_at("Gaussian", self.waist_at))
        object.__setattr__(self, "centre", checks.centre("Gaussian", self.centre))

    @property
    def charge(self) -> int | None:
        return 0 if self.centred else None

    @property
    def degree(self) -> int:
        return 0

    @property
    def quality(self) -> int:
        return 1

    def polynomial(self, u: Any, v: Any, *, conjugate: bool = False) -> Any:
        return math.sqrt(2 / math.pi)
