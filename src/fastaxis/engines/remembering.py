"""Light of earlier questions: a branch goes on from the last step up to which it is one that was asked about before.

What two questions have in common shows at the second one; its light there is kept for the third. So nothing is copied
for a question that stays the only one of its kind.
"""

from __future__ import annotations

from dataclasses import fields, replace
from typing import Any

from fastaxis.engines.content import content_of
from fastaxis.engines.memory import LIGHT
from fastaxis.laws import TravelLaw, Turn
from fastaxis.plan import Branch

__all__ = ["keys_of", "light_before", "size_of"]

APART = {"steps", "sampling", "group", "length", "line", "path", "opening"}
"""Of a branch: what is looked at step by step, and what is only said about it or counts where arms meet."""

PASSED = "passed"  # what stands for light that went through but was not kept
MARK = 256  # bytes that a key and this take

FEW = 4  # what takes this much less than the largest light kept may stay where room is needed


def keys_of(engine: str, branch: Branch, end: int) -> dict[int, bytes]:
    """What the light before each step depends on, for the first steps that are all data; {} for light without samples.

    That is the light it begins with, every step before with its samples, and whether a travel or a turn is the last
    one, for behind it light is looked at more closely, and singular points are left as they are.
    """
    sampling, first = branch.sampling, branch.harmonic_steps
    if sampling is None:
        return {}
    rest = [getattr(branch, f.name) for f in fields(branch) if f.name not in APART]
    samples = [getattr(sampling, f.name) for f in fields(sampling) if f.name != "planes"]
    laws = [step.law for step in branch.steps]
    last = max((i for i, law in enumerate(laws) if isinstance(law, TravelLaw | Turn)), default=0)
    key = content_of(engine, rest, samples, sampling.planes[0], laws[:first])
    keys = {}
    for index in range(first, end + 1):
        if key is None:
            break
        keys[index] = key
        if index < end:
            place = index - first + 1
            key = content_of(laws[index], sampling.planes[place : place + 1], index == last, after=key)
    return keys


def light_before(engine: Any, branch: Branch, end: int) -> Any:
    """Light before step ``end`` of a branch, the caller's own.

    Parameters
    ----------
    engine : a room with ``begun`` and ``continued``, as of sampled light.
    """
    start = branch.harmonic_steps
    if size_of(branch) > LIGHT.largest:
        LIGHT.clear(over=LIGHT.largest // FEW)  # light so large needs the room
        return engine.continued(engine.begun(branch), branch, start, end)
    keys = keys_of(engine.__name__, branch, end)
    known = {index: found for index, key in keys.items() if (found := LIGHT.get(key)) is not None}
    for index, key in keys.items():
        if index not in known:
            LIGHT.put(key, PASSED, MARK)
    kept = max((index for index, found in known.items() if found is not PASSED), default=None)
    light = engine.begun(branch) if kept is None else _copied(known[kept])
    here, common = start if kept is None else kept, max(known, default=start)
    if common > here or (known and kept is None):
        light, here = engine.continued(light, branch, here, common), common
        _keep(keys[common], light)
    return engine.continued(light, branch, here, end)


def size_of(branch: Branch) -> int:
    """Bytes of the samples of one component of a branch."""
    sampling = branch.sampling
    return sampling.grid.samples**2 * (8 if sampling.precision == "single" else 16) if sampling else 0


def _keep(key: bytes, light: Any) -> None:
    if light.samples.nbytes <= LIGHT.largest:
        kept = _copied(light)
        kept.samples.flags.writeable = False
        LIGHT.put(key, kept, kept.samples.nbytes + MARK)


def _copied(light: Any) -> Any:
    """Engines work in place; what is kept must outlive its use."""
    return replace(light, samples=light.samples.copy())
