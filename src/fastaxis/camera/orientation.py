"""The eight ways a camera can be mounted, as changes of the picture's array."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import ParameterError

__all__ = ["ORIENTATIONS", "Orientation", "orientation"]


@dataclass(frozen=True)
class Orientation:
    """From the receiver's picture to the camera's: (u, v) = matrix (x, y), a turn or a mirroring.

    The receiver's picture has columns along +x and rows along +y. In the camera's picture columns run along +u and
    rows along +v. A point of the beam at (x, y) is seen at (u, v).

    Parameters
    ----------
    name : of the orientation.
    matrix : ((ux, uy), (vx, vy)) of 0, 1 and -1.
    """

    name: str
    matrix: tuple[tuple[int, int], tuple[int, int]]

    @property
    def swaps(self) -> bool:
        """Whether rows and columns change places."""
        return self.matrix[0][0] == 0

    def apply(self, picture: NDArray[Any]) -> NDArray[Any]:
        """The camera's array for the receiver's array (..., ny, nx); leading axes are left alone."""
        if self.swaps:
            picture = np.swapaxes(picture, -1, -2)
        u_sign, v_sign = sum(self.matrix[0]), sum(self.matrix[1])
        return picture[..., ::v_sign, ::u_sign]

    def place(self, x: float, y: float) -> tuple[float, float]:
        """Where the camera sees the point (x, y) of the beam [m]."""
        (ux, uy), (vx, vy) = self.matrix
        return ux * x + uy * y, vx * x + vy * y

    def scene_shape(self, shape: tuple[int, int]) -> tuple[int, int]:
        """(ny, nx) in the receiver's picture for (nv, nu) of the camera's."""
        return (shape[1], shape[0]) if self.swaps else shape


ORIENTATIONS: dict[str, Orientation] = {
    name: Orientation(name, matrix)
    for name, matrix in {
        "upright": ((1, 0), (0, 1)),
        "quarter turn": ((0, -1), (1, 0)),
        "half turn": ((-1, 0), (0, -1)),
        "three quarter turn": ((0, 1), (-1, 0)),
        "mirrored x": ((-1, 0), (0, 1)),
        "mirrored y": ((1, 0), (0, -1)),
        "transposed": ((0, 1), (1, 0)),
        "antitransposed": ((0, -1), (-1, 0)),
    }.items()
}


def orientation(name: str) -> Orientation:
    """The orientation of this name.

    Raises
    ------
    ParameterError : no orientation of this name.

    Examples
    --------
    >>> orientation("quarter turn").place(1.0, 0.0)
    (0.0, 1.0)
    """
    if name not in ORIENTATIONS:
        raise ParameterError(
            f"a camera is mounted in one of eight ways: {', '.join(ORIENTATIONS)}",
            got=f"camera: orientation = {name!r}",
            fix='orientation="upright"',
        )
    return ORIENTATIONS[name]
