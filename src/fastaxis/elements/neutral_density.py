"""The neutral-density filter."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, ScalarLaw
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["NeutralDensity"]


@dataclass(frozen=True, kw_only=True)
class NeutralDensity(ThroughElement):
    """Grey filter: passes the share T = 10^-density of the power, whatever the polarization.

    Parameters
    ----------
    density : optical density D, zero or more. Give this or ``transmission``.
    transmission : T [0 .. 1].

    Raises
    ------
    ParameterError : both or neither given; a negative density; a transmission above 1.

    Examples
    --------
    >>> NeutralDensity(density=2).share
    0.01
    """

    density: Scalar | None = None
    transmission: Scalar | None = None

    stem: ClassVar[str] = "filter"

    def __post_init__(self) -> None:
        if (self.density is None) == (self.transmission is None):
            raise ParameterError(
                "a grey filter is given once, as density= or as transmission=",
                got=f"{self.label}: density = {self.density}, transmission = {self.transmission}",
                fix="density=2.0",
            )
        if self.transmission is not None:
            self._keep(
                transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.01")
            )
            return
        density = checks.number(self.label, "density", self.density, fix="density=2.0")
        if not is_symbolic(density) and density < 0:
            raise ParameterError(
                "an optical density below zero would be gain",
                got=f"{self.label}: density = {density:g}",
                fix=f"density={-density:g}",
            )
        self._keep(density=density)

    @property
    def share(self) -> Scalar:
        """Share of the power that passes."""
        return 10 ** (-self.density) if self.transmission is None else self.transmission  # type: ignore[operator]  # one is given

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        return (ScalarLaw(Amplitude(self.share)),)
