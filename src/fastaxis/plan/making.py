"""From a train and a question to a plan."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

from fastaxis.light import Source
from fastaxis.plan.binding import bound, refuse_letters
from fastaxis.plan.choose import choose
from fastaxis.plan.commute import commute
from fastaxis.plan.fuse import fuse
from fastaxis.plan.gather_flips import gather_flips
from fastaxis.plan.grid import Grid
from fastaxis.plan.merge import merge
from fastaxis.plan.multiply import multiply
from fastaxis.plan.plan import Branch, Plan
from fastaxis.plan.proposing import sampling_for
from fastaxis.plan.spread import of_beam
from fastaxis.plan.steps import Step, Steps
from fastaxis.plan.trailing import drop_trailing

__all__ = ["PASSES", "make_plan", "simplified", "unfused"]

PASSES = (gather_flips, merge, commute, fuse, merge, multiply)
"""In this order: flips and plates out of the way first, so that what they parted can be merged."""


def _steps(train: Any, route: Any, wavelength: float) -> Steps:
    """The laws on a route, asked at a wavelength, exact numbers made floats."""
    steps = []
    for leg in route.legs:
        element = train.elements[leg.element_name]
        refuse_letters(leg.element_name, element.parameters())
        passage = element.passages(wavelength)[leg.entered, leg.left]
        steps += [Step((leg.element_name,), bound(law)) for law in passage.steps()]
    return tuple(steps)


def unfused(train: Any, target: str) -> Plan:
    """The plan as declared: a branch for each incoherent part of the source, no pass applied, no engine chosen.

    Raises
    ------
    SymbolError : a letter without a value on the way.
    """
    refuse_letters(train.name, {"wavelength": train.wavelength})
    route = train.route(target)
    refuse_letters(route.source_name, route.laser.parameters())
    source: Source = bound(route.laser.source)
    wavelength = float(train.wavelength)
    branches = []
    for part in source.components:
        own = wavelength if part.wavelength is None else float(part.wavelength)
        branches.append(Branch(part.beam, own, float(source.power * part.weight), _steps(train, route, own)))
    return Plan(target, wavelength, source, tuple(branches))


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
    train: Any, target: str, *, grid: Grid | None = None, engine: str = "auto", power_only: bool = False
) -> Plan:
    """How the light at a port of a train will be computed.

    Parameters
    ----------
    train : the train asked.
    target : camera, detector or port, "cam" or "pbs.reflected".
    grid : samples set by hand, for the grid engine.
    engine : "auto", "uniform", "azimuthal" or "grid".
    power_only : ask for total power only; a lossless end of the path is left out.

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
    ('grid', [('plate1',), ('space1',), ('qplate1',), ('space2',)])
    """
    plan = simplified(unfused(train, target))
    if power_only:
        plan = drop_trailing(plan)
    bucket = power_only or _is_bucket(train, target)
    name, reason = choose(plan.steps, plan.source, bucket=bucket, asked=engine, sampled=grid is not None)
    if name == "grid":
        plan = _sampled(plan, grid)
    return replace(plan, engine=name, reason=reason)


def _sampled(plan: Plan, grid: Grid | None) -> Plan:
    branches = tuple(
        replace(b, sampling=sampling_for(b.steps, of_beam(b.beam, b.wavelength), b.wavelength, grid))
        for b in plan.branches
    )
    return replace(plan, branches=branches)
