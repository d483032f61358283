"""What all mirrors share: the plane of the fold, and which component of the light is p."""

from __future__ import annotations

from typing import Any, ClassVar

from fastaxis.elements.base import Element, Passages
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, AxisLaw, Passage
from fastaxis.maths import Scalar

__all__ = ["Folding", "check_fold", "reflection"]


class Folding(Element):
    """Base of the mirrors: light comes to the front and leaves from the front.

    With ``two_way`` a second beam runs the same path against the first, as in a loop. Then light that enters by
    "front" leaves by "side" and the other way round, so that both beams can be joined on.
    """

    two_way: bool  # a field of each mirror, listed after its own

    stem: ClassVar[str] = "mirror"
    entry: ClassVar[str | None] = "front"

    @property
    def faces(self) -> tuple[str, ...]:  # type: ignore[override]  # of most parts they are fixed
        return ("front", "side") if self.two_way else ("front",)

    @property
    def exit(self) -> str:  # type: ignore[override]  # of most parts it is fixed
        return self.faces[-1]

    def passages(self, wavelength: Scalar) -> Passages:
        ways = self.forward(wavelength)
        if not self.two_way:
            return ways
        there = ways["front", "front"]
        return {("front", "side"): there, ("side", "front"): there.backward()}


def check_fold(part: str, fold: Any) -> None:
    """Refuse anything but the two planes that a beam is folded in."""
    if fold not in ("horizontal", "vertical"):
        raise ParameterError(
            'a mirror folds the beam "horizontal" (in the table plane) or "vertical"',
            got=f"{part}: fold = {fold!r}",
            fix='fold="horizontal"',
        )


def reflection(fold: str, p: Amplitude, s: Amplitude) -> Passage:
    """The passage of a reflection with these amplitudes, the half wave of s (or p) by the frame rule included.

    p lies along x for a horizontal fold and along y for a vertical one.
    """
    if fold == "horizontal":
        return Passage((AxisLaw(p, s),), "x")
    return Passage((AxisLaw(s, p),), "y")
