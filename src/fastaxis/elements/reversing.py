"""What the prisms and mirror sets that reverse the picture share: the mirror image in a line across the beam."""

from __future__ import annotations

from fastaxis.laws import Amplitude, AxisLaw, Flip, Law, Turn
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["mirror_image"]


def mirror_image(p: Amplitude, s: Amplitude, roll: Scalar) -> tuple[Law, ...]:
    """The laws of an odd number of reflections after which the beam goes on straight.

    The picture becomes its mirror image in the line at ``roll``, which is s: y reversed, then turned by 2 roll. Light
    keeps its frame, in which p, across that line, meets the same signs as at a vertical fold.
    """
    jones, reversal = AxisLaw(s, p, roll), Flip("y")
    if not is_symbolic(roll) and roll == 0:
        return (jones, reversal)
    return (jones, reversal, Turn(2 * roll))
