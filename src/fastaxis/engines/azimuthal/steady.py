"""Beams in a cavity whose parts shape the light: one field goes round until what is left of it no longer counts."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache
from itertools import count

import numpy as np

from fastaxis.engines.azimuthal.circulating import circulation
from fastaxis.engines.azimuthal.harmonics import Harmonics
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.errors import SamplingError
from fastaxis.plan.cavity import LEFT_OVER, MOST_TRIPS, RoundTrip
from fastaxis.plan.network import carrier_turns

__all__ = ["Steady", "steady"]

SETTLING = 8  # trips after which the loss of the last one tells that of the next
SETTLED = 256  # and after which it tells whether there is an end, where stops may still take more from trip to trip
ROUNDINGS = 1e-9  # of a trip of some ten parts, whose own error is 1e-12 of the peak


@dataclass(frozen=True, eq=False)
class Steady:
    """What circulates when nothing changes any more.

    Parameters
    ----------
    light : the field at the place that all trips pass, trips added up.
    trips : how many were followed.
    left : amplitude kept on the last of them.
    error : amplitude of all trips not followed, as a share of the sum.
    """

    light: Harmonics
    trips: int
    left: float
    error: float


@lru_cache(maxsize=4)
def steady(trip: RoundTrip, settings: Settings) -> Steady:
    """The sum of all trips, until those not followed are a share of LEFT_OVER of it.

    After n trips of a field that keeps g of its amplitude on each, what is to come adds at most g/(1 - g) times it.
    A. G. Fox and T. Li, Bell Syst. Tech. J. 40, 453 (1961), for light followed round and round.

    Raises
    ------
    SamplingError : it does not fade.
    """
    wavelength = trip.entries[0].wavelength
    first = trip.entries[0].length
    going = circulation([(way, _carrier(way.length - first, wavelength)) for way in trip.entries], settings)
    rounds = [(way.steps, _carrier(way.length, wavelength)) for way in trip.rounds]
    cut = any(getattr(step.law, "stop", None) is not None for way in trip.rounds for step in way.steps)
    before = began = going.amplitudes[0]
    for trips in count(1):
        going.step(rounds)
        now, whole = going.amplitudes
        left = now / before if before else 0.0
        # A mixture of modes fades unevenly, but never by less than what the bench lets pass.
        kept = max(left, trip.left if trips < SETTLING else 0.0)
        to_come = now * kept / (1 - kept) if kept < 1 else math.inf
        if now == 0 or to_come <= LEFT_OVER * max(whole, began):
            return Steady(going.sum, trips, left, to_come / whole if whole else 0.0)
        if trips >= (SETTLED if cut else SETTLING) and _needed(left) > MOST_TRIPS:
            raise _endless(trip, left)
        before = now
    raise AssertionError


def _carrier(length: object, wavelength: float) -> complex:
    return complex(np.exp(2j * np.pi * carrier_turns(length, wavelength)))  # type: ignore[arg-type]  # an exact length


def _needed(left: float) -> float:
    """Trips until what is to come is LEFT_OVER of the sum."""
    return math.ceil(math.log(LEFT_OVER * (1 - left)) / math.log(left)) if left < 1 - ROUNDINGS else math.inf


def _endless(trip: RoundTrip, left: float) -> SamplingError:
    names = list(dict.fromkeys(name for way in trip.rounds for name in way.path.split(" -> ")))
    parts = ", ".join(names)
    needed = _needed(left)
    told = f"takes {needed if needed < math.inf else 'no end of'} trips to fade"
    return SamplingError(
        f"light with a shape is followed round at most {MOST_TRIPS} times",
        got=f"round {parts}: {left:.6g} of the amplitude is left after a trip, which {told}",
        fix=f'fa.NeutralDensity(transmission=0.9, name="loss")  # in the loop, behind {names[0]}',
    )
