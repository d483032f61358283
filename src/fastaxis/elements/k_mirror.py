"""The K-mirror: three mirrors that reverse the picture and let the beam go on straight."""

from __future__ import annotations

from dataclasses import dataclass
from math import degrees, pi
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.elements.reversing import mirror_image
from fastaxis.elements.surfaces import Surface, amplitude, incidence_angle, metal_index
from fastaxis.errors import ParameterError
from fastaxis.laws import UNIT, Amplitude, Law
from fastaxis.maths import Scalar

__all__ = ["KMirror"]


@dataclass(frozen=True, kw_only=True)
class KMirror(ThroughElement):
    """Three reflections in one plane: the picture becomes its mirror image in the line at ``roll``.

    Rolled by a it turns the picture by 2a, as a Dove prism does, and also for converging light. J = R(roll)
    diag(rs rs' rs, rp rp' rp) R(-roll); for ideal mirrors diag(-1, 1), a half-wave plate at ``roll``.

    Parameters
    ----------
    index : n + ik of bare metal mirrors; None for ideal ones.
    incidence : on the first and last mirror [rad], above 45 deg; the one between is met at 2 incidence - 90 deg.
    roll : where the middle mirror lies across the beam [rad], counter-clockwise from x; at 0 the picture is turned
        upside down (y -> -y). Number or symbol.

    Raises
    ------
    ParameterError : an incidence for which the beam does not come back to its line.
    SymbolError : a letter for the index or the incidence.

    Notes
    -----
    Its path is not counted: put it into the spaces beside it.

    Examples
    --------
    >>> KMirror().laws(633e-9)[1]
    Flip(axis='y')
    """

    index: complex | None = None
    incidence: float = pi / 3
    roll: Scalar = 0.0

    stem: ClassVar[str] = "kmirror"

    def __post_init__(self) -> None:
        if self.index is not None:
            self._keep(index=metal_index(self.label, "index", self.index))
        self._keep(
            incidence=incidence_angle(self.label, "incidence", self.incidence),
            roll=checks.angle(self.label, "roll", self.roll),
        )
        if self.incidence <= pi / 4:
            raise ParameterError(
                "the first mirror of a K-mirror is met at more than 45 deg, or the beam never meets the third",
                got=f"{self.label}: incidence = {degrees(self.incidence):.4g} deg",
                fix="incidence=60*deg",
            )

    def laws(self, wavelength: Scalar) -> tuple[Law, ...]:
        if self.index is None:
            return mirror_image(UNIT, Amplitude(phase=pi), self.roll)
        outer, middle = (
            Surface(behind=self.index, incidence=angle) for angle in (self.incidence, 2 * self.incidence - pi / 2)
        )
        p, s = amplitude(outer.rp**2 * middle.rp), amplitude(outer.rs**2 * middle.rs)
        return mirror_image(p, s, self.roll)
