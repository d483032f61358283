"""Laws in coordinates: what of a law is fixed, and the few complex numbers that its matrix is linear in."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.laws import Amplitude, AxisLaw, CircularLaw, Law, ScalarLaw
from fastaxis.maths import NUMBERS, Pattern, Value

__all__ = ["coordinates"]

Complexes = NDArray[np.complex128]


@dataclass(frozen=True, eq=False)
class _Itself:
    """Equal only where it holds the very same object: arrays and functions are not compared by what they give."""

    value: Any

    def __eq__(self, other: object) -> bool:
        return isinstance(other, _Itself) and self.value is other.value

    def __hash__(self) -> int:
        return id(self.value)


def coordinates(law: Law) -> tuple[Any, Complexes]:
    """(frame, vector): within laws of one frame, the matrix is at each place linear in the vector.

    An axis law with uniform amplitudes is a + b (cos 2alpha C + sin 2alpha S), where C and S hold the turning of the
    axis over the plate: linear in (a, b cos 2alpha, b sin 2alpha). Where the amplitudes vary, each counts for
    itself; a phase that is shifted everywhere by the same angle is a factor. A circular law is linear in its
    two amplitudes, a scalar law in its one. All else (places, charges, focal lengths, distances, what a pattern looks
    like) belongs to the frame.

    Parameters
    ----------
    law : with numbers, no letters.

    Examples
    --------
    >>> frame, vector = coordinates(AxisLaw(Amplitude(1.0), Amplitude(0.0), angle=0.0, order=0.5))
    >>> frame == coordinates(AxisLaw(angle=0.3, order=0.5))[0]
    True
    >>> [complex(number).real for number in vector]
    [0.5, 0.5, 0.0]
    """
    if isinstance(law, AxisLaw):
        return _of_axis(law)
    if isinstance(law, CircularLaw):
        return ("circular",), np.array([law.left.number(), law.right.number()])
    if isinstance(law, ScalarLaw):
        frame, number = _of_amplitude(law.transmission)
        return ("scalar", frame, law.charge, law.vergence, law.tilt, law.stop, law.centre), np.array([number])
    return law, np.ones(1, dtype=complex)


def _of_axis(law: AxisLaw) -> tuple[Any, Complexes]:
    place, angle = _shifted(law.angle)
    turned = np.array([1, NUMBERS.cos(2 * angle), NUMBERS.sin(2 * angle)])
    where = (place, law.order, law.centre)
    if law.along.uniform and law.across.uniform:
        mean, difference = law.mean_and_difference(NUMBERS)
        return ("axis", *where), np.array([mean, difference, difference]) * turned
    (along, first), (across, second) = _of_amplitude(law.along), _of_amplitude(law.across)
    return ("patterned axis", along, across, *where), np.concatenate([first * turned, second * turned])


def _of_amplitude(amplitude: Amplitude) -> tuple[Any, complex]:
    """Phases add, so a shift of a phase pattern comes out as a factor; a shift of a power pattern does not."""
    place, phase = _shifted(amplitude.phase)
    power: Any = amplitude.power
    if isinstance(power, Pattern):
        return (place, *_shifted(power)), complex(NUMBERS.phasor(phase))
    return (place,), complex(Amplitude(power, phase).value(NUMBERS))


def _shifted(value: Value) -> tuple[Any, float]:
    """A pattern as what varies and a shift; a plain number is all shift."""
    if not isinstance(value, Pattern):
        return None, float(value)
    return (_Itself(value.source), value.pixel, value.scale, value.flip_x, value.flip_y), value.shift
