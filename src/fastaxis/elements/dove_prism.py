"""The Dove prism: a glass prism that reverses the picture and lets the beam go on straight."""

from __future__ import annotations

from dataclasses import dataclass
from math import degrees, pi
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.elements.reversing import mirror_image
from fastaxis.elements.surfaces import Surface, amplitude, glass_index, incidence_angle
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, Law
from fastaxis.maths import Scalar

__all__ = ["DovePrism"]


@dataclass(frozen=True, kw_only=True)
class DovePrism(ThroughElement):
    """Two refractions and a total reflection on the base: the picture becomes its mirror image in the line at ``roll``.

    A prism rolled by a turns the picture by 2a, and the charge l becomes -l with exp(-2 i l a) more phase. The light is
    not spared: J = R(roll) diag(rs ts ts', rp tp tp') R(-roll), so a rolled prism also changes the polarization.

    Parameters
    ----------
    index : of the glass, above 1.
    base : angle between the base and the slanted end faces [rad], above 0 and below a right angle; usually 45 deg.
    roll : where the base lies across the beam [rad], counter-clockwise from x; at 0 the picture is turned upside
        down (y -> -y). Number or symbol.
    coated : whether the end faces reflect nothing; bare ones pass less s than p.

    Raises
    ------
    ParameterError : glass and angle for which the base does not reflect totally.
    SymbolError : a letter for the index or the base angle.

    Notes
    -----
    For collimated light: converging light gets astigmatism from the slanted faces, and the path in the glass is left
    out. Padgett and Lesso, J. Mod. Opt. 46, 175 (1999), on its polarization; J. Leach et al., Phys. Rev. Lett. 88,
    257901 (2002), on sorting charges with two of them.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> [type(law).__name__ for law in DovePrism(index=1.515, roll=22.5*deg).laws(633e-9)]
    ['AxisLaw', 'Flip', 'Turn']
    """

    index: float
    base: float = pi / 4
    roll: Scalar = 0.0
    coated: bool = False

    stem: ClassVar[str] = "dove"

    def __post_init__(self) -> None:
        self._keep(
            index=glass_index(self.label, "index", self.index),
            base=incidence_angle(self.label, "base", self.base),
            roll=checks.angle(self.label, "roll", self.roll),
        )
        if self.base == 0 or not self.bottom.total:
            raise ParameterError(
                "the base of a Dove prism must be met beyond the critical angle",
                got=f"{self.label}: index = {self.index:g}, base = {degrees(self.base):.4g} deg",
                fix="index=1.515, base=45*deg",
            )

    @property
    def end(self) -> Surface:
        """The face where the light enters; it leaves by its mirror image."""
        return Surface(behind=self.index, incidence=pi / 2 - self.base)

    @property
    def bottom(self) -> Surface:
        """The base, met from inside."""
        lean = self.end.incidence - self.end.refraction  # of the light to the base
        return Surface(before=self.index, behind=1.0, incidence=pi / 2 - lean)

    def laws(self, wavelength: Scalar) -> tuple[Law, ...]:
        passed_p, passed_s = (1.0, 1.0) if self.coated else (self.end.Tp**2, self.end.Ts**2)
        p, s = (amplitude(r).phase for r in (self.bottom.rp, self.bottom.rs))
        return mirror_image(Amplitude(passed_p, p), Amplitude(passed_s, s), self.roll)
