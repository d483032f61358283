"""An amplitude transmittance as data: a power transmittance and a phase."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from fastaxis.maths import NUMBERS, Maths, Pattern, Value

__all__ = ["UNIT", "Amplitude", "at"]


def at(value: Value, x: Any, y: Any) -> Any:
    """A value at the places (x, y): patterns are looked up, everything else is the same everywhere."""
    return value(x, y) if isinstance(value, Pattern) else value


@dataclass(frozen=True)
class Amplitude:
    """sqrt(power) * exp(i phase).

    Parameters
    ----------
    power : share of the power that passes [0 .. 1]; number, symbol or Pattern.
    phase : phase gained [rad]; positive for more optical path.
    """

    power: Value = 1.0
    phase: Value = 0.0

    def value(self, maths: Maths, x: Any = 0.0, y: Any = 0.0) -> Any:
        """The complex amplitude in a maths namespace, at the places (x, y) [m]."""
        phasor = maths.phasor(at(self.phase, x, y))
        if isinstance(self.power, int | float) and self.power == 1:
            return phasor
        return maths.root(at(self.power, x, y)) * phasor

    @property
    def uniform(self) -> bool:
        """Whether it is the same everywhere in the plane."""
        return not isinstance(self.power, Pattern) and not isinstance(self.phase, Pattern)

    @property
    def values(self) -> tuple[Value, ...]:
        return (self.power, self.phase)

    def mirrored(self, axis: str = "x") -> Amplitude:
        """Met with x (or y) reversed; matters only for patterns."""
        if self.uniform:
            return self
        power, phase = (v.mirrored(axis) if isinstance(v, Pattern) else v for v in self.values)
        return Amplitude(power, phase)

    def times(self, other: Amplitude) -> Amplitude:
        """The product of two uniform amplitudes."""
        return Amplitude(self.power * other.power, self.phase + other.phase)

    def number(self) -> complex:
        """The numeric value of a uniform amplitude."""
        return complex(self.value(NUMBERS))


UNIT = Amplitude()
