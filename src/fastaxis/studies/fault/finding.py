"""Which single mistake explains what is seen, and which further setting would tell the explanations apart."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from itertools import combinations
from typing import Any

import numpy as np

from fastaxis.camera import SIX_STATES
from fastaxis.camera.exposing import expose
from fastaxis.camera.settings import Setting, as_setting, as_settings
from fastaxis.checks import number
from fastaxis.conventions import stamp
from fastaxis.errors import ParameterError
from fastaxis.light import State, linear
from fastaxis.studies.fault.centring import displaced
from fastaxis.studies.fault.mistakes import Mistake, met, mistakes
from fastaxis.studies.fault.watching import Watch

__all__ = ["FaultReport", "Suspect", "find_fault", "suspects"]

LEAST = math.radians(0.05)  # half a step of the values tried
EXPLAINS = 0.9  # of the declared misfit; a value fitted to frames of something else gains a few percent by chance
DARK = 1e-5  # of the light: a frame 50 dB down drowns in what real analyzers leak
FURTHER = (*SIX_STATES, *(linear(math.radians(angle)) for angle in range(15, 180, 15) if angle % 45))


@dataclass(frozen=True, eq=False)
class Suspect:
    """One mistake and how well it explains what was seen.

    Parameters
    ----------
    words : what would be wrong.
    misfit : of the train with it; 0 explains everything.
    train : with the mistake.
    off : how far a fitted value is from the declared one [rad]; 0 where nothing was fitted.
    """

    words: str
    misfit: float
    train: Any = field(repr=False)
    off: float = 0.0


def suspects(train: Any, watch: Watch) -> list[Suspect]:
    """All single mistakes, the one that explains best first; among equals those with nothing to fit come first."""
    found = [suspect for mistake in mistakes(train, watch.target) for suspect in _tried(train, mistake, watch)]
    return sorted(found, key=lambda suspect: suspect.misfit)


def _tried(train: Any, mistake: Mistake, watch: Watch) -> Iterator[Suspect]:
    if not mistake.knob:
        yield Suspect(mistake.words, watch.of(mistake.train), mistake.train)
        return
    misfits = watch.along(mistake)
    if misfits is None:
        return
    value = float(mistake.values[_nearest(misfits, np.abs(mistake.values - mistake.nominal))])
    if abs(value - mistake.nominal) < LEAST and mistake.train is train:
        return  # best where it was declared: no mistake
    words, changed = mistake.at(value)
    yield Suspect(words, float(np.nanmin(misfits)), changed, abs(value - mistake.nominal))


def _nearest(misfits: Any, distances: Any) -> int:
    """The best value; of several dips that are as deep, the one that is least off."""
    looked = np.flatnonzero(~np.isnan(misfits))
    found = misfits[looked]
    # Along a flat stretch every value is as deep as its neighbours. The sides of a dip are not: with noise they are
    # nearly as deep, and would draw the value towards the declared one.
    dips = looked[(found <= np.append(found[1:], np.inf)) & (found <= np.insert(found[:-1], 0, np.inf))]
    best = np.nanmin(misfits)
    # A tenth of a degree changes a frame by 1e-3 or more where its angle matters; less than a tenth of that is no
    # reason to prefer a value that is further off.
    alike = dips[misfits[dips] <= best + 1e-4 * max(1.0, abs(best))]
    return int(alike[np.argmin(distances[alike])])


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


def find_fault(
    train: Any, frames: Any, settings: Iterable[Any], *, target: str | None = None, noise: float = 0.01
) -> FaultReport:
    """Rank single mistakes by how well they reproduce recorded frames.

    Each mistake of the usual list is made on the train: axes swapped, signs, a plate a few degrees off, detuned, of
    another q or charge, a half-wave plate for a quarter-wave plate, two parts in each other's place, a part beside its
    place, left out or left in, a mirror too many, the hand of the source. The scale common to all frames is free, since
    a camera's watts are seldom known.

    Places are fitted only where no other mistake explains the frames within the noise. A fitted angle is the best of
    steps of 0.1 deg, a fitted place that of least squares: noise scatters them about the true value.

    Parameters
    ----------
    train : as declared.
    frames : recorded, (settings, ny, nx); powers (settings,) of a detector.
    settings : of the frames.
    target : camera or detector; the only camera if left out.
    noise : relative difference of frames that counts as none, zero or more.

    Returns
    -------
    FaultReport : ``.ranking``, ``.ties``, ``.separating()``.

    Raises
    ------
    ParameterError : no target named and not just one camera; frames of another number or shape, of no light, or with
        something else than finite numbers; noise that is negative or no number.
    """
    slack = _noise(noise)
    camera = _target(train, target)
    analyzers = as_settings(tuple(settings))
    recorded = _recorded(frames, expose(train, camera, analyzers).frames.shape)
    whole = float(np.sqrt((recorded**2).sum()))

    def misfit(shots: Any) -> float:
        seen = shots.frames
        power = float((seen**2).sum())
        scale = float((seen * recorded).sum()) / power if power else 0.0
        return float(np.sqrt(((recorded - scale * seen) ** 2).sum())) / whole

    watch = Watch(camera, misfit, "shots", analyzers)
    declared = Suspect("as declared", watch.of(train), train)
    found = suspects(train, watch)
    # Two numbers fitted to a picture make many a difference smaller: they are tried where nothing simpler serves.
    if recorded[0].size > 1 and all(one.misfit > slack for one in (declared, *found)):
        moved = displaced(train, met(train, camera), lambda bench: watch.look(bench).frames, recorded)
        found += [Suspect(words, watch.of(bench), bench) for words, bench in moved]
    ranking = tuple(sorted(found, key=lambda suspect: suspect.misfit))
    return FaultReport(declared, ranking, camera, analyzers, slack)


def _noise(noise: Any) -> float:
    found = number("find_fault", "noise", noise, fix="noise=0.01")
    if not found >= 0:
        raise ParameterError(
            "noise is the relative difference of frames that counts as none, zero or more",
            got=f"find_fault: noise = {found:g}",
            fix="noise=0.01",
        )
    return float(found)


def _recorded(frames: Any, shape: tuple[int, ...]) -> Any:
    """Frames as an array of that shape, scaled to 1 at the brightest pixel."""

    def refuse(rule: str, got: str) -> ParameterError:
        return ParameterError(rule, got=f"find_fault: {got}", fix="train.find_fault(shots.frames, shots.settings)")

    try:
        recorded = np.asarray(frames, float)
    except (TypeError, ValueError):
        raise refuse("frames are an array of numbers", type(frames).__name__) from None
    recorded = recorded[:, None, None] if recorded.ndim == 1 else recorded
    if recorded.shape != shape:
        raise refuse(f"there is a frame of the camera for each setting: {shape}", f"frames of shape {recorded.shape}")
    if not np.isfinite(recorded).all():
        raise refuse("frames hold finite numbers only", f"{np.count_nonzero(~np.isfinite(recorded))} that are not")
    if not recorded.any():
        raise refuse("frames without light could be of any bench", "all frames zero")
    return recorded / np.abs(recorded).max()


def _target(train: Any, target: str | None) -> str:
    known: Sequence[str] = train.cameras
    if target is None and len(known) != 1:
        raise ParameterError(
            "the frames belong to one camera or detector",
            got=f"find_fault: cameras {', '.join(known) or '(none)'}",
            fix=f'target="{known[0] if known else "meter"}"',
        )
    return target or known[0]
