"""Light moved and tilted as a whole."""

from __future__ import annotations

from dataclasses import dataclass, replace

from fastaxis.laws import TravelLaw

__all__ = ["Displacement"]

Pair = tuple[float, float]


@dataclass(frozen=True)
class Displacement:
    """E(r) becomes exp(i k tilt.(r - offset/2)) E(r - offset) exp(i k path).

    The middle of the light goes where a ray would go. With the phase counted from half the offset, light that is
    displaced and then travels is light that travels and is then displaced by what the ray has become, without a phase
    of its own: R. G. Littlejohn, Phys. Rep. 138, 193 (1986), section 3, for the operators of Heisenberg and Weyl.

    Parameters
    ----------
    offset : (x, y) [m].
    tilt : (x, y) [rad].
    path : optical path added [m].
    """

    offset: Pair = (0.0, 0.0)
    tilt: Pair = (0.0, 0.0)
    path: float = 0.0

    uniform = False
    values = ()

    @classmethod
    def wedge(cls, tilt: Pair, centre: Pair) -> Displacement:
        """exp(i k tilt.(r - centre))."""
        return cls(tilt=tilt, path=-_dot(tilt, centre))

    def through(self, travel: TravelLaw) -> Displacement:
        """What it is behind a section, if it was in front of it."""
        a, b, c, d = (float(value) for value in (travel.a, travel.b, travel.c, travel.d))
        (x, y), (tx, ty) = self.offset, self.tilt
        return replace(self, offset=(a * x + b * tx, a * y + b * ty), tilt=(c * x + d * tx, c * y + d * ty))

    def reversed(self, axis: str) -> Displacement:
        """The same, seen with x (or y) reversed."""
        (x, y), (tx, ty) = self.offset, self.tilt
        if axis == "x":
            return replace(self, offset=(-x, y), tilt=(-tx, ty))
        return replace(self, offset=(x, -y), tilt=(tx, -ty))

    def then(self, later: Displacement) -> Displacement:
        """This displacement followed by a later one, as one."""
        (x, y), (tx, ty), (more_x, more_y), (turn_x, turn_y) = self.offset, self.tilt, later.offset, later.tilt
        path = (_dot(later.tilt, self.offset) - _dot(self.tilt, later.offset)) / 2
        return Displacement((x + more_x, y + more_y), (tx + turn_x, ty + turn_y), self.path + later.path + path)


def _dot(one: Pair, other: Pair) -> float:
    return one[0] * other[0] + one[1] * other[1]
