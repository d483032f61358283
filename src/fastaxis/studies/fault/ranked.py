"""Mistakes ranked, in words, and which further setting would tell the explanations apart."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from itertools import combinations
from typing import Any

import numpy as np

from fastaxis.camera import SIX_STATES
from fastaxis.camera.exposing import expose
from fastaxis.camera.settings import Setting, as_setting
from fastaxis.conventions import stamp
from fastaxis.light import State, linear
from fastaxis.studies.fault.suspects import Suspect

__all__ = ["FaultReport"]

EXPLAINS = 0.9  # of the declared misfit; a value fitted to frames of something else gains a few percent by chance
DARK = 1e-5  # of the light: a frame 50 dB down drowns in what real analyzers leak
FURTHER = (*SIX_STATES, *(linear(math.radians(angle)) for angle in range(15, 180, 15) if angle % 45))


@dataclass(frozen=True, eq=False)
class FaultReport:
    """Single mistakes ranked by how well they reproduce recorded frames. ``print(report)`` tells them.

    Parameters
    ----------
    declared : the train without a mistake.
    ranking : the mistakes, best first.
    target : camera or detector.
    settings : of the frames.
    noise : difference between frames that counts as none.
    """

    declared: Suspect
    ranking: tuple[Suspect, ...]
    target: str
    settings: tuple[Setting, ...]
    noise: float

    @property
    def ties(self) -> tuple[Suspect, ...]:
        """The best explanation and all that are as good within the noise, the bench as declared among them."""
        every = (self.declared, *self.ranking)
        best = min(one.misfit for one in every)
        return tuple(one for one in every if one.misfit <= max(best + self.noise, 1.01 * best))

    def separating(self, further: Iterable[Any] = FURTHER) -> tuple[State | Setting, int] | None:
        """The further setting that tells most pairs of equally good explanations apart, and how many pairs.

        Frames are compared at the scale at which the explanations agree about the recorded ones, and a frame that is
        dark in both is no help. None if there is no tie, or no setting parts any of them by more than the noise: then
        they are the same light.
        """
        tried = tuple(further)
        shots = [expose(one.train, self.target, (*self.settings, *tried)) for one in self.ties]
        pairs = list(combinations(shots, 2))
        known = len(self.settings)
        apart = np.array([[_parted(a, b, known, known + k) for a, b in pairs] for k in range(len(tried))])
        if not apart.size or apart.max() <= self.noise:
            return None
        # Of settings that part equally many, the one that parts them furthest.
        parted = (apart > self.noise).sum(axis=1)
        best = max(range(len(tried)), key=lambda k: (parted[k], apart[k].sum()))
        return tried[best], int(parted[best])

    def text(self, most: int = 8) -> str:
        """The ranking in words."""
        lines = [f"{self.target}: the frames differ from the bench as declared by {self.declared.misfit:.3g}"]
        lines += self._verdicts()
        lines += [f"{n:3}. {one.misfit:.3g}  {one.words}" for n, one in enumerate(self.ranking[:most], start=1)]
        if len(self.ties) > 1:
            found = self.separating()
            told = "the same light behind every analyzer" if found is None else _told(*found, len(self.ties))
            lines.append(f"{len(self.ties)} explanations are equally good: {told}")
        return "\n".join([*lines, stamp()])

    __str__ = text

    def _verdicts(self) -> Iterator[str]:
        """What the ranking is worth."""
        declared = self.declared.misfit
        if declared <= self.noise:
            yield "that is within the noise: nothing needs explaining"
            return
        if self.declared in self.ties:
            yield "the bench as declared is as good as any"
        if not any(one.misfit <= EXPLAINS * declared for one in self.ranking):
            yield "no single mistake explains these frames"


def _told(setting: State | Setting, parted: int, ties: int) -> str:
    return f"a frame behind {as_setting(setting).label} parts {parted} of {ties * (ties - 1) // 2} pairs of them"


def _parted(one: Any, other: Any, known: int, further: int) -> float:
    """Size of the difference of a further frame over that of both; 0 for the same picture, about 1 for strangers."""
    # Each explanation has a scale of its own against the camera's counts; both agree with the recorded frames.
    recorded = [np.stack([shots.frame(k) for k in range(known)]) for shots in (one, other)]
    power = float((recorded[1] ** 2).sum())
    scale = float((recorded[0] * recorded[1]).sum()) / power if power else 1.0
    a, b = one.frame(further), scale * other.frame(further)
    if max(a.sum(), b.sum()) < DARK * one.total_power:
        return 0.0
    return float(np.sqrt(((a - b) ** 2).sum() / ((a**2).sum() + (b**2).sum())))
