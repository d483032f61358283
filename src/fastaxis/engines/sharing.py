"""One propagation for the steps that several plans begin with."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from importlib import import_module
from typing import Any

from fastaxis.engines import propagate
from fastaxis.engines.field import PlaneField
from fastaxis.engines.remembering import light_before
from fastaxis.plan import Branch, Plan

__all__ = ["Prefix", "Relay", "shared_steps"]


SAMPLED = ("grid", "handover")


def shared_steps(one: Plan, other: Plan) -> int:
    """How many steps two plans have in common from the source on, samples included; 0 for unlike light.

    Only sampled light is stopped on the way: the other engines take less time than comparing would save.
    """
    if one.engine not in SAMPLED or one.engine != other.engine or len(one.branches) != len(other.branches):
        return 0
    return min(_shared(a, b) for a, b in zip(one.branches, other.branches, strict=True))


def _shared(one: Branch, other: Branch) -> int:
    a, b = one.sampling, other.sampling
    if a is None or b is None:
        return 0
    if (a.grid, a.taper, a.precision, a.planes[0]) != (b.grid, b.taper, b.precision, b.planes[0]):
        return 0
    if (one.beam, one.wavelength, one.power) != (other.beam, other.wavelength, other.power):
        return 0
    # Samples begin behind the steps of harmonics, which are shared as a whole or not at all.
    first = count = one.harmonic_steps
    if other.harmonic_steps != first or one.steps[:first] != other.steps[:first]:
        return 0
    for here, there in zip(one.steps[first:], other.steps[first:], strict=False):
        if here != there or a.hop(count - first) != b.hop(count - first):
            break
        count += 1
    return count


@dataclass(frozen=True)
class Prefix:
    """Light behind the first steps of a plan, kept for all plans that begin with them.

    Parameters
    ----------
    plan : whose steps were taken.
    count : how many of them.
    lights : of each branch, by the plan's engine.
    """

    plan: Plan
    count: int
    lights: tuple[Any, ...]

    @classmethod
    def of(cls, plan: Plan, count: int, after: Prefix | None = None) -> Prefix:
        """The first steps of a plan, taken on from a shorter prefix if that leads to it."""
        if after is not None and after.count <= count and after.leads_to(plan):
            return cls(plan, count, tuple(after.continued(plan, count)))
        engine = import_module(f"fastaxis.engines.{plan.engine}")
        return cls(plan, count, tuple(light_before(engine, branch, count) for branch in plan.branches))

    def leads_to(self, plan: Plan) -> bool:
        """Whether a plan begins with these steps."""
        return self.plan is plan or shared_steps(self.plan, plan) >= max(self.count, 1)

    def propagate(self, plan: Plan) -> tuple[PlaneField, ...]:
        """The light at the target of a plan that this leads to."""
        engine = import_module(f"fastaxis.engines.{plan.engine}")
        lights = self.continued(plan, len(plan.steps))
        return tuple(engine.finished(light, branch) for light, branch in zip(lights, plan.branches, strict=True))

    def continued(self, plan: Plan, end: int) -> Iterator[Any]:
        """The light of each branch before step ``end`` of a plan that this leads to."""
        engine = import_module(f"fastaxis.engines.{plan.engine}")
        for light, branch in zip(self.lights, plan.branches, strict=True):
            # Engines work in place; what is kept must outlive its use.
            yield engine.continued(replace(light, samples=light.samples.copy()), branch, self.count, end)


class Relay:
    """Propagates plan after plan; what consecutive plans begin with is done once."""

    def __init__(self) -> None:
        self._last: Plan | None = None
        self._prefix: Prefix | None = None

    def propagate(self, plans: Sequence[Plan]) -> Iterator[tuple[PlaneField, ...]]:
        """The light at the target of each plan. Plans handed in together share what all of them begin with."""
        prefix = self._prefix_for(plans[0])
        count = min(shared_steps(plans[0], plan) for plan in plans)
        if len(plans) > 1 and count:
            prefix = Prefix.of(plans[0], count, prefix)
        for plan in plans:
            yield prefix.propagate(plan) if prefix and prefix.leads_to(plan) else propagate(plan)

    def _prefix_for(self, plan: Plan) -> Prefix | None:
        """Light kept from earlier plans, renewed where it leads elsewhere or could be kept from further on."""
        if self._last is not None:
            count, known = shared_steps(self._last, plan), self._prefix
            if known is None or count > known.count or not known.leads_to(plan):
                self._prefix = Prefix.of(plan, count, known) if count else None
        self._last = plan
        return self._prefix
