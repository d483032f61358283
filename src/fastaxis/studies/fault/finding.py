"""The fault finder: recorded frames against those of every single mistake."""

from __future__ import annotations

from collections.abc import Iterable
from difflib import get_close_matches
from typing import Any

import numpy as np

from fastaxis.camera.exposing import expose
from fastaxis.camera.settings import as_settings
from fastaxis.checks import at_least
from fastaxis.elements import Camera, Detector
from fastaxis.errors import ParameterError
from fastaxis.studies.fault.centring import displaced
from fastaxis.studies.fault.mistakes import met
from fastaxis.studies.fault.ranked import FaultReport
from fastaxis.studies.fault.suspects import Suspect, suspects
from fastaxis.studies.fault.watching import Watch

__all__ = ["find_fault"]


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
    ParameterError : no target named and not just one camera; a target that is no camera or detector; frames of another
        number or shape, of no light, or with something else than finite numbers; noise that is negative or no number.
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
    rule = "noise is the relative difference of frames that counts as none, zero or more"
    return at_least("find_fault", "noise", noise, 0.0, fix="noise=0.01", rule=rule)


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
    if target is None and len(train.cameras) == 1:
        return str(train.cameras[0])
    known = [name for name, element in train.elements.items() if isinstance(element, Camera | Detector)]
    if not isinstance(target, str) or target.partition(".")[0] not in known:
        asked = "" if target is None else f"target = {target!r}; "
        likely = (*get_close_matches(str(target), known, 1), *train.cameras, *known, "meter")[0]
        raise ParameterError(
            "the frames belong to one camera or detector",
            got=f"find_fault: {asked}cameras and detectors: {', '.join(known) or '(none)'}",
            fix=f'target="{likely}"',
        )
    return target
