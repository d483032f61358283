"""The axis law: one amplitude along an axis, another across it. Plates, polarizers, mirrors are all this."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi
from typing import Any

from fastaxis.laws.amplitude import UNIT, Amplitude, at
from fastaxis.maths import Maths, Pattern, Scalar, Value

__all__ = ["AxisLaw"]

Matrix = tuple[tuple[Any, Any], tuple[Any, Any]]


@dataclass(frozen=True)
class AxisLaw:
    """Amplitude ``along`` an axis and ``across`` it; the axis stands at ``order * phi + angle``.

    With a = (t1 + t2)/2, b = (t1 - t2)/2 and the axis at theta the matrix is

        linear basis (x, y):    a + b [[cos 2theta, sin 2theta], [sin 2theta, -cos 2theta]]
        circular basis (L, R):  [[a, b exp(-2i theta)], [b exp(+2i theta), a]]

    Parameters
    ----------
    along, across : the two amplitudes.
    angle : of the axis [rad], counter-clockwise from x facing the source; number, symbol or Pattern.
    order : turns of the axis per turn of phi (the q of a q-plate); 0 for a uniform plate.
    centre : (x, y) [m] from which phi and patterns are counted.
    """

    along: Amplitude = UNIT
    across: Amplitude = UNIT
    angle: Value = 0.0
    order: Scalar = 0
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    @property
    def uniform(self) -> bool:
        """Whether the matrix is the same everywhere in the plane."""
        return self.order == 0 and not isinstance(self.angle, Pattern) and self.along.uniform and self.across.uniform

    @property
    def values(self) -> tuple[Value, ...]:
        return (
            *self.along.values,
            *self.across.values,
            self.angle,
            self.order,
            *self.centre,
        )

    def axis_angle(self, phi: Any = 0.0, x: Any = 0.0, y: Any = 0.0) -> Any:
        """Where the axis stands [rad]; phi, x, y are counted from ``centre``."""
        angle = at(self.angle, x, y)
        # order == 0 is tested so that a uniform plate stays a scalar whatever phi is.
        return angle if self.order == 0 else self.order * phi + angle

    def mean_and_difference(self, maths: Maths, x: Any = 0.0, y: Any = 0.0) -> tuple[Any, Any]:
        """A = (t1 + t2)/2 and b = (t1 - t2)/2."""
        along, across = self.along.value(maths, x, y), self.across.value(maths, x, y)
        return (along + across) * maths.half, (along - across) * maths.half

    def circular(self, maths: Maths, phi: Any = 0.0, x: Any = 0.0, y: Any = 0.0) -> Matrix:
        """The matrix in the basis (L, R); phi, x, y are counted from ``centre``."""
        a, b = self.mean_and_difference(maths, x, y)
        twice = 2 * self.axis_angle(phi, x, y)
        return (a, b * maths.phasor(-twice)), (b * maths.phasor(twice), a)

    def linear(self, maths: Maths, phi: Any = 0.0, x: Any = 0.0, y: Any = 0.0) -> Matrix:
        """The matrix in the basis (x, y); phi, x, y are counted from ``centre``."""
        twice = 2 * self.axis_angle(phi, x, y)
        return self.with_axis(maths, maths.cos(twice), maths.sin(twice), x, y)

    def with_axis(self, maths: Maths, cosine: Any, sine: Any, x: Any = 0.0, y: Any = 0.0) -> Matrix:
        """The matrix in the basis (x, y), given cosine and sine of twice the angle of the axis."""
        a, b = self.mean_and_difference(maths, x, y)
        cosine, sine = b * cosine, b * sine
        return (a + cosine, sine), (sine, a - cosine)

    def angle_derivative(self, maths: Maths, phi: Any = 0.0) -> Matrix:
        """d(matrix)/d(angle) in the basis (x, y)."""
        _, b = self.mean_and_difference(maths)
        twice = 2 * self.axis_angle(phi)
        cosine, sine = b * maths.number(2) * maths.cos(twice), b * maths.number(2) * maths.sin(twice)
        return (sine * maths.number(-1), cosine), (cosine, sine)

    def retardance_derivative(self, maths: Maths, phi: Any = 0.0) -> Matrix:
        """d(matrix)/d(retardance) in the basis (x, y): along loses half of it, across gains half."""
        slope = maths.number(0.5j)
        along, across = self.along.value(maths), self.across.value(maths)
        a = (across - along) * slope * maths.half
        b = (along + across) * slope * maths.number(-1) * maths.half
        twice = 2 * self.axis_angle(phi)
        cosine, sine = b * maths.cos(twice), b * maths.sin(twice)
        return (a + cosine, sine), (sine, a - cosine)

    def mirrored(self, axis: str = "x") -> AxisLaw:
        """The same plate described in a frame with x (or y) reversed.

        With x reversed phi becomes pi - phi and angles change sign, so an axis at q*phi + alpha is seen at
        q*phi' - alpha - q*pi; with y reversed phi becomes -phi and it is seen at q*phi' - alpha.
        """
        angle = self.angle.mirrored(axis) if isinstance(self.angle, Pattern) else self.angle
        angle = -angle
        if axis == "x" and self.order != 0:
            angle = angle + (-self.order * pi)  # a Pattern can be shifted by adding only
        x, y = self.centre
        return AxisLaw(
            self.along.mirrored(axis),
            self.across.mirrored(axis),
            angle,
            self.order,
            (-x, y) if axis == "x" else (x, -y),
        )

    def backward(self) -> AxisLaw:
        """Met from behind, in the backward beam's frame: D J^T D, and J is symmetric."""
        return self.mirrored("x")
