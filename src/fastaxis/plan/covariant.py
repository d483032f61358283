"""Whether turning the whole bench about its axis turns the answer: then a few azimuthal harmonics carry the light."""

from __future__ import annotations

from functools import singledispatch
from typing import Any

from fastaxis.laws import AxisLaw, ScalarLaw
from fastaxis.light import Mode, Source
from fastaxis.plan.steps import Steps

__all__ = ["covariance_reason"]


@singledispatch
def _refusal(law: Any) -> str:  # noqa: ARG001 -- any other law is round
    """What in a law is not round about the axis; empty if nothing is."""
    return ""


@_refusal.register
def _(law: AxisLaw) -> str:
    if law.uniform:
        return ""
    if not (law.along.uniform and law.across.uniform) or hasattr(law.angle, "mirrored"):
        return "has a pattern"
    return "is off the axis" if law.centre != (0, 0) else ""


@_refusal.register
def _(law: ScalarLaw) -> str:
    if law.tilt != (0, 0):
        return "tilts the beam"
    if not law.transmission.uniform:
        return "has a pattern"
    if law.uniform:
        return ""
    if law.centre != (0, 0):
        return "is off the axis"
    return "" if law.stop is None or law.stop.round else "has an edge that is not round"


def _round(mode: Mode) -> bool:
    """Whether a mode is a finite sum of harmonics about the axis."""
    return mode.charge is not None or bool(getattr(mode, "centred", False))


def covariance_reason(steps: Steps, source: Source) -> str:
    """Why the light is not a few harmonics about one axis; empty if it is."""
    modes = [term.mode for part in source.components for term in part.beam.terms]
    if not all(map(_round, modes)):
        return "the beam is not round about the axis"
    for step in steps:
        refusal = _refusal(step.law)
        if refusal:
            return f"{', '.join(step.names)} {refusal}"
    if any(mode.infinite for mode in modes) and not _first_stop_is_a_hole(steps, modes):
        return "a plane wave without end has no harmonics that end"
    return ""


def _first_stop_is_a_hole(steps: Steps, modes: list[Mode]) -> bool:
    """Whether a plane wave meets a hole before anything else that has a shape, and nothing but plane waves does."""
    for step in steps:
        law = step.law
        if isinstance(law, ScalarLaw) and law.stop is not None:
            return not getattr(law.stop, "opaque", False) and all(mode.infinite for mode in modes)
        if (isinstance(law, AxisLaw) and law.order) or (isinstance(law, ScalarLaw) and law.charge):
            return False
    return False
