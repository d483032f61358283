"""The few kinds of law: plain data that says what a part does to light, evaluated by the engines."""

from fastaxis.laws.amplitude import UNIT, Amplitude, at
from fastaxis.laws.axis import AxisLaw
from fastaxis.laws.circular import CircularLaw
from fastaxis.laws.passage import Flip, Law, Passage, Turn
from fastaxis.laws.scalar import ScalarLaw
from fastaxis.laws.stops import Annulus, Disc, HalfPlane, Rectangle, Stop, Strip
from fastaxis.laws.travel import TravelLaw

__all__ = [
    "UNIT", "Amplitude", "Annulus", "AxisLaw", "CircularLaw", "Disc", "Flip", "HalfPlane", "Law",
    "Passage", "Rectangle", "ScalarLaw", "Stop", "Strip", "TravelLaw", "Turn", "at",
]  # fmt: skip
