"""Arms whose light keeps its shape: a matrix, a section, reversals and a displacement are all there is to them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from itertools import takewhile

from fastaxis.laws import Flip, ScalarLaw, TravelLaw
from fastaxis.light import Beam
from fastaxis.light.modes.family import GaussFamily
from fastaxis.plan.displacement import Displacement
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.plan import Branch
from fastaxis.plan.steps import JonesStep, Step, StepLaw, Steps

__all__ = ["closed"]


def closed(arms: Sequence[Branch]) -> tuple[Branch, ...] | None:
    """The arms with the engine "modes" and at most five steps each; None if any of them gives its light a shape.

    Gaussian modes stay what they are through any ray matrix, and their middle goes where a ray would go. Uniform
    matrices may change places with lenses, travel, reversals and tilts, and these with each other once they are
    written for their new place, so that an arm of a thousand round trips is as short as one without any.
    """
    if not all(map(_keeps_shape, {id(arm.beam): arm.beam for arm in arms}.values())):
        return None
    folder, folded = _Folder(), []
    for arm in arms:
        done = folder.fold(arm.steps)
        if done is None:
            return None
        folded.append(replace(arm, steps=done.steps(arm.steps), engine="modes"))
    return tuple(folded)


def _keeps_shape(beam: Beam) -> bool:
    return all(isinstance(term.mode, GaussFamily) for term in beam.terms)


@dataclass(frozen=True)
class _Folded:
    """What some steps do together, in this order."""

    matrix: JonesStep = field(default_factory=JonesStep)
    section: TravelLaw = field(default_factory=TravelLaw)
    reversed_axes: frozenset[str] = frozenset()
    displacement: Displacement = field(default_factory=Displacement)

    def past(self, law: StepLaw) -> _Folded:
        if isinstance(law, JonesStep):
            return replace(self, matrix=self.matrix.then(law))
        if isinstance(law, TravelLaw):
            return replace(self, section=self.section.then(law), displacement=self.displacement.through(law))
        if isinstance(law, Displacement):
            return replace(self, displacement=self.displacement.then(law))
        assert isinstance(law, Flip)
        turned = self.displacement.reversed(law.axis)
        return replace(self, reversed_axes=self.reversed_axes ^ {law.axis}, displacement=turned)

    def steps(self, origin: Steps) -> Steps:
        names = tuple(dict.fromkeys(name for step in origin for name in step.names))
        laws: list[StepLaw] = [self.matrix, self.section, *map(Flip, sorted(self.reversed_axes))]
        if self.displacement != Displacement():
            laws.append(self.displacement)
        return tuple(Step(names, law) for law in laws)


class _Folder:
    """Folds path after path; where one begins as the path before, as each trip in a cavity does, it goes on there."""

    def __init__(self) -> None:
        self._known: dict[int, tuple[StepLaw, ...] | None] = {}
        self._trail: list[tuple[Step, _Folded]] = []

    def fold(self, steps: Steps) -> _Folded | None:
        shared = sum(1 for _ in takewhile(lambda both: both[0][0] is both[1], zip(self._trail, steps, strict=False)))
        del self._trail[shared:]
        done = self._trail[-1][1] if self._trail else _Folded()
        for step in steps[shared:]:
            if id(step) not in self._known:
                self._known[id(step)] = _parts(step)
            parts = self._known[id(step)]
            if parts is None:
                return None
            for law in parts:
                done = done.past(law)
            self._trail.append((step, done))
        return done


def _parts(step: Step) -> tuple[StepLaw, ...] | None:
    """A law as matrices, sections, reversals and displacements; None if there is more to it."""
    law, matrix = step.law, as_matrix(step)
    if matrix is not None:
        return (matrix,)
    if isinstance(law, TravelLaw | Flip):
        return (law,)
    if isinstance(law, ScalarLaw) and replace(law, vergence=0.0, tilt=(0.0, 0.0)).uniform:
        return _bending(law)
    return None


def _bending(law: ScalarLaw) -> tuple[StepLaw, ...]:
    """A lens and a wedge. A lens off the axis is a centred one, a tilt of c/f, and |c|^2/2f less glass on the axis."""
    number, (x, y) = JonesStep.scale(law.transmission.number()), (float(place) for place in law.centre)
    v, (tx, ty) = float(law.vergence), (float(tilt) for tilt in law.tilt)
    turn = Displacement.wedge((tx + v * x, ty + v * y), (x, y))
    turn = replace(turn, path=turn.path + v * (x * x + y * y) / 2)
    parts: list[StepLaw] = [number, TravelLaw.lens(law.vergence)]
    return tuple(parts if turn == Displacement() else [*parts, turn])
