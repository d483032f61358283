"""A branch of a plan, from its source to the target."""

from __future__ import annotations

from dataclasses import replace

from fastaxis.engines.azimuthal.applying import apply
from fastaxis.engines.azimuthal.estimates import Known
from fastaxis.engines.azimuthal.harmonics import Harmonics
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.engines.azimuthal.starting import started
from fastaxis.engines.azimuthal.steady import steady
from fastaxis.plan import Branch
from fastaxis.plan.steps import Steps

__all__ = ["run"]


def run(branch: Branch, settings: Settings | None = None) -> AzimuthalField:
    """The light of a branch whose parts are all centred and round.

    Parameters
    ----------
    branch : beam, wavelength, power and steps.
    settings : how far the engine goes; its own choice if None.
    """
    settings = settings or Settings()
    light, steps = _circulating(branch, settings) if branch.round_trip else started(branch, settings)
    for step in steps:
        light = apply(step.law, light, settings)
    return AzimuthalField(branch.wavelength, light, settings)


def _circulating(branch: Branch, settings: Settings) -> tuple[Harmonics, Steps]:
    """All trips together at the place that all of them pass, and the steps that lead out from there."""
    assert branch.round_trip is not None
    found = steady(branch.round_trip, settings)
    light = replace(found.light, estimates=(*found.light.estimates, Known(found.error)))
    return light, branch.steps[len(branch.steps) - branch.last :]
