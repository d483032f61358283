"""A retarder of plain glass: Fresnel's rhomb."""

from __future__ import annotations

from dataclasses import dataclass
from math import asin, degrees, tau
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.elements.surfaces import Surface, amplitude, glass_index, incidence_angle
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import Scalar

__all__ = ["Rhomb"]


@dataclass(frozen=True, kw_only=True)
class Rhomb(ThroughElement):
    """Total reflections inside glass retard s behind p: J = diag(rp^m, rs^m) with p along the axis at ``roll``.

    Each reflection adds the retardance d with tan(d/2) = cos(i) sqrt(sin^2(i) - 1/n^2)/sin^2(i); p is the fast
    axis. It hardly depends on the wavelength. m is even, so the picture is not reversed.

    Parameters
    ----------
    index : of the glass, above 1.
    incidence : on the reflecting faces, inside [rad], beyond the critical angle asin(1/index).
    roll : plane of the reflections, which is the fast axis [rad], counter-clockwise from x; number or symbol.
    reflections : 2 for one rhomb, 4 for two in a row.
    coated : whether the end faces reflect nothing; bare ones, met at normal incidence, pass 1 - R each.

    Raises
    ------
    ParameterError : no total reflection; another number of reflections.
    SymbolError : a letter for the index or the incidence.

    Notes
    -----
    For collimated light: the path in the glass and the sideways shift are left out. M. Born and E. Wolf, Principles of
    Optics, 7th ed. (1999), section 1.5.4.

    Examples
    --------
    >>> from math import degrees
    >>> from fastaxis.units import deg
    >>> round(degrees(Rhomb(index=1.51, incidence=54.623105*deg).retardance), 4)
    90.0
    """

    index: float
    incidence: float
    roll: Scalar = 0.0
    reflections: int = 2
    coated: bool = False

    stem: ClassVar[str] = "rhomb"

    def __post_init__(self) -> None:
        self._keep(
            index=glass_index(self.label, "index", self.index),
            incidence=incidence_angle(self.label, "incidence", self.incidence),
            roll=checks.angle(self.label, "roll", self.roll),
        )
        if self.reflections not in (2, 4):
            raise ParameterError(
                "a rhomb has 2 reflections, two in a row have 4: an even number, after which the beam goes on straight",
                got=f"{self.label}: reflections = {self.reflections}",
                fix="reflections=2",
            )
        if not self.surface.total:
            raise ParameterError(
                "only beyond the critical angle asin(1/index) is all light reflected inside",
                got=f"{self.label}: incidence = {degrees(self.incidence):.4g} deg with index = {self.index:g}",
                fix=f"index={max(self.index, 1.5):g}, incidence={self._fitting():.4g}*deg",
            )

    def _fitting(self) -> float:
        """An incidence in degrees between the critical angle and grazing."""
        return (degrees(asin(1 / max(self.index, 1.5))) + 90) / 2

    @property
    def surface(self) -> Surface:
        """A reflecting face, met from inside."""
        return Surface(before=self.index, behind=1.0, incidence=self.incidence)

    @property
    def retardance(self) -> float:
        """By which s lags behind p, all reflections together [rad], 0 .. 2 pi."""
        p, s = (amplitude(r, self.reflections).phase for r in (self.surface.rp, self.surface.rs))
        return float((s - p) % tau)

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        ends = 1.0 if self.coated else (1 - Surface(behind=self.index, incidence=0.0).Rs) ** 2
        p, s = (amplitude(r, self.reflections).phase for r in (self.surface.rp, self.surface.rs))
        return (AxisLaw(Amplitude(ends, p), Amplitude(ends, s), self.roll),)
