"""A plan: which light goes through which steps, by which engine, on which samples; it explains itself."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field, replace
from fractions import Fraction
from itertools import groupby
from typing import TYPE_CHECKING

from fastaxis.errors import ParameterError
from fastaxis.light import MONOCHROMATIC, Beam, Line, Source
from fastaxis.plan.explaining import explain
from fastaxis.plan.sampling import Sampling
from fastaxis.plan.steps import Steps

if TYPE_CHECKING:
    from fastaxis.plan.cavity import RoundTrip
    from fastaxis.plan.network import Network

__all__ = ["Branch", "Plan"]

PRECISIONS = ("double", "single")


@dataclass(frozen=True)
class Branch:
    """One incoherent part of the source on one of its ways to the target.

    Parameters
    ----------
    beam : the coherent light at the plane of the source.
    wavelength : of this part [m].
    power : it starts with [W].
    steps : laws asked at this wavelength, in the order the light meets them.
    sampling : for the grid engine; None for engines that need no samples.
    group : branches of one number are arms, whose fields add up; None for light that comes by one way.
    length : optical path from source to target [m], exact.
    line : shape of the spectral line, which says how well arms of different length add up.
    engine : of this branch; "" for the engine of the plan.
    network : all ways at once, for light whose shape is not followed; then there are no steps.
    feed : place in the network where the light begins.
    path : parts of an arm, as text.
    harmonic_steps : so many steps are done by harmonics before samples take over; ``sampling`` begins there.
    round_trip : of light that goes round and is followed trip by trip.
    last : of such light, how many of the steps lead out to the target; those before show how wide it gets.
    opening : parts whose travel is in ``beam`` already; ``sampling`` begins behind them.
    """

    beam: Beam
    wavelength: float
    power: float
    steps: Steps
    sampling: Sampling | None = None
    group: int | None = None
    length: Fraction = Fraction(0)
    line: Line = MONOCHROMATIC
    engine: str = ""
    network: Network | None = None
    feed: int = 0
    path: str = ""
    harmonic_steps: int = 0
    opening: tuple[str, ...] = ()
    round_trip: RoundTrip | None = None
    last: int = 0


def _in_precision(branch: Branch, precision: str) -> Branch:
    return replace(branch, sampling=branch.sampling and replace(branch.sampling, precision=precision))


@dataclass(frozen=True)
class Plan:
    """How a question to a train will be answered. ``print(plan)`` says it step by step.

    Parameters
    ----------
    target : element or port asked about.
    wavelength : of the train [m].
    source : the light at the start.
    branches : one for each incoherent part of the source.
    engine : "uniform", "azimuthal" or "grid"; "handover" from the second to the third on the way; "joined" where arms
        meet, each with an engine of its own.
    reason : why this engine.
    notes : what the passes did.
    declared : the steps of the first branch before any pass changed them; empty if none did.
    """

    target: str
    wavelength: float
    source: Source
    branches: tuple[Branch, ...]
    engine: str = "grid"
    reason: str = ""
    notes: tuple[str, ...] = ()
    declared: Steps = field(default=(), repr=False, compare=False)

    @property
    def steps(self) -> Steps:
        """The steps of the first incoherent part; those of the others differ only by their wavelength."""
        return self.branches[0].steps

    @property
    def sampling(self) -> Sampling | None:
        """The sampling of the first incoherent part."""
        return self.branches[0].sampling

    def with_precision(self, precision: str) -> Plan:
        """The plan with samples of "double" or "single" precision; engines without samples take no notice.

        Raises
        ------
        ParameterError : another precision.
        """
        if precision not in PRECISIONS:
            raise ParameterError(
                "samples are numbers of double or single precision",
                got=f"precision = {precision!r}",
                fix='precision="single"',
            )
        return replace(self, branches=tuple(_in_precision(branch, precision) for branch in self.branches))

    @property
    def groups(self) -> tuple[tuple[Branch, ...], ...]:
        """The branches, arms of one coherent light together."""
        alone = enumerate(self.branches)
        keyed = [((-1, i) if b.group is None else (b.group, 0), b) for i, b in alone]
        return tuple(tuple(b for _, b in part) for _, part in groupby(keyed, key=lambda pair: pair[0]))

    @property
    def joined(self) -> bool:
        """Whether light comes by several ways whose fields add up."""
        return any(len(group) > 1 for group in self.groups)

    def rewritten(self, rewrite: Callable[[Steps, float], Steps], note: str) -> Plan:
        """The plan with the steps of every branch rewritten; noted if it changed anything."""
        branches = tuple(replace(b, steps=rewrite(b.steps, b.wavelength)) for b in self.branches)
        before, after = len(self.steps), len(branches[0].steps)
        if branches == self.branches:
            return self
        notes, declared = (*self.notes, f"{note} ({before} -> {after} steps)"), self.declared or self.steps
        return replace(self, branches=branches, notes=notes, declared=declared)

    def __str__(self) -> str:
        return explain(self)
