"""From a train and a question to a plan."""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable
from dataclasses import replace
from fractions import Fraction
from functools import cache
from typing import Any

from fastaxis.laws import TravelLaw
from fastaxis.light import Component, Source
from fastaxis.plan.advance import advance
from fastaxis.plan.arms import arms
from fastaxis.plan.at_once import by_network
from fastaxis.plan.binding import bound, refuse_letters
from fastaxis.plan.cavity import by_trips
from fastaxis.plan.choose import choose
from fastaxis.plan.closed import closed
from fastaxis.plan.commute import commute
from fastaxis.plan.fuse import fuse
from fastaxis.plan.gather_flips import gather_flips
from fastaxis.plan.grid import Grid
from fastaxis.plan.handing_over import roomier, round_steps
from fastaxis.plan.merge import merge
from fastaxis.plan.multiply import multiply
from fastaxis.plan.plan import Branch, Plan
from fastaxis.plan.proposing import sampling_for
from fastaxis.plan.spread import of_beam
from fastaxis.plan.steps import JonesStep, Step, Steps
from fastaxis.plan.trailing import drop_trailing

__all__ = ["PASSES", "make_plan", "simplified", "unfused"]

PASSES = (gather_flips, merge, commute, fuse, merge, multiply)
"""In this order: flips and plates out of the way first, so that what they parted can be merged."""


def _asked(train: Any, wavelength: float) -> Callable[[str, str, str], Steps]:
    """The laws of a part between two faces, exact numbers made floats; each passage is asked for once."""

    @cache
    def steps(name: str, entered: str, left: str) -> Steps:
        element = train.elements[name]
        refuse_letters(name, element.parameters())
        return tuple(Step((name,), bound(law)) for law in element.passages(wavelength)[entered, left].steps())

    return steps


def _length(steps: Steps) -> Fraction:
    times = Counter(step.law.path for step in steps if isinstance(step.law, TravelLaw))
    return sum((count * Fraction(path) for path, count in times.items()), Fraction(0))


def unfused(train: Any, target: str) -> Plan:
    """The plan as declared: a branch for each incoherent part and each path, no pass applied, no engine chosen.

    Raises
    ------
    SymbolError : a letter without a value on the way.
    """
    refuse_letters(train.name, {"wavelength": train.wavelength})
    train.validate()
    routes = arms(train, target)
    branches: list[Branch] = []
    for name in dict.fromkeys(route.source_name for route in routes):
        own = [route for route in routes if route.source_name == name]
        branches += _of_laser(train, own, len(branches))
    first: Any = routes[0].laser
    return Plan(target, float(train.wavelength), bound(first.source), tuple(branches))


def _of_laser(train: Any, routes: list[Any], group: int) -> list[Branch]:
    laser: Any = routes[0].laser
    refuse_letters(routes[0].source_name, laser.parameters())
    source: Source = bound(laser.source)
    branches = []
    for index, part in enumerate(source.components):
        wavelength = float(part.wavelength_or(train.wavelength))
        asked = _asked(train, wavelength)
        for route in routes:
            steps = tuple(s for leg in route.legs for s in asked(leg.element_name, leg.entered, leg.left))
            branch = Branch(part.beam, wavelength, float(source.power * part.weight), steps)
            if len(routes) > 1:
                branch = replace(branch, group=group + index, length=_length(steps), line=laser.line, path=str(route))
            branches.append(branch)
    return branches


def simplified(plan: Plan) -> Plan:
    """The plan after all passes; its answer is the same."""
    for rewrite in PASSES:
        plan = rewrite(plan)
    return plan


def _is_bucket(train: Any, target: str) -> bool:
    """Whether the target collects all light: a detector without pixels that light does not leave again."""
    element = train.elements[target.partition(".")[0]]
    return element.exit is None and not hasattr(element, "pixel")


def make_plan(
    train: Any,
    target: str,
    *,
    grid: Grid | None = None,
    engine: str = "auto",
    power_only: bool = False,
    by_arms: bool = False,
) -> Plan:
    """How the light at a port of a train will be computed.

    Parameters
    ----------
    train : the train asked.
    target : camera, detector or port, "cam" or "pbs.reflected".
    grid : samples set by hand, for the grid engine.
    engine : "auto", "uniform", "azimuthal" or "grid".
    power_only : ask for total power only; a lossless end of the path is left out.
    by_arms : keep a branch for each path also where all of them can be summed at once.

    Raises
    ------
    SymbolError : a letter without a value on the way.
    SamplingError : no grid, or not the one set by hand, carries the light.
    WiringError : no light gets there.

    Warns
    -----
    SamplingWarning : the grid is tight.

    Examples
    --------
    >>> from fastaxis.elements import FreeSpace, HalfWavePlate, Laser, QPlate
    >>> from fastaxis.train import Train
    >>> train = Train(wavelength=532e-9).along(
    ...     Laser(waist=0.8e-3), HalfWavePlate(fast=0.1), FreeSpace(0.2), QPlate(q=0.5), FreeSpace(0.3)
    ... )
    >>> plan = make_plan(train, "space2", engine="grid")
    >>> plan.engine, [step.names for step in plan.steps]
    ('grid', [('plate1',), ('qplate1',), ('space2',)])
    """
    at_once = None if by_arms else by_network(train, target, asked=engine)
    if at_once is not None:
        return at_once
    followed = None if by_arms or grid is not None else by_trips(train, target, asked=engine, passes=simplified)
    if followed is not None:
        return followed
    declared = unfused(train, target)
    if declared.joined and engine == "auto" and grid is None:
        kept = closed(declared.branches)
        if kept is not None:
            reason = "light comes by several paths, and on each of them its modes stay what they are"
            return replace(declared, branches=kept, engine="joined", reason=reason)
    plan = simplified(declared)
    bucket = power_only or _is_bucket(train, target)
    if plan.joined:
        return _joined(plan, grid, bucket=bucket, asked=engine)
    if power_only:
        plan = drop_trailing(plan)
    name, reason = choose(plan.steps, plan.source, bucket=bucket, asked=engine, sampled=grid is not None)
    first = round_steps(plan.steps, plan.source) if name == "grid" and engine == "auto" and grid is None else 0
    if first:
        name, reason = "handover", f"{reason}, but up to there all is round about the axis"
    if name in {"grid", "handover"}:
        plan = replace(plan, branches=tuple(_sampled(b, grid, first, seen=not bucket) for b in plan.branches))
    return advance(replace(plan, engine=name, reason=reason))


def _sampled(branch: Branch, grid: Grid | None, first: int = 0, *, seen: bool) -> Branch:
    """A branch with samples for its steps behind the first ones, which harmonics do; for a picture or a power."""
    spread, rest = of_beam(branch.beam, branch.wavelength), branch.steps[first:]
    for step in branch.steps[:first]:
        spread = spread.past(step.law, branch.wavelength)
    sampling = sampling_for(rest, spread, branch.wavelength, grid, seen=seen)
    if first and grid is None:
        sampling = roomier(sampling, rest, branch.wavelength)
    return replace(branch, sampling=sampling, harmonic_steps=first)


def _joined(plan: Plan, grid: Grid | None, *, bucket: bool, asked: str) -> Plan:
    """Every arm with the engine that suits it."""
    branches: list[Branch] = []
    for group in plan.groups:
        alike = bucket and len({_shape(branch.steps) for branch in group}) == 1
        chosen = [replace(b, engine=_engine(b, grid, bucket=alike, asked=asked)) for b in group]
        # Where not all arms are round, modes that stay modes are known at any place sooner than samples or harmonics.
        free = asked == "auto" and grid is None and any(branch.engine == "grid" for branch in chosen)
        for branch in chosen:
            kept = closed((branch,)) if free else None
            branches += kept or (_sampled(branch, grid, seen=not bucket) if branch.engine == "grid" else branch,)
    return advance(replace(plan, branches=tuple(branches), engine="joined", reason="light comes by several paths"))


def _engine(branch: Branch, grid: Grid | None, *, bucket: bool, asked: str) -> str:
    source = Source((Component(1.0, branch.beam, branch.wavelength),), branch.power)
    return choose(branch.steps, source, bucket=bucket, asked=asked, sampled=grid is not None)[0]


def _shape(steps: Steps) -> tuple[Any, ...]:
    """What makes the beams of two arms differ from place to place: all but uniform matrices and path length."""
    laws = [step.law for step in steps if not isinstance(step.law, JonesStep)]
    return tuple(replace(law, path=0.0) if isinstance(law, TravelLaw) else law for law in laws)
