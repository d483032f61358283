"""What every engine hands back: light in a plane."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

import numpy as np
from numpy.typing import NDArray

from fastaxis.light import Raster

__all__ = ["CLEAN", "Guard", "PlaneField"]


@dataclass(frozen=True)
class Guard:
    """How well samples carried the light; all zero is best.

    Parameters
    ----------
    edge_power : largest share of the power met in the outermost 1/16 of the window's half side, at any plane.
    phase_step : phase step [rad] between neighbouring samples that all but 1 % of the light stays below; near pi
        the samples no longer tell which way the phase turns.
    discarded : share of the power that is in no frame: removed by band limits on the way, or scattered by edges to
        steeper angles than the samples hold (which powers include).
    """

    edge_power: float = 0.0
    phase_step: float = 0.0
    discarded: float = 0.0


CLEAN = Guard()


class PlaneField(Protocol):
    """Coherent light in the plane of a target, in the frame of the beam there."""

    @property
    def wavelength(self) -> float:
        """Vacuum wavelength [m]."""

    @property
    def power(self) -> float:
        """Total power [W]."""

    @property
    def total_stokes(self) -> NDArray[np.float64]:
        """S0 .. S3 of all the light [W], shape (4,); S0 is the power."""

    @property
    def guard(self) -> Guard:
        """How well samples carried the light."""

    def stokes_on(self, raster: Raster) -> NDArray[np.float64]:
        """Watts per pixel of S0 .. S3, integrated over each pixel, shape (4, ny, nx)."""

    def at(self, x: NDArray[np.float64], y: NDArray[np.float64]) -> NDArray[np.complex128]:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx)."""
