"""Rotators: optically active plates, which unwind on the way back, and Faraday rotators, which do not."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, CircularLaw
from fastaxis.maths import Scalar

__all__ = ["FaradayRotator", "Rotator"]


@dataclass(frozen=True, kw_only=True)
class Rotator(ThroughElement):
    """Turns the polarization counter-clockwise by an angle, by optical activity: J = [[cos, -sin], [sin, cos]].

    L gains exp(-i angle), R gains exp(+i angle). Light that comes back is turned the same way in its own frame, so a
    double pass by a mirror cancels.

    Parameters
    ----------
    angle : of the turn [rad], counter-clockwise facing the source.
    transmission : share of the power that passes [0 .. 1].

    Raises
    ------
    ParameterError : a bare angle in degrees; transmission above 1.

    Notes
    -----
    E. Hecht, Optics, 4th ed. (2002), section 8.10.

    Examples
    --------
    >>> from fastaxis.maths import NUMBERS
    >>> from fastaxis.units import deg
    >>> Rotator(angle=90*deg).laws(532e-9)[0].linear(NUMBERS)[1][0].real
    1.0
    """

    angle: Scalar
    transmission: Scalar = 1.0

    stem: ClassVar[str] = "rotator"
    reciprocal: ClassVar[bool] = True

    def __post_init__(self) -> None:
        self._keep(
            angle=checks.angle(self.label, "angle", self.angle),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.99"),
        )

    def laws(self, wavelength: Scalar) -> tuple[CircularLaw, ...]:
        left, right = Amplitude(self.transmission, -self.angle), Amplitude(self.transmission, self.angle)
        return (CircularLaw(left, right, self.reciprocal),)


@dataclass(frozen=True, kw_only=True)
class FaradayRotator(Rotator):
    """Turns the polarization by a magnetic field: as :class:`Rotator` forwards, the other way for light coming back.

    In the laboratory both turns have the same sense, so a double pass by a mirror adds up to twice the angle: with
    45 deg it is the heart of an isolator.

    Parameters as :class:`Rotator`.
    """

    reciprocal: ClassVar[bool] = False
