"""A bare glass plate across the beam that picks off a few percent."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi
from typing import ClassVar

from fastaxis.elements.base import Element, Passages
from fastaxis.elements.folding import check_fold, reflection
from fastaxis.elements.surfaces import Surface, amplitude, glass_index, incidence_angle
from fastaxis.laws import Amplitude, AxisLaw, Passage
from fastaxis.maths import Scalar

__all__ = ["PickOff"]

NONE = 1e-20  # at Brewster's angle the rounding of the angle leaves about this much


@dataclass(frozen=True, kw_only=True)
class PickOff(Element):
    """An uncoated plate: reflects diag(rp, rs) of its first surface, transmits both surfaces' diag(Tp, Ts).

    Faces: light at "front" leaves by "reflected" and "transmitted". At Brewster's angle, atan(index), no p is
    reflected: the picked-off beam is s alone, and a stack of plates polarizes what it transmits.

    Parameters
    ----------
    index : of the glass, 1 or more.
    incidence : angle between beam and normal [rad], 0 up to a right angle.
    fold : "horizontal" or "vertical" plane of incidence.

    Raises
    ------
    ParameterError : an index below 1, or an incidence of a right angle or more.
    SymbolError : a letter for the index or the incidence.

    Notes
    -----
    The first reflection and the straight transmission are followed. Light that met the second surface from inside
    (``ghosts``) leaves beside them and is left out; so is the sideways shift of the transmitted beam.
    E. Hecht, Optics, 4th ed. (2002), section 4.6.

    Examples
    --------
    >>> from math import atan
    >>> plate = PickOff(index=1.5, incidence=atan(1.5))
    >>> law, = plate.passages(532e-9)["front", "reflected"].laws
    >>> round(law.along.power, 12), round(law.across.power, 6)
    (0.0, 0.147929)
    """

    index: float
    incidence: Scalar = pi / 4
    fold: str = "horizontal"

    stem: ClassVar[str] = "pickoff"
    faces: ClassVar[tuple[str, ...]] = ("front", "transmitted", "reflected")
    entry: ClassVar[str | None] = "front"
    exit: ClassVar[str | None] = "transmitted"

    def __post_init__(self) -> None:
        check_fold(self.label, self.fold)
        self._keep(
            index=glass_index(self.label, "index", self.index),
            incidence=incidence_angle(self.label, "incidence", self.incidence),
        )

    @property
    def surface(self) -> Surface:
        """The first surface. The second, met from inside, reflects and passes the same shares."""
        return Surface(behind=self.index, incidence=self.incidence)

    @property
    def ghosts(self) -> tuple[tuple[str, float, str], ...]:
        """(which light, share of its power, where it goes) of what met the second surface from inside."""
        shares = (("p", self.surface.Rp), ("s", self.surface.Rs))
        return tuple((what, R * (1 - R) if R > NONE else 0.0, "leaves beside the two beams") for what, R in shares)

    def forward(self, wavelength: Scalar) -> Passages:
        surface = self.surface
        p, s = Amplitude((1 - surface.Rp) ** 2), Amplitude((1 - surface.Rs) ** 2)
        through = AxisLaw(p, s) if self.fold == "horizontal" else AxisLaw(s, p)
        return {
            ("front", "transmitted"): Passage((through,)),
            ("front", "reflected"): reflection(self.fold, amplitude(surface.rp), amplitude(surface.rs)),
        }
