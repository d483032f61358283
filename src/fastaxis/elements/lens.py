"""The thin lens."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import FastaxisWarning, ParameterError, SlipWarning
from fastaxis.laws import ScalarLaw
from fastaxis.laws.stops import Disc
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["Lens"]


@dataclass(frozen=True, kw_only=True)
class Lens(ThroughElement):
    """Thin lens: the field is multiplied by exp(-i k r^2 / (2 focal)); polarization is kept.

    Parameters
    ----------
    focal : focal length [m]; positive converges, negative diverges.
    radius : of the clear area [m] (half the diameter); None for an unbounded lens.
    centre : (x, y) [m]. Off centre it also turns the beam towards its axis.

    Raises
    ------
    ParameterError : a focal length of zero; a radius of zero or less.

    Notes
    -----
    Paraxial. J. W. Goodman, Introduction to Fourier Optics, 3rd ed. (2005), section 5.1.

    Examples
    --------
    >>> from fastaxis.units import mm
    >>> Lens(focal=500*mm).laws(532e-9)[0].vergence
    2.0
    """

    focal: Scalar
    radius: Scalar | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    stem: ClassVar[str] = "lens"

    def __post_init__(self) -> None:
        focal = checks.number(self.label, "focal", self.focal, fix="focal=500*mm")
        if focal == 0:
            raise ParameterError(
                "a focal length of zero would turn light by any angle",
                got=f"{self.label}: focal = 0",
                fix="focal=500*mm",
            )
        self._keep(focal=focal, centre=checks.centre(self.label, self.centre))
        if self.radius is not None:
            self._keep(radius=checks.length(self.label, "radius", self.radius, most=1.0, fix="radius=12.7*mm"))

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        stop = None if self.radius is None else Disc(self.radius)
        return (ScalarLaw(vergence=1 / self.focal, stop=stop, centre=self.centre),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        found = checks.usual(self.label, "focal", self.focal, 20.0, fix=f"focal={self.focal}*mm")
        if self.radius is None or is_symbolic(self.radius) or is_symbolic(self.focal):
            return found
        # At a focal ratio of 1 the fourth-order term k r^4/(8 f^3) is no longer small against the parabola.
        if self.radius > abs(self.focal) / 2:
            found.append(
                SlipWarning(
                    "a thin lens is paraxial and a clear radius above half the focal length is not",
                    got=f"{self.label}: radius = {self.radius * 1e3:.4g}*mm, focal = {self.focal * 1e3:.4g}*mm",
                    fix=f"radius={abs(self.focal) * 250:.4g}*mm",
                )
            )
        return found
