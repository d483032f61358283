"""What a failing assertion says: expected, got, and the single mistake that would explain it."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any

from fastaxis.errors import FastaxisError
from fastaxis.studies.fault import Suspect, Watch, suspects

__all__ = ["BenchError", "Claim", "blame", "hold"]

NAMED = 4  # explanations told; of more, the rest is a number


class BenchError(AssertionError):
    """A bench is not as it should be.

    Parameters
    ----------
    where : name of the train, and port.
    expected, got : in lab terms.
    cause : the likely cause, in words.
    frames : pictures to look at, name -> (ny, nx).
    """

    def __init__(
        self, where: str, *, expected: str, got: str, cause: str, frames: Mapping[str, Any] | None = None
    ) -> None:
        self.where, self.expected, self.got, self.cause = where, expected, got, cause
        self.frames = dict(frames or {})
        super().__init__(f"{where}\n  expected: {expected}\n  got: {got}\n  likely cause: {cause}")

    def __reduce__(self) -> tuple[object, ...]:
        # Exceptions with keyword-only arguments do not survive a process pool without help.
        return (_rebuild, (self.where, self.expected, self.got, self.cause, self.frames))


def _rebuild(where: str, expected: str, got: str, cause: str, frames: Mapping[str, Any]) -> BenchError:
    return BenchError(where, expected=expected, got=got, cause=cause, frames=frames)


@dataclass(frozen=True, eq=False)
class Claim:
    """Something that should hold of a train.

    Parameters
    ----------
    target : camera, detector or port.
    expected : in words.
    told : what was got, in words, of what is seen.
    misfit : of what is seen: 0 is perfect, up to 1 holds.
    kind : what is seen, as in :class:`fastaxis.studies.fault.Watch`.
    settings : of the frames.
    frames : pictures of what is seen that are worth looking at.
    """

    target: str
    expected: str
    told: Callable[[Any], str]
    misfit: Callable[[Any], float]
    kind: str = "stokes"
    settings: tuple[Any, ...] = ()
    frames: Mapping[str, Any] = field(default_factory=dict)


def hold(train: Any, claim: Claim) -> None:
    """Raise a BenchError unless the claim holds."""
    watch = Watch(claim.target, claim.misfit, claim.kind, claim.settings)
    seen = watch.look(train)
    if claim.misfit(seen) <= 1:  # nan does not hold
        return
    shown = {f"got, {label}": frame for label, frame in _pictures(claim, seen)}
    raise BenchError(
        f"{train.name}: {claim.target}",
        expected=claim.expected,
        got=claim.told(seen),
        cause=blame(train, watch),
        frames={**claim.frames, **shown},
    )


def _pictures(claim: Claim, seen: Any) -> list[tuple[str, Any]]:
    return list(zip(seen.labels, seen.frames, strict=True)) if claim.kind == "shots" else []


def blame(train: Any, watch: Watch) -> str:
    """The single mistakes with which a train would do as expected, in words."""
    try:
        found = [one for one in suspects(train, watch) if one.misfit <= 1]
    except FastaxisError as error:
        return f"not looked for: {error}"
    if not found:
        # Each value of a knob would be a propagation of its own.
        untried = "; errors of angles and retardances by degrees were not tried" if watch.kind == "train" else ""
        return f"no single mistake of the usual list explains it{untried}"
    told = "; or ".join(one.words for one in _likeliest(found)[:NAMED])
    more = len(found) - NAMED
    return f"{told}; or {more} more" if more > 0 else told


def _likeliest(found: list[Suspect]) -> list[Suspect]:
    """Mistakes that are made whole before those that are made by degrees; each in the order of the light path."""
    return sorted(found, key=lambda one: round(one.off, 6))
