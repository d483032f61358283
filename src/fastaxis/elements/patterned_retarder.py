"""A wave plate whose axis or retardance varies over the plate."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi
from typing import Any, ClassVar

from fastaxis import checks
from fastaxis.elements.base import Element, ThroughElement
from fastaxis.elements.warming import REFERENCE, checked_temperatures, warming
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import Scalar, Value

__all__ = ["PatternedRetarder"]


@dataclass(frozen=True, kw_only=True)
class PatternedRetarder(ThroughElement):
    """A wave plate of which the axis, the retardance or both vary from place to place.

    At each place J = cos(d/2) - i sin(d/2) [[cos 2f, sin 2f], [sin 2f, -cos 2f]] with that place's f and d.

    Parameters
    ----------
    fast : angle of the fast axis [rad]: a number, a function ``f(x, y)`` of arrays [m] in the plate's own frame, or a
        (ny, nx) array of cells, rows along +y. Give this or ``slow``.
    slow : angle of the slow axis [rad], likewise.
    retardance : d [rad], likewise.
    pixel : side of a cell [m], for arrays.
    centre : (x, y) of the plate's own origin [m].
    transmission : share of the power that passes [0 .. 1].
    temperature, design_temperature : of the plate, and that at which ``retardance`` holds [K]; both 293.15 (20 degrees
        Celsius) if left out.
    drift : share of its retardance that the plate gains in one kelvin [1/K]: the factor
        1 + drift (temperature - design_temperature). Crystal quartz has about -1e-4, liquid crystals -1e-3 to -1e-2.

    Raises
    ------
    ParameterError : both or neither axis; an array without ``pixel``; a function that does not work on arrays; a
        temperature in degrees Celsius.

    Notes
    -----
    Thin plate, cells much larger than the wavelength. E. Hasman, V. Kleiner, G. Biener, A. Niv, Appl. Phys. Lett. 82,
    328 (2003): with fast = -k r^2/(4 f) and d = 180 deg it is a lens of focal length +f for L and -f for R.

    Examples
    --------
    >>> import numpy as np
    >>> plate = PatternedRetarder(fast=lambda x, y: np.arctan2(y, x) / 2, retardance=pi)
    >>> plate.laws(532e-9)[0].uniform
    False
    """

    fast: Any = None
    slow: Any = None
    retardance: Any = pi
    pixel: float | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)
    transmission: Scalar = 1.0
    temperature: Scalar = REFERENCE
    design_temperature: Scalar = REFERENCE
    drift: Scalar = 0.0

    stem: ClassVar[str] = "plate"

    def __post_init__(self) -> None:
        if (self.fast is None) == (self.slow is None):
            raise ParameterError(
                "a plate has its axis named once, as fast= or as slow=",
                got=f"{self.label}: {'neither' if self.fast is None else 'both'} of fast and slow given",
                fix="fast=lambda x, y: 90*deg * x / mm",
            )
        for angle in ("fast", "slow", "retardance"):
            if (given := getattr(self, angle)) is not None:
                value = checks.pattern(self.label, angle, given, self.pixel, fix=f"{angle}=22.5*deg")
                self._keep(**{angle: checks.angle(self.label, angle, value, patterned=True)})
        self._keep(
            centre=checks.centre(self.label, self.centre),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.99"),
            **checked_temperatures(self.label, self.temperature, self.design_temperature, self.drift),
        )

    @property
    def fast_axis(self) -> Value:
        """Angle of the fast axis [rad], however it was declared."""
        return self.slow + (-pi / 2) if self.fast is None else self.fast

    @property
    def warmed_retardance(self) -> Value:
        """Retardance [rad] at the plate's temperature."""
        return self.retardance * warming(self.drift, self.temperature, self.design_temperature)

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        half = self.warmed_retardance / 2
        along, across = Amplitude(self.transmission, -half), Amplitude(self.transmission, half)
        return (AxisLaw(along, across, self.fast_axis, centre=self.centre),)

    def changed(self, **changes: Any) -> Element:
        # Naming one axis in a change un-names the other, as for a uniform plate.
        for axis, other in (("fast", "slow"), ("slow", "fast")):
            if axis in changes and other not in changes:
                changes[other] = None
        return super().changed(**changes)
