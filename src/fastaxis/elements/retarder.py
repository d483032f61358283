"""Uniform wave plates: any retardance, half and quarter wave."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi
from typing import Any, ClassVar

from fastaxis import checks
from fastaxis.elements.base import Element, ThroughElement
from fastaxis.elements.warming import REFERENCE, checked_temperatures, warming
from fastaxis.errors import FastaxisWarning, ParameterError
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import Scalar

__all__ = ["HalfWavePlate", "QuarterWavePlate", "Retarder"]


@dataclass(frozen=True, kw_only=True)
class Retarder(ThroughElement):
    """A wave plate: the component across the fast axis falls behind by the retardance.

    J = cos(d/2) - i sin(d/2) [[cos 2f, sin 2f], [sin 2f, -cos 2f]], with the fast axis at f.

    Parameters
    ----------
    fast : angle of the fast axis [rad], counter-clockwise from x facing the source. Give this or ``slow``.
    slow : angle of the slow axis [rad].
    retardance : d [rad], at ``design`` if that is given, else at any wavelength.
    transmission : share of the power that passes [0 .. 1].
    design : wavelength [m] for which ``retardance`` holds. The plate is then dispersion-free: the whole path
        difference, ``order`` waves included, goes as 1/wavelength.
    order : whole waves on top of ``retardance`` (0 for a true zero-order plate).
    temperature, design_temperature : of the plate, and that at which ``retardance`` holds [K]; both 293.15 (20 degrees
        Celsius) if left out.
    drift : share of its retardance, whole waves included, that the plate gains in one kelvin [1/K]: the factor
        1 + drift (temperature - design_temperature). Crystal quartz has about -1e-4, liquid crystals -1e-3 to -1e-2.

    Raises
    ------
    ParameterError : both or neither of ``fast`` and ``slow``; a bare angle in degrees; transmission above 1; a
        temperature in degrees Celsius.

    Notes
    -----
    Thin plate at normal incidence. R. C. Jones, J. Opt. Soc. Am. 31, 488 (1941). Temperature: P. D. Hale and G. W. Day,
    Appl. Opt. 27, 5146 (1988); of two plates of one material crossed to a zero order, the difference drifts with it.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> Retarder(fast=0*deg, retardance=90*deg, name="plate").fast_axis
    0.0
    >>> plate = QuarterWavePlate(fast=0*deg, order=10, design=532e-9, drift=-1e-4, temperature=298.15)
    >>> round(plate.retardance_at(532e-9) / deg - 3690, 3)  # 5 K too warm: -5e-4 of 10.25 waves
    -1.845
    """

    fast: Scalar | None = None
    slow: Scalar | None = None
    retardance: Scalar = pi
    transmission: Scalar = 1.0
    design: Scalar | None = None
    order: int = 0
    temperature: Scalar = REFERENCE
    design_temperature: Scalar = REFERENCE
    drift: Scalar = 0.0

    stem: ClassVar[str] = "plate"

    def __post_init__(self) -> None:
        if (self.fast is None) == (self.slow is None):
            raise ParameterError(
                "a plate has its axis named once, as fast= or as slow=",
                got=f"{self.label}: fast = {self.fast}, slow = {self.slow}",
                fix="fast=22.5*deg",
            )
        for axis in ("fast", "slow"):
            if getattr(self, axis) is not None:
                self._keep(**{axis: checks.angle(self.label, axis, getattr(self, axis))})
        self._keep(
            retardance=checks.angle(self.label, "retardance", self.retardance),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.99"),
            order=checks.whole(self.label, "order", self.order, least=0),
            **checked_temperatures(self.label, self.temperature, self.design_temperature, self.drift),
        )
        if self.design is not None:
            self._keep(design=checks.wavelength(self.label, "design", self.design))
        if self.order != 0 and self.design is None:
            raise ParameterError(
                "order counts whole waves at the design wavelength",
                got=f"{self.label}: order = {self.order}, design = {self.design}",
                fix="order=3, design=633*nm",
            )

    @property
    def fast_axis(self) -> Scalar:
        """Angle of the fast axis [rad], however it was declared."""
        return self.slow - pi / 2 if self.fast is None else self.fast  # type: ignore[operator]  # one of both is set

    def retardance_at(self, wavelength: Scalar) -> Scalar:
        """Retardance [rad] at a wavelength [m] and the plate's temperature, whole waves included."""
        warmed = warming(self.drift, self.temperature, self.design_temperature)
        if self.design is None:
            return self.retardance * warmed
        return (self.retardance + 2 * pi * self.order) * (self.design / wavelength) * warmed

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        half = self.retardance_at(wavelength) / 2
        along, across = Amplitude(self.transmission, -half), Amplitude(self.transmission, half)
        return (AxisLaw(along, across, self.fast_axis),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        return super().cautions(wavelength) + checks.near_design(self.label, self.design, wavelength)

    def changed(self, **changes: Any) -> Element:
        # Naming one axis in a change un-names the other: the plate was turned, not declared twice.
        if "fast" in changes and "slow" not in changes:
            changes["slow"] = None
        if "slow" in changes and "fast" not in changes:
            changes["fast"] = None
        return super().changed(**changes)


@dataclass(frozen=True, kw_only=True)
class HalfWavePlate(Retarder):
    """A wave plate of half a wave: turns linear light from a to 2 fast - a and changes the hand of circular light.

    Parameters as :class:`Retarder`; ``retardance`` may be a little off 180 deg.
    """

    retardance: Scalar = pi


@dataclass(frozen=True, kw_only=True)
class QuarterWavePlate(Retarder):
    """A wave plate of a quarter wave: with its fast axis at +45 deg it makes H into R, at -45 deg into L.

    Parameters as :class:`Retarder`; ``retardance`` may be a little off 90 deg.
    """

    retardance: Scalar = pi / 2
