"""The circular law: one amplitude for left and one for right circular light. Rotators are this."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from fastaxis.laws.amplitude import UNIT, Amplitude
from fastaxis.laws.axis import Matrix
from fastaxis.maths import Maths, Value

__all__ = ["CircularLaw"]


@dataclass(frozen=True)
class CircularLaw:
    """Amplitudes for L = (1, i)/sqrt2 and R = (1, -i)/sqrt2; uniform over the plane.

    A rotation by beta (counter-clockwise, facing the source) is left = exp(-i beta), right = exp(+i beta).

    Parameters
    ----------
    left, right : the two amplitudes.
    reciprocal : True for optical activity, False for Faraday rotation.
    """

    left: Amplitude = UNIT
    right: Amplitude = UNIT
    reciprocal: bool = True

    uniform = True

    @property
    def values(self) -> tuple[Value, ...]:
        return (*self.left.values, *self.right.values)

    def circular(self, maths: Maths, phi: Any = 0.0, x: Any = 0.0, y: Any = 0.0) -> Matrix:
        """The matrix in the basis (L, R)."""
        zero = maths.number(0)
        return (self.left.value(maths), zero), (zero, self.right.value(maths))

    def linear(self, maths: Maths, phi: Any = 0.0, x: Any = 0.0, y: Any = 0.0) -> Matrix:
        """The matrix in the basis (x, y)."""
        left, right = self.left.value(maths), self.right.value(maths)
        mean, half_difference = (left + right) * maths.half, (left - right) * maths.half
        turn = half_difference * maths.number(1j)
        return (mean, turn * maths.number(-1)), (turn, mean)

    def mirrored(self, axis: str = "x") -> CircularLaw:
        """The same part described in a frame with one axis reversed: the two hands change places."""
        return CircularLaw(self.right, self.left, self.reciprocal)

    def backward(self) -> CircularLaw:
        """Met from behind, in the backward beam's frame.

        Optical activity is met as the same rotation; Faraday rotation as the opposite one.
        """
        return self if self.reciprocal else self.mirrored()
