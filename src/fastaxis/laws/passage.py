"""What happens between two faces of a part: laws in the order the light meets them, and a reflection or not."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeAlias

from fastaxis.laws.axis import AxisLaw
from fastaxis.laws.circular import CircularLaw
from fastaxis.laws.scalar import ScalarLaw
from fastaxis.laws.travel import TravelLaw
from fastaxis.maths import Scalar

__all__ = ["Flip", "Law", "Passage", "Turn"]


@dataclass(frozen=True)
class Flip:
    """The change of the transverse frame at a reflection: x -> -x (or y -> -y for a vertical fold).

    It moves places only; the polarization part, diag(1, -1) for x and diag(-1, 1) for y, belongs to the mirror's
    axis law.
    """

    axis: str = "x"
    uniform = False
    values = ()

    def mirrored(self, axis: str = "x") -> Flip:
        return self

    def backward(self) -> Flip:
        return self


@dataclass(frozen=True)
class Turn:
    """The picture turned counter-clockwise about the axis: field'(r) = field(R(-angle) r), so l gains exp(-i l angle).

    It moves places only; (Ex, Ey) stay what they are. With a Flip it makes the reversal across any line: first y
    reversed, then turned by 2a, is the mirror image in the line at a, which is what a Dove prism does.

    Parameters
    ----------
    angle : [rad], counter-clockwise facing the source.
    """

    angle: Scalar
    uniform = False

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.angle,)

    def mirrored(self, axis: str = "x") -> Turn:
        """Seen with one axis reversed it turns the other way."""
        return Turn(-self.angle)

    def backward(self) -> Turn:
        """Undone on the way back, which in the backward beam's reversed frame is the same turn."""
        return self


Law: TypeAlias = AxisLaw | CircularLaw | ScalarLaw | TravelLaw | Flip | Turn


@dataclass(frozen=True)
class Passage:
    """From one face of a part to another.

    Parameters
    ----------
    laws : in the order the light meets them, in the frame of the incoming beam.
    reflected : "" for transmission, "x" for a fold in the table plane, "y" for a fold in the vertical plane.
    """

    laws: tuple[Law, ...] = ()
    reflected: str = ""

    def steps(self) -> tuple[Law, ...]:
        """The laws, followed by the frame change if the light was reflected."""
        return (*self.laws, Flip(self.reflected)) if self.reflected else self.laws

    def backward(self) -> Passage:
        """The passage taken the other way, in the backward beam's own frame."""
        if not self.reflected:
            return Passage(tuple(law.backward() for law in reversed(self.laws)))
        # Reversing the direction mirrors x, and so does the fold itself: on the way back a fold in the table
        # plane is met at the same x. A vertical fold is met turned by half a turn. Axis laws of a reflection
        # have their axis in or across the plane of incidence and are the same both ways.
        if self.reflected == "x":
            return Passage(tuple(reversed(self.laws)), "x")
        return Passage(tuple(_half_turn(law) for law in reversed(self.laws)), "y")


def _half_turn(law: Law) -> Law:
    return law.mirrored("x").mirrored("y")
