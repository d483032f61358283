"""A branch of a plan, from its source to the target."""

from __future__ import annotations

from fastaxis.engines.azimuthal.applying import apply
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.engines.azimuthal.starting import started
from fastaxis.plan import Branch

__all__ = ["run"]


def run(branch: Branch, settings: Settings | None = None) -> AzimuthalField:
    """The light of a branch whose parts are all centred and round.

    Parameters
    ----------
    branch : beam, wavelength, power and steps.
    settings : how far the engine goes; its own choice if None.
    """
    settings = settings or Settings()
    light, steps = started(branch, settings)
    for step in steps:
        light = apply(step.law, light, settings)
    return AzimuthalField(branch.wavelength, light, settings)
