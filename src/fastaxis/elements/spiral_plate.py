"""The spiral phase plate."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import FastaxisWarning
from fastaxis.laws import Amplitude, ScalarLaw
from fastaxis.maths import Scalar

__all__ = ["SpiralPlate"]


@dataclass(frozen=True, kw_only=True)
class SpiralPlate(ThroughElement):
    """Spiral staircase of glass: the field is multiplied by exp(i charge phi); polarization is kept.

    Parameters
    ----------
    charge : whole turns of phase per counter-clockwise turn of phi, facing the source; positive or negative.
    centre : (x, y) of the singular point [m].
    transmission : share of the power that passes [0 .. 1].
    design : wavelength [m] for which ``charge`` holds; at another one the step is charge * design / wavelength waves,
        which leaves a cut along the negative x direction.

    Raises
    ------
    ParameterError : a charge that is not whole.

    Notes
    -----
    Thin plate. M. W. Beijersbergen et al., Opt. Commun. 112, 321 (1994).

    Examples
    --------
    >>> SpiralPlate(charge=2, design=532e-9).charge_at(1064e-9)
    1.0
    """

    charge: Scalar
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)
    transmission: Scalar = 1.0
    design: Scalar | None = None

    stem: ClassVar[str] = "spiral"

    def __post_init__(self) -> None:
        self._keep(
            charge=checks.whole(self.label, "charge", self.charge),
            centre=checks.centre(self.label, self.centre),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.99"),
        )
        if self.design is not None:
            self._keep(design=checks.wavelength(self.label, "design", self.design))

    def charge_at(self, wavelength: Scalar) -> Scalar:
        """Turns of phase at a wavelength [m]."""
        return self.charge if self.design is None else self.charge * (self.design / wavelength)

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        return (ScalarLaw(Amplitude(self.transmission), charge=self.charge_at(wavelength), centre=self.centre),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        return super().cautions(wavelength) + checks.near_design(self.label, self.design, wavelength)
