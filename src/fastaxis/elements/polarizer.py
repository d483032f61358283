"""The polarizer: passes the component along its axis, the other one by the extinction less."""

from __future__ import annotations

from dataclasses import dataclass
from math import inf
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import Scalar

__all__ = ["Polarizer"]


@dataclass(frozen=True, kw_only=True)
class Polarizer(ThroughElement):
    """Linear polarizer: J = R(axis) diag(sqrt(T1), sqrt(T2)) R(-axis) with T1 = transmission, T2 = T1/extinction.

    Parameters
    ----------
    axis : angle of the passed component [rad], counter-clockwise from x facing the source.
    extinction : T1/T2 (> 1), the ratio of the powers passed along and across the axis; infinite for an ideal one.
    transmission : T1, the share of the power along the axis that passes [0 .. 1].

    Raises
    ------
    ParameterError : an extinction of 1 or less; a bare angle in degrees; transmission above 1.

    Notes
    -----
    The leaking component keeps its phase. E. Hecht, Optics, 4th ed. (2002), table 8.6.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> law, = Polarizer(axis=30*deg, extinction=1e4).laws(532e-9)
    >>> law.across.power
    0.0001
    """

    axis: Scalar
    extinction: Scalar = inf
    transmission: Scalar = 1.0

    stem: ClassVar[str] = "polarizer"

    def __post_init__(self) -> None:
        self._keep(
            axis=checks.angle(self.label, "axis", self.axis),
            extinction=checks.extinction(self.label, self.extinction),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.9"),
        )

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        across = self.transmission / self.extinction
        return (AxisLaw(Amplitude(self.transmission), Amplitude(across), self.axis),)
