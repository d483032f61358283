"""Polarization ellipses as curves, in the order in which the field runs through them."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

__all__ = ["FLAT", "TURN", "Glyphs"]

FLAT = 2.0  # [deg] of ellipticity; flatter ellipses are drawn as lines and have no sense
TURN = np.linspace(0, 1, 41)  # [periods] at which a curve is drawn
ARROW_AT = 0.14  # part of a turn after the long axis: on the flank, where the curve is smooth for every shape


@dataclass(frozen=True)
class Glyphs:
    """Ellipses at places of the plane.

    Parameters
    ----------
    x, y : places (n,), in the unit of the picture.
    azimuth : of the long axis (n,) [rad].
    ellipticity : (n,) [rad]; positive turns clockwise in the picture.
    size : long half-axis (n,).
    """

    x: NDArray[Any]
    y: NDArray[Any]
    azimuth: NDArray[Any]
    ellipticity: NDArray[Any]
    size: NDArray[Any]

    def curve(self, turn: NDArray[Any]) -> NDArray[Any]:
        """Points of each ellipse (n, len(turn), 2), in the order in which the field runs through them.

        ``turn`` is the time in periods; with exp(-i w t) the field is R(azimuth) (cos wt, -tan(ellipticity) sin wt).
        """
        phase = 2 * np.pi * turn[None, :]
        along = self.size[:, None] * np.cos(phase)
        across = -self.size[:, None] * np.tan(self.ellipticity)[:, None] * np.sin(phase)
        cosine, sine = np.cos(self.azimuth)[:, None], np.sin(self.azimuth)[:, None]
        points = np.stack([cosine * along - sine * across, sine * along + cosine * across], axis=-1)
        return np.asarray(points + np.stack([self.x, self.y], axis=-1)[:, None, :])

    def arrow_heads(self, length: float) -> NDArray[Any]:
        """Triangles (n, 3, 2) that sit on the curves and point the way the field runs."""
        tip, tail = np.moveaxis(self.curve(np.array([ARROW_AT + 0.004, ARROW_AT])), 1, 0)
        ahead = tip - tail
        ahead = ahead / np.hypot(*ahead.T)[:, None] * length
        side = np.stack([-ahead[:, 1], ahead[:, 0]], axis=-1) * 0.45
        return np.stack([tail + 0.6 * ahead, tail - 0.4 * ahead + side, tail - 0.4 * ahead - side], axis=1)

    def of(self, chosen: NDArray[np.bool_]) -> Glyphs:
        return Glyphs(*(getattr(self, name)[chosen] for name in self.__dataclass_fields__))
