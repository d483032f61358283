"""Engines apply the steps of a plan to light. Each knows the plan; none knows the parts or another engine."""

from __future__ import annotations

from collections.abc import Sequence
from importlib import import_module
from typing import Any

from fastaxis.engines.field import Guard, PlaneField
from fastaxis.plan import Branch, Plan

__all__ = ["Guard", "PlaneField", "arrived", "propagate"]


def propagate(plan: Plan) -> tuple[PlaneField, ...]:
    """The light at the target of a plan: one field for each incoherent part of the source.

    The engine's room is loaded on first use. Sampled light goes on from where an earlier question, alike up to there,
    has left it.

    Warns
    -----
    SamplingWarning : light came near the edge of the window, or was cut off by a band limit.

    Raises
    ------
    SamplingError : so much of it that the answer would be another beam.

    Examples
    --------
    >>> from fastaxis.elements import FreeSpace, Laser, Polarizer
    >>> from fastaxis.plan import make_plan
    >>> from fastaxis.train import Train
    >>> train = Train(wavelength=633e-9).along(Laser(waist=1e-3, power=2e-3), Polarizer(axis=0.0), FreeSpace(0.5))
    >>> (field,) = propagate(make_plan(train, "space1"))
    >>> round(field.power, 12)
    0.002
    """
    return tuple(field for group in plan.groups for field in arrived(plan.engine, group))


def arrived(engine: str, group: Sequence[Branch]) -> Sequence[PlaneField]:
    """The light of branches whose fields add up, by the engine of their plan or their own."""
    fields = [_run(branch.engine or engine, branch) for branch in group]
    if len(group) == 1:
        return fields
    joined: Sequence[PlaneField] = import_module("fastaxis.engines.joined").joined(group, fields)
    return joined


def _run(name: str, branch: Branch) -> PlaneField:
    engine: Any = import_module(f"fastaxis.engines.{name}")
    if not hasattr(engine, "continued"):
        field: PlaneField = engine.run(branch)
        return field
    remembering = import_module("fastaxis.engines.remembering")
    seen: PlaneField = engine.finished(remembering.light_before(engine, branch, len(branch.steps)), branch)
    return seen
