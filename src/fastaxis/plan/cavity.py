"""Plans for beams that go round through parts that shape them: the ways in, once round, and out."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable
from dataclasses import dataclass, replace
from fractions import Fraction
from functools import reduce
from itertools import pairwise
from typing import Any

import numpy as np

from fastaxis.laws import TravelLaw
from fastaxis.light import Component, Source
from fastaxis.plan.arms import FAINT, MOST, Strength
from fastaxis.plan.binding import bound, refuse_letters
from fastaxis.plan.closed import closed
from fastaxis.plan.covariant import covariance_reason
from fastaxis.plan.loops import Loops, Walk, Ways, has_hole
from fastaxis.plan.plan import Branch, Plan
from fastaxis.plan.spread import of_beam
from fastaxis.plan.steps import Step, Steps
from fastaxis.train.graph import source_nodes

__all__ = ["LEFT_OVER", "MOST_TRIPS", "RoundTrip", "by_trips"]

LEFT_OVER = 1e-12  # amplitude of all trips not followed, of the sum: what each trip is exact to
MOST_TRIPS = 4096
FEW = 8  # trips that are as soon done by themselves
WIDER = 1.1  # beams that fit stay as wide as they are but for roundings
LOOKED_AT = 16  # trips over which a beam that does not fit is widest

Passes = Callable[[Plan], Plan]


@dataclass(frozen=True)
class RoundTrip:
    """Light at the one place that all its trips pass.

    Parameters
    ----------
    entries : ways from the laser to that place.
    rounds : ways once round.
    left : most of the amplitude that a round trip can leave.
    """

    entries: tuple[Branch, ...]
    rounds: tuple[Branch, ...]
    left: float


def by_trips(train: Any, target: str, *, asked: str, passes: Passes) -> Plan | None:
    """The plan that sums trip by trip; None where there are no loops, few trips, or light that is not round.

    Parameters
    ----------
    train, target : what is asked.
    asked : engine, "auto" or by name.
    passes : what shortens the steps of each way.
    """
    if asked not in ("auto", "azimuthal"):
        return None
    bench = Loops.of(train, target)
    place, lasers = bench.place(), [node for node in source_nodes(train.elements) if node in bench.inside]
    if place is None or len(lasers) > 1 or not train.elements[lasers[0][0]].line.sharp:
        return None
    ways = bench.ways(lasers[0], place)
    return None if ways is None else _plan(train, target, lasers[0][0], ways, passes)


def _cut(way: Branch) -> bool:
    """Whether a hole gives the light an end."""
    return any(has_hole(getattr(step.law, "stop", None)) for step in way.steps)


def _plan(train: Any, target: str, name: str, ways: Ways, passes: Passes) -> Plan | None:
    laser = train.elements[name]
    refuse_letters(name, laser.parameters())
    refuse_letters(train.name, {"wavelength": train.wavelength})
    source: Source = bound(laser.source)
    endless = any(term.mode.infinite for part in source.components for term in part.beam.terms)
    branches: list[Branch] = []
    left = 0.0
    for group, part in enumerate(source.components):
        wavelength = float(part.wavelength_or(train.wavelength))
        light = Branch(part.beam, wavelength, float(source.power * part.weight), (), group=group, line=laser.line)
        lists = (ways.direct, ways.entries, ways.rounds, ways.exits)
        direct, entries, rounds, exits = ([_way(train, light, walk, passes) for walk in walks] for walks in lists)
        left = sum(_most_left(way.steps) for way in rounds)
        every = [*direct, *entries, *rounds, *exits]
        begin = entries[0].steps
        whole = [*(way.steps for way in (*direct, *entries)), *(begin + way.steps for way in (*rounds, *exits))]
        if endless and (direct or not all(map(_cut, entries))):
            return None
        if not _worth_it(left, every) or any(covariance_reason(steps, source) for steps in whole):
            return None
        trip = RoundTrip(tuple(entries), tuple(rounds), left)
        branches += [replace(way, engine="azimuthal", path=f"{way.path} -> {target}") for way in direct]
        branches += [_out(way, trip, target) for way in exits]
    alone = len(branches) == len(source.components)
    if alone:
        branches = [replace(branch, group=None) for branch in branches]
    reason = "light goes round through parts that shape it, and is followed trip by trip"
    engine, notes = "azimuthal" if alone else "joined", (_said(ways.rounds, left),)
    return Plan(target, float(train.wavelength), source, tuple(branches), engine=engine, reason=reason, notes=notes)


def _way(train: Any, light: Branch, walk: Walk, passes: Passes) -> Branch:
    steps: list[Step] = []
    names = [walk[0][0]]
    for here, there in pairwise(walk):
        if here[2] == "in" and here[0] == there[0]:
            element = train.elements[here[0]]
            refuse_letters(here[0], element.parameters())
            passage = element.passages(light.wavelength)[here[1], there[1]]
            steps += [Step((here[0],), bound(law)) for law in passage.steps()]
            names.append(here[0])
    length = sum((Fraction(step.law.path) for step in steps if isinstance(step.law, TravelLaw)), Fraction(0))
    source = Source((Component(1.0, light.beam, light.wavelength),), light.power)
    plan = passes(Plan("", light.wavelength, source, (replace(light, steps=tuple(steps)),)))
    return replace(plan.branches[0], length=length, path=" -> ".join(names))


def _out(way: Branch, trip: RoundTrip, target: str) -> Branch:
    entry = trip.entries[0]
    before = entry.steps + _widest(entry, trip.rounds[0].steps, way)
    path = f"{entry.path} -> round and round -> {way.path.partition(' -> ')[2] or way.path} -> {target}"
    return replace(
        way, steps=before + way.steps, length=entry.length + way.length, engine="azimuthal", round_trip=trip, path=path,
        last=len(way.steps),
    )  # fmt: skip


def _widest(entry: Branch, once: Steps, way: Branch) -> Steps:
    """As many trips as make the light widest at the target, among the first ones: what holds it holds all."""
    spread = of_beam(entry.beam, entry.wavelength)
    spread = reduce(lambda s, step: s.past(step.law, entry.wavelength), entry.steps, spread)
    sizes = []
    for _ in range(LOOKED_AT):
        there = reduce(lambda s, step: s.past(step.law, entry.wavelength), way.steps, spread)
        sizes.append(there.half_window)
        spread = reduce(lambda s, step: s.past(step.law, entry.wavelength), once, spread)
    trips = sizes.index(max(sizes))
    return once * trips if sizes[trips] > WIDER * sizes[0] else ()


def _most_left(steps: Steps) -> float:
    """The largest amplitude that light of any state can keep."""
    strength = Strength(np.eye(2, dtype=complex), known=False)
    for step in steps:
        strength = strength.past(step.law)
    return strength.amplitude


def _worth_it(left: float, ways: Iterable[Branch]) -> bool:
    trips = _trips(left, FAINT)
    return trips > (MOST if closed(tuple(ways)) else FEW)


def _trips(left: float, rest: float) -> float:
    if left >= 1 - 1e-12:  # a few roundings a part
        return math.inf
    return math.ceil(math.log(rest) / math.log(left)) if left > 0 else 1


def _said(rounds: list[Walk], left: float) -> str:
    parts = ", ".join(dict.fromkeys(node[0] for walk in rounds for node in walk))
    trips = _trips(left, LEFT_OVER)
    most = f"at most {trips} trips" if trips < math.inf else f"no more than {MOST_TRIPS} trips"
    return (
        f"round {parts}: up to {left:.4g} of the amplitude is left after a trip; followed until all later trips "
        f"add less than {LEFT_OVER:g} of it, {most}"
    )
