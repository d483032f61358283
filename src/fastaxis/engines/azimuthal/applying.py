"""What each kind of law does to the harmonics."""

from __future__ import annotations

from dataclasses import replace
from functools import singledispatch
from typing import Any

import numpy as np

from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.engines.azimuthal.travelling import arrived
from fastaxis.laws import Annulus, AxisLaw, CircularLaw, Disc, Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.maths import NUMBERS
from fastaxis.plan import JonesStep

__all__ = ["apply"]

# (E_L, E_R) = TO_CIRCULAR (Ex, Ey), with L = (1, i)/sqrt2 and R = (1, -i)/sqrt2.
TO_CIRCULAR = np.array([[1, -1j], [1, 1j]]) / np.sqrt(2)


# ruff: noqa: ARG001 - every law is given the settings, though only some need them to arrive in their plane
@singledispatch
def apply(law: Any, field: Harmonics, settings: Settings) -> Harmonics:
    """The field behind a law."""
    raise NotImplementedError(type(law).__name__)


@apply.register
def _(law: TravelLaw, field: Harmonics, settings: Settings) -> Harmonics:
    return field.through(law)


@apply.register
def _(law: Flip, field: Harmonics, settings: Settings) -> Harmonics:
    return field.flipped(law.axis)


@apply.register
def _(law: Turn, field: Harmonics, settings: Settings) -> Harmonics:
    return field.turned(law.angle)


@apply.register
def _(law: AxisLaw, field: Harmonics, settings: Settings) -> Harmonics:
    """L feeds R at l + 2q, R feeds L at l - 2q; only a plate that varies needs the light in its plane."""
    twist = round(2 * law.order)
    if twist:
        field = arrived(field, settings)
    (a, left_from_right), (right_from_left, _) = law.circular(NUMBERS)
    return field.linked(
        [(LEFT, LEFT, 0, a), (RIGHT, RIGHT, 0, a), (LEFT, RIGHT, twist, right_from_left),
         (RIGHT, LEFT, -twist, left_from_right)]
    )  # fmt: skip


@apply.register
def _(law: CircularLaw, field: Harmonics, settings: Settings) -> Harmonics:
    (left, _), (_, right) = law.circular(NUMBERS)
    return field.linked([(LEFT, LEFT, 0, left), (RIGHT, RIGHT, 0, right)])


@apply.register
def _(law: JonesStep, field: Harmonics, settings: Settings) -> Harmonics:
    matrix = TO_CIRCULAR @ np.array(law.matrix) @ TO_CIRCULAR.conj().T
    # The change of basis leaves a rounding where a half-wave plate has an exact zero: a harmonic that is not there.
    matrix[abs(matrix) < 4 * np.finfo(float).eps * abs(matrix).max()] = 0
    return field.linked(
        (hand, other, 0, complex(matrix[other, hand])) for hand in (LEFT, RIGHT) for other in (LEFT, RIGHT)
    )


@apply.register
def _(law: ScalarLaw, field: Harmonics, settings: Settings) -> Harmonics:
    """Its stop first, which may spare panels; then charge and amplitude; its lens waits with the next travel."""
    if law.stop is not None:
        field = _stopped(law.stop, field, settings)
    elif law.charge:
        field = arrived(field, settings)
    amplitude, turns = law.transmission.number(), round(law.charge)
    if amplitude != 1 or turns:
        field = field.linked([(LEFT, LEFT, turns, amplitude), (RIGHT, RIGHT, turns, amplitude)])
    return field.through(TravelLaw.lens(law.vergence)) if law.vergence else field


def _stopped(stop: Any, field: Harmonics, settings: Settings) -> Harmonics:
    """Panels end exactly at a rim, so a hard edge costs no accuracy."""
    if isinstance(stop, Annulus):
        return _unheld(arrived(field, settings, start=stop.inner, end=stop.outer))
    if isinstance(stop, Disc) and stop.opaque:
        return arrived(field, settings, start=stop.radius)
    return _unheld(arrived(field, settings, end=stop.radius))


def _unheld(field: Harmonics) -> Harmonics:
    """Nothing is left outside a hole."""
    return replace(field, beyond=(0.0, 0.0))
