"""A named phase in one arm of an interferometer."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, ScalarLaw
from fastaxis.maths import Scalar

__all__ = ["PhaseShift"]


@dataclass(frozen=True, kw_only=True)
class PhaseShift(ThroughElement):
    """Delays the whole beam: both components are multiplied by exp(i phase).

    Parameters
    ----------
    phase : [rad], positive for more optical path.

    Raises
    ------
    ParameterError : a bare angle in degrees.

    Notes
    -----
    The phase between two paths is set by this part or by an explicit length, never by a rounding of k times a length.

    Examples
    --------
    >>> from fastaxis.units import waves
    >>> PhaseShift(phase=0.5*waves).laws(532e-9)[0].transmission.number()
    (-1+0j)
    """

    phase: Scalar

    stem: ClassVar[str] = "phase"

    def __post_init__(self) -> None:
        self._keep(phase=checks.angle(self.label, "phase", self.phase))

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        return (ScalarLaw(Amplitude(phase=self.phase)),)
