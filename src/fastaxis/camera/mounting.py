"""The picture of a camera that is turned or mirrored, and the same light in the beam's own frame."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["Mounting"]


class Mounting:
    """How a picture stands to the view that faces the source: mirrored left-right or not, then turned.

    Parameters
    ----------
    orientation : as in fa.Camera(orientation=...).

    Examples
    --------
    >>> Mounting("mirrored, turned 90").point(1.0, 0.0)
    (0.0, -1.0)
    """

    def __init__(self, orientation: str) -> None:
        self.mirrored = orientation.startswith("mirrored")
        self.quarters = next((k for k in (1, 2, 3) if orientation.endswith(f"turned {90 * k}")), 0)

    @property
    def upright(self) -> bool:
        """Whether the picture is the view that faces the source."""
        return not self.mirrored and self.quarters == 0

    @property
    def words(self) -> str:
        """What was done to the picture; "" for an upright one.

        >>> Mounting("turned 90").words, Mounting("mirrored").words
        ('turned 90° counter-clockwise', 'mirrored left-right')
        """
        done = ["mirrored left-right"] * self.mirrored
        done += [f"turned {90 * self.quarters}° counter-clockwise"] * (self.quarters > 0)
        return ", then ".join(done)

    def point(self, x: float, y: float) -> tuple[float, float]:
        """Where a point of the beam's plane stands in the picture."""
        x = -x if self.mirrored else x
        for _ in range(self.quarters):
            x, y = 0.0 - y, x
        return x, y

    def beam_angle(self, angle: float) -> float:
        """Angle [rad] in the beam's frame of a direction in the picture, counter-clockwise from x, 0 .. 2 pi."""
        angle -= self.quarters * math.pi / 2
        return (math.pi - angle if self.mirrored else angle) % (2 * math.pi)

    def seen_stokes(self, stokes: Any) -> NDArray[np.float64]:
        """Stokes parameters (4, ...) of what is seen in the picture.

        A mirror picture of an ellipse has the opposite azimuth and sense; a picture turned by beta has its ellipses
        turned by beta: S1 + i S2 -> (S1 + i S2) exp(2 i beta), which is a change of sign for each quarter turn.
        """
        s1 = s2 = -1 if self.quarters % 2 else 1
        s3 = -1 if self.mirrored else 1
        signs = np.array([1, s1, s2 * s3, s3])
        stokes = np.asarray(stokes)
        return np.asarray(stokes * signs.reshape(4, *[1] * (stokes.ndim - 1)))

    def undone(self, picture: Any) -> Any:
        """The picture (..., ny, nx) as an upright camera at the same place would have given it."""
        picture = np.rot90(picture, self.quarters, axes=(-2, -1))
        return picture[..., ::-1] if self.mirrored else picture

    def undone_axes(self, x: NDArray[Any], y: NDArray[Any]) -> tuple[NDArray[Any], NDArray[Any]]:
        """Columns and rows (x, y) of :meth:`undone`, from those of the picture."""
        for _ in range(self.quarters):
            x, y = y, -x[::-1]
        return (-x[::-1] if self.mirrored else x), y
