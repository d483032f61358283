"""How far a part must be turned in its mount to stand as declared."""

from __future__ import annotations

import math
from dataclasses import dataclass

from fastaxis.elements.apertures import KnifeEdge, Slit
from fastaxis.elements.base import Element
from fastaxis.elements.phase_modulator import PhaseModulator
from fastaxis.elements.polarizer import Polarizer
from fastaxis.elements.q_plate import QPlate
from fastaxis.elements.retarder import Retarder

__all__ = ["Turn", "turn_of"]


@dataclass(frozen=True)
class Turn:
    """A part's place in its mount.

    Parameters
    ----------
    parameter : the declared angle it follows from.
    declared : that angle [rad].
    angle : of the part as a whole [rad], counter-clockwise facing the source, 0 where the parameter is 0.
    period : turn [rad] after which the part is the same again.
    """

    parameter: str
    declared: float
    angle: float
    period: float


def turn_of(element: Element) -> Turn | None:
    """The turn of a part that does something when it is turned in its mount; None for all others.

    A q-plate turned by g carries both its pattern and its axes along: the axis q (phi - g) + offset + g, so its offset
    grows by (1 - q) g. With q = 1 turning does nothing.
    """
    if isinstance(element, Retarder):
        parameter = "fast" if element.slow is None else "slow"
        return _plain(parameter, float(getattr(element, parameter)), math.pi)
    if isinstance(element, Polarizer) or (isinstance(element, PhaseModulator) and element.uniform):
        return _plain("axis", float(element.axis), math.pi)
    if isinstance(element, QPlate) and element.q != 1:
        gearing = 1 - float(element.q)
        offset = float(element.offset)
        return Turn("offset", offset, offset / gearing, min(math.pi / abs(gearing), 2 * math.pi))
    if isinstance(element, Slit | KnifeEdge):
        return _plain("angle", float(element.angle), math.pi if isinstance(element, Slit) else 2 * math.pi)
    return None


def _plain(parameter: str, angle: float, period: float) -> Turn:
    return Turn(parameter, angle, angle, period)
