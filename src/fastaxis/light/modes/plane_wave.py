"""The plane wave, for questions without transverse structure."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any, ClassVar

import numpy as np
from numpy.typing import ArrayLike

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.light.modes.base import Complexes, Mode, Moments, require_numbers
from fastaxis.maths import Scalar, free_symbols

__all__ = ["PlaneWave"]


@dataclass(frozen=True)
class PlaneWave:
    """The same amplitude everywhere: 1/sqrt(area), so that its power is counted on ``area``.

    Parameters
    ----------
    area : area on which the power is counted [m^2], such as that of a detector or a stop.

    Raises
    ------
    ParameterError : an area that is not positive, or above 1 m^2 (its unit is missing).

    Examples
    --------
    >>> from fastaxis.units import mm, nm
    >>> PlaneWave(area=4*mm**2).amplitude(0, 0, 532*nm).real
    array(500.)
    """

    area: Scalar

    infinite: ClassVar[bool] = True
    hard: ClassVar[bool] = False
    charge: ClassVar[int] = 0

    def __post_init__(self) -> None:
        object.__setattr__(self, "area", checks.length("PlaneWave", "area", self.area, most=1.0, fix="area=1*mm**2"))

    @property
    def symbols(self) -> set[Any]:
        return free_symbols((self.area,))

    def amplitude(self, x: ArrayLike, y: ArrayLike, wavelength: float) -> Complexes:
        """1/sqrt(area) at the places (x, y) [m]."""
        require_numbers(self)
        places = np.broadcast(np.asarray(x), np.asarray(y))
        return np.full(places.shape, 1 / math.sqrt(self.area), dtype=complex)

    def radial(self, r: ArrayLike, wavelength: float) -> Complexes:
        """1/sqrt(area) at any radius [m]."""
        return self.amplitude(r, 0.0, wavelength)

    def curvature(self, wavelength: float) -> float:
        """Flat."""
        return 0.0

    def moments(self, wavelength: float) -> Moments:
        """No end in space, no spread in angle."""
        return Moments(x2=math.inf, xt=0.0, t2=0.0)

    def moved(self, distance: float) -> PlaneWave:
        """Itself: a plane wave does not change on its way."""
        return self

    def overlap(self, other: Mode, wavelength: float) -> complex:
        """1 with itself; a wave without end overlaps with nothing else."""
        require_numbers(self)
        if other != self:
            raise ParameterError(
                "a plane wave has no end, so its overlap with another mode is not a number: give it an edge",
                got=f"PlaneWave: area = {self.area:g} m^2 beside {type(other).__name__}",
                fix=f"fa.FlatTop(radius={math.sqrt(self.area / math.pi):.6g})",
            )
        return 1 + 0j
