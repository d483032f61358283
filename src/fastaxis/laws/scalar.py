"""The scalar law: the same complex transmission for both polarizations. Lenses, apertures, spiral plates."""

from __future__ import annotations

from dataclasses import dataclass, replace
from math import pi

from fastaxis.laws.amplitude import UNIT, Amplitude
from fastaxis.laws.stops import Stop
from fastaxis.maths import Scalar, Value

__all__ = ["ScalarLaw"]


@dataclass(frozen=True)
class ScalarLaw:
    """transmission * exp(i charge phi) * exp(-i k vergence r^2/2) * exp(i k tilt.r) inside a clear area.

    Parameters
    ----------
    transmission : uniform amplitude, or a mask whose power and phase are Patterns.
    charge : turns of phase [2 pi] per counter-clockwise turn (a spiral plate).
    vergence : 1/focal length [1/m]; positive for a converging lens.
    tilt : (x, y) angles [rad] by which the beam is turned (a thin wedge).
    stop : clear area; None lets everything through.
    centre : (x, y) [m] of all of these.
    """

    transmission: Amplitude = UNIT
    charge: Scalar = 0
    vergence: Scalar = 0.0
    tilt: tuple[Scalar, Scalar] = (0.0, 0.0)
    stop: Stop | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    @property
    def uniform(self) -> bool:
        """Whether the transmission is the same everywhere in the plane."""
        return (
            self.transmission.uniform
            and self.charge == 0
            and self.vergence == 0
            and self.tilt == (0.0, 0.0)
            and self.stop is None
        )

    @property
    def values(self) -> tuple[Value, ...]:
        stop = self.stop.values if self.stop else ()
        return (
            *self.transmission.values,
            self.charge,
            self.vergence,
            *self.tilt,
            *stop,
            *self.centre,
        )

    def mirrored(self, axis: str = "x") -> ScalarLaw:
        """The same part described in a frame with x (or y) reversed.

        With x reversed phi becomes pi - phi: exp(i l phi) is exp(i l pi) exp(-i l phi').
        """
        transmission = self.transmission.mirrored(axis)
        if axis == "x" and self.charge != 0:
            transmission = replace(transmission, phase=transmission.phase + self.charge * pi)
        (tx, ty), (x, y) = self.tilt, self.centre
        return ScalarLaw(
            transmission,
            -self.charge,
            self.vergence,
            (-tx, ty) if axis == "x" else (tx, -ty),
            self.stop.mirrored(axis) if self.stop else None,
            (-x, y) if axis == "x" else (x, -y),
        )

    def backward(self) -> ScalarLaw:
        """Met from behind, in the backward beam's frame."""
        return self.mirrored("x")
