"""The angle of a wave plate that sends light into the polarization a part expects."""

from __future__ import annotations

import math
from collections.abc import Iterable
from typing import Any

import numpy as np

from fastaxis.elements.base import Element
from fastaxis.elements.retarder import HalfWavePlate, QuarterWavePlate, Retarder
from fastaxis.inspect.bench import Visit
from fastaxis.inspect.strands import Strand, through, total
from fastaxis.light import State
from fastaxis.plan.binding import bound

__all__ = ["new_plate", "share_in", "turned_plate"]

ENOUGH = 0.97  # share in the state expected: linear light 10 degrees off
SAMPLES = 16  # angles in half a turn: powers behind a plate hold harmonics of up to four times its angle
FINE = 3600  # angles looked at: steps of 0.05 degrees


def share_in(state: State, strands: Iterable[Strand]) -> float:
    """Share of some light that is in a state, (1 + s . e)/2; 0 in the dark."""
    stokes = total(tuple(strands))
    return float(stokes @ state.stokes / (2 * stokes[0])) if stokes[0] > 0 else 0.0


def turned_plate(visit: Visit, expected: State) -> tuple[str, str, float] | None:
    """(part, parameter, angle) of the last plate before a visit that, turned so, sends the light into a state.

    None where no plate comes before, or where turning it does not do.
    """
    between: list[Visit] = []
    before = visit.previous
    while before is not None and not isinstance(before.element, Retarder):
        between.append(before)
        before = before.previous
    if before is None:
        return None
    plate = before.element
    parameter = "fast" if plate.slow is None else "slow"
    declared = float(getattr(plate, parameter))
    later = tuple(reversed(between))

    def behind(angle: float) -> tuple[Strand, ...]:
        strands = _past(before.before, plate.changed(**{parameter: angle}), before.entered, before.left)
        for one in later:
            strands = _past(strands, one.element, one.entered, one.left)
        return strands

    angle = _best(behind, expected, declared)
    return None if angle is None else (before.name, parameter, angle)


def new_plate(visit: Visit, expected: State) -> tuple[type[Retarder], float] | None:
    """(kind, fast axis) of a half- or quarter-wave plate that, put before a part, sends the light into a state."""
    for kind in (HalfWavePlate, QuarterWavePlate):
        angle = _best(lambda fast, kind=kind: _past(visit.before, kind(fast=fast), "front", "back"), expected, 0.0)
        if angle is not None:
            return kind, angle
    return None


def _past(strands: tuple[Strand, ...], element: Element, entered: str, left: str) -> tuple[Strand, ...]:
    after = []
    for strand in strands:
        for law in element.passages(strand.wavelength)[entered, left].steps():
            strand = through(strand, bound(law))  # noqa: PLW2901  # one law after the other
        after.append(strand)
    return tuple(after)


def _best(behind: Any, expected: State, near: float) -> float | None:
    """The angle [rad], of those that do, nearest to a declared one; None where none does.

    The power in a state behind a plate is a sum of harmonics of twice its angle, so that a few samples give all of it.
    """
    angles = math.pi * np.arange(SAMPLES) / SAMPLES
    powers = [float(total(behind(float(angle))) @ expected.stokes) / 2 for angle in angles]
    fine = math.pi * np.arange(FINE) / FINE
    curve = np.fft.irfft(np.fft.rfft(powers), FINE) * FINE / SAMPLES
    peaks = fine[(curve >= np.roll(curve, 1)) & (curve >= np.roll(curve, -1)) & (curve >= curve.max() * (1 - 1e-6))]
    offers = [near + (angle - near + math.pi / 2) % math.pi - math.pi / 2 for angle in peaks]
    best = min(offers, key=lambda angle: abs(angle - near))
    return best if share_in(expected, behind(best)) >= ENOUGH else None
