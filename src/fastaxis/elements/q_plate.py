"""The q-plate: a wave plate whose axis turns with the azimuth."""

from __future__ import annotations

from dataclasses import dataclass
from math import cos, pi
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.elements.warming import REFERENCE, checked_temperatures, warming
from fastaxis.errors import FastaxisWarning
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import Scalar

__all__ = ["QPlate"]


@dataclass(frozen=True, kw_only=True)
class QPlate(ThroughElement):
    """A wave plate with its fast axis at q*phi + offset: it swaps the hands of circular light and adds charge.

    L -> cos(d/2) L - i sin(d/2) exp(+2i(q phi + offset)) R, and the mirror image of it for R: tuned (d = 180 deg),
    L with charge l leaves as R with l + 2q, R with l as L with l - 2q, and linear light at a leaves at the local
    angle 2q phi + 2 offset - a. Detuned, the share cos^2(d/2) passes unchanged.

    Parameters
    ----------
    q : turns of the axis per turn of phi; any multiple of 1/2, also negative.
    offset : angle of the fast axis on the +x side of the centre [rad]. For a liquid-crystal plate the director is the
        slow axis: add 90 deg to its angle.
    retardance : d [rad], at ``design`` if that is given, else at any wavelength.
    centre : (x, y) of the singular point of the plate [m].
    transmission : share of the power that passes [0 .. 1].
    design : wavelength [m] for which ``retardance`` holds; the path difference is taken as dispersion-free.
    temperature, design_temperature : of the plate, and that at which ``retardance`` holds [K]; both 293.15 (20 degrees
        Celsius) if left out.
    drift : share of its retardance that the plate gains in one kelvin [1/K]: the factor
        1 + drift (temperature - design_temperature). Crystal quartz has about -1e-4, liquid crystals -1e-3 to -1e-2.

    Raises
    ------
    ParameterError : q not a multiple of 1/2; a bare angle in degrees; transmission above 1; a temperature in degrees
        Celsius.

    Notes
    -----
    Thin plate. L. Marrucci, C. Manzo, D. Paparo, Phys. Rev. Lett. 96, 163905 (2006).

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> plate = QPlate(q=0.5, retardance=170*deg)
    >>> round(plate.unconverted(532e-9), 4)
    0.0076
    """

    q: Scalar
    offset: Scalar = 0.0
    retardance: Scalar = pi
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)
    transmission: Scalar = 1.0
    design: Scalar | None = None
    temperature: Scalar = REFERENCE
    design_temperature: Scalar = REFERENCE
    drift: Scalar = 0.0

    stem: ClassVar[str] = "qplate"

    def __post_init__(self) -> None:
        self._keep(
            q=checks.half_integer(self.label, "q", self.q),
            offset=checks.angle(self.label, "offset", self.offset),
            retardance=checks.angle(self.label, "retardance", self.retardance),
            centre=checks.centre(self.label, self.centre),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.99"),
            **checked_temperatures(self.label, self.temperature, self.design_temperature, self.drift),
        )
        if self.design is not None:
            self._keep(design=checks.wavelength(self.label, "design", self.design))

    def retardance_at(self, wavelength: Scalar) -> Scalar:
        """Retardance [rad] at a wavelength [m] and the plate's temperature."""
        warmed = self.retardance * warming(self.drift, self.temperature, self.design_temperature)
        return warmed if self.design is None else warmed * (self.design / wavelength)

    def unconverted(self, wavelength: float) -> float:
        """Share of the transmitted power that keeps its hand and its charge, cos^2(d/2); numbers only."""
        return cos(self.retardance_at(wavelength) / 2) ** 2

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        half = self.retardance_at(wavelength) / 2
        along, across = Amplitude(self.transmission, -half), Amplitude(self.transmission, half)
        return (AxisLaw(along, across, self.offset, self.q, self.centre),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        return super().cautions(wavelength) + checks.near_design(self.label, self.design, wavelength)
