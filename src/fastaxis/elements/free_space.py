"""Free space between two parts."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import FastaxisWarning
from fastaxis.laws import TravelLaw
from fastaxis.maths import Scalar

__all__ = ["FreeSpace"]


@dataclass(frozen=True)
class FreeSpace(ThroughElement):
    """A distance of vacuum: the envelope diffracts, exp(i k distance) is kept apart as optical path.

    Parameters
    ----------
    distance : [m], zero or more; may be given by position.

    Raises
    ------
    ParameterError : a negative distance.

    Notes
    -----
    Paraxial (Fresnel). J. W. Goodman, Introduction to Fourier Optics, 3rd ed. (2005), chapter 4.

    Examples
    --------
    >>> from fastaxis.units import mm
    >>> FreeSpace(500*mm).laws(532e-9)[0].b
    0.5
    """

    distance: Scalar

    stem: ClassVar[str] = "space"

    def __post_init__(self) -> None:
        self._keep(distance=checks.length(self.label, "distance", self.distance, zero=True, fix="distance=500*mm"))

    def laws(self, wavelength: Scalar) -> tuple[TravelLaw, ...]:
        return (TravelLaw.free(self.distance),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        return checks.usual(self.label, "distance", self.distance, 100.0, fix=f"distance={self.distance}*mm")
