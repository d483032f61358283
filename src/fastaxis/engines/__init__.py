"""Engines apply the steps of a plan to light. Each knows the plan; none knows the parts or another engine."""

from __future__ import annotations

from importlib import import_module

from fastaxis.engines.field import Guard, PlaneField
from fastaxis.plan import Plan

__all__ = ["Guard", "PlaneField", "propagate"]


def propagate(plan: Plan) -> tuple[PlaneField, ...]:
    """The light at the target of a plan: one field for each incoherent part of the source.

    The engine's room is loaded on first use.

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
    found: list[PlaneField] = []
    for group in plan.groups:
        fields = [import_module(f"fastaxis.engines.{b.engine or plan.engine}").run(b) for b in group]
        found += fields if len(group) == 1 else import_module("fastaxis.engines.joined").joined(group, fields)
    return tuple(found)
