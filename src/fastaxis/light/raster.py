"""A raster of square pixels in a plane: where a camera or a grid looks."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["Raster"]


@dataclass(frozen=True)
class Raster:
    """Square pixels, rows along +y and columns along +x, symmetric about ``centre``.

    Parameters
    ----------
    pitch : side of a pixel [m].
    shape : (ny, nx).
    centre : (x, y) of the middle of the raster [m].
    """

    pitch: float
    shape: tuple[int, int]
    centre: tuple[float, float] = (0.0, 0.0)

    @property
    def x(self) -> NDArray[np.float64]:
        """Pixel centres along x [m], shape (nx,)."""
        return self._axis(self.shape[1], self.centre[0])

    @property
    def y(self) -> NDArray[np.float64]:
        """Pixel centres along y [m], shape (ny,)."""
        return self._axis(self.shape[0], self.centre[1])

    def _axis(self, count: int, middle: float) -> NDArray[Any]:
        return (np.arange(count) - (count - 1) / 2) * self.pitch + middle
