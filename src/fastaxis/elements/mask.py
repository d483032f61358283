"""The mask: a phase and a grey transmission that vary over the plate, the same for both polarizations."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, ScalarLaw
from fastaxis.maths import Scalar

__all__ = ["Mask"]


@dataclass(frozen=True, kw_only=True)
class Mask(ThroughElement):
    """Multiplies the field by sqrt(transmission(x, y)) exp(i phase(x, y)); polarization is kept.

    Parameters
    ----------
    phase : [rad], positive for more optical path: a number, a function ``f(x, y)`` of arrays [m] in the mask's own
        frame, or a (ny, nx) array of cells, rows along +y.
    transmission : share of the power that passes [0 .. 1], likewise.
    pixel : side of a cell [m], for arrays.
    centre : (x, y) of the mask's own origin [m].

    Raises
    ------
    ParameterError : a share below 0 or above 1; an array without ``pixel``; a function that does not work on arrays.

    Notes
    -----
    Thin plate, cells much larger than the wavelength.

    Examples
    --------
    >>> Mask(phase=lambda x, y: 1e6 * (x**2 - y**2), name="saddle").laws(532e-9)[0].uniform
    False
    """

    phase: Any = 0.0
    transmission: Any = 1.0
    pixel: float | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    stem: ClassVar[str] = "mask"

    def __post_init__(self) -> None:
        phase = checks.pattern(self.label, "phase", self.phase, self.pixel, fix="phase=45*deg")
        share = checks.pattern(self.label, "transmission", self.transmission, self.pixel, fix="transmission=0.5")
        self._keep(
            phase=checks.angle(self.label, "phase", phase, patterned=True),
            transmission=checks.fraction(self.label, "transmission", share, fix="transmission=0.5", patterned=True),
            centre=checks.centre(self.label, self.centre),
        )

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        return (ScalarLaw(Amplitude(self.transmission, self.phase), centre=self.centre),)
