"""A polarizer whose axis varies over the plate: a radial polarizer, a camera's polarizer mosaic."""

from __future__ import annotations

from dataclasses import dataclass
from math import inf
from typing import Any, ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import Scalar

__all__ = ["PatternedPolarizer"]


@dataclass(frozen=True, kw_only=True)
class PatternedPolarizer(ThroughElement):
    """Linear polarizer of which the axis varies from place to place.

    Parameters
    ----------
    axis : angle of the passed component [rad]: a number, a function ``f(x, y)`` of arrays [m] in the plate's own
        frame, or a (ny, nx) array of cells, rows along +y.
    extinction : T1/T2 (> 1), the ratio of the powers passed along and across the axis.
    transmission : T1, the share of the power along the axis that passes [0 .. 1].
    pixel : side of a cell [m], for arrays.
    centre : (x, y) of the plate's own origin [m].

    Raises
    ------
    ParameterError : an array without ``pixel``; a function that does not work on arrays; an extinction of 1 or less.

    Notes
    -----
    Thin plate, cells much larger than the wavelength.

    Examples
    --------
    >>> import numpy as np
    >>> PatternedPolarizer(axis=lambda x, y: np.arctan2(y, x), name="radial").label
    'radial'
    """

    axis: Any
    extinction: Scalar = inf
    transmission: Scalar = 1.0
    pixel: float | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    stem: ClassVar[str] = "polarizer"

    def __post_init__(self) -> None:
        axis = checks.pattern(self.label, "axis", self.axis, self.pixel, fix="axis=30*deg")
        self._keep(
            axis=checks.angle(self.label, "axis", axis, patterned=True),
            extinction=checks.extinction(self.label, self.extinction),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.9"),
            centre=checks.centre(self.label, self.centre),
        )

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        across = self.transmission / self.extinction
        return (AxisLaw(Amplitude(self.transmission), Amplitude(across), self.axis, centre=self.centre),)
