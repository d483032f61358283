"""A plan: which light goes through which steps, by which engine, on which samples; it explains itself."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

from fastaxis.light import Beam, Source
from fastaxis.plan.explaining import explain
from fastaxis.plan.sampling import Sampling
from fastaxis.plan.steps import Steps

__all__ = ["Branch", "Plan"]


@dataclass(frozen=True)
class Branch:
    """One incoherent part of the source on its way to the target.

    Parameters
    ----------
    beam : the coherent light at the plane of the source.
    wavelength : of this part [m].
    power : it starts with [W].
    steps : laws asked at this wavelength, in the order the light meets them.
    sampling : for the grid engine; None for engines that need no samples.
    """

    beam: Beam
    wavelength: float
    power: float
    steps: Steps
    sampling: Sampling | None = None


@dataclass(frozen=True)
class Plan:
    """How a question to a train will be answered. ``print(plan)`` says it step by step.

    Parameters
    ----------
    target : element or port asked about.
    wavelength : of the train [m].
    source : the light at the start.
    branches : one for each incoherent part of the source.
    engine : "uniform", "azimuthal" or "grid".
    reason : why this engine.
    notes : what the passes did.
    """

    target: str
    wavelength: float
    source: Source
    branches: tuple[Branch, ...]
    engine: str = "grid"
    reason: str = ""
    notes: tuple[str, ...] = ()

    @property
    def steps(self) -> Steps:
        """The steps of the first incoherent part; those of the others differ only by their wavelength."""
        return self.branches[0].steps

    @property
    def sampling(self) -> Sampling | None:
        """The sampling of the first incoherent part."""
        return self.branches[0].sampling

    def rewritten(self, rewrite: Callable[[Steps, float], Steps], note: str) -> Plan:
        """The plan with the steps of every branch rewritten; noted if it changed anything."""
        branches = tuple(replace(b, steps=rewrite(b.steps, b.wavelength)) for b in self.branches)
        before, after = len(self.steps), len(branches[0].steps)
        if branches == self.branches:
            return self
        return replace(self, branches=branches, notes=(*self.notes, f"{note} ({before} -> {after} steps)"))

    def __str__(self) -> str:
        return explain(self)
