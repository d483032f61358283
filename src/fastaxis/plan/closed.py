"""Arms whose light keeps its shape: one matrix, one section and the reversals are all there is to them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from fastaxis.laws import Flip, ScalarLaw, TravelLaw
from fastaxis.light import Beam
from fastaxis.light.modes.family import GaussFamily
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.plan import Branch
from fastaxis.plan.steps import JonesStep, Step, StepLaw

__all__ = ["closed"]


def closed(arms: Sequence[Branch]) -> tuple[Branch, ...] | None:
    """The arms with the engine "modes" and at most four steps each; None if any of them gives its light a shape.

    Gaussian modes on the axis stay what they are through any ray matrix; uniform matrices, centred lenses, travel and
    reversals may change places, so that an arm of a thousand round trips is as short as one without any.
    """
    if not all(map(_keeps_shape, {id(arm.beam): arm.beam for arm in arms}.values())):
        return None
    known: dict[int, tuple[StepLaw, ...] | None] = {}
    folded = [_folded(arm, known) for arm in arms]
    return tuple(arm for arm in folded if arm is not None) if all(folded) else None


def _keeps_shape(beam: Beam) -> bool:
    return all(isinstance(term.mode, GaussFamily) and term.mode.centred for term in beam.terms)


def _folded(arm: Branch, known: dict[int, tuple[StepLaw, ...] | None]) -> Branch | None:
    matrix, section, reversed_axes = JonesStep(), TravelLaw(), set[str]()
    for step in arm.steps:
        # Trips pass the same steps again and again.
        if id(step) not in known:
            known[id(step)] = _parts(step)
        parts = known[id(step)]
        if parts is None:
            return None
        for law in parts:
            if isinstance(law, JonesStep):
                matrix = matrix.then(law)
            elif isinstance(law, TravelLaw):
                section = section.then(law)
            elif isinstance(law, Flip):
                reversed_axes ^= {law.axis}
    names = tuple(dict.fromkeys(name for step in arm.steps for name in step.names))
    laws = (matrix, section, *map(Flip, sorted(reversed_axes)))
    return replace(arm, steps=tuple(Step(names, law) for law in laws), engine="modes")


def _parts(step: Step) -> tuple[StepLaw, ...] | None:
    """A law as matrices, sections and reversals; None if there is more to it."""
    law, matrix = step.law, as_matrix(step)
    if matrix is not None:
        return (matrix,)
    if isinstance(law, TravelLaw | Flip):
        return (law,)
    if isinstance(law, ScalarLaw) and replace(law, vergence=0.0).uniform and tuple(law.centre) == (0, 0):
        return (JonesStep.scale(law.transmission.number()), TravelLaw.lens(law.vergence))
    return None
