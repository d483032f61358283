"""How often the light was reflected on its way to a camera, in words."""

from __future__ import annotations

from typing import Any

from fastaxis.errors import FastaxisError
from fastaxis.plan.loops import reflections_round

__all__ = ["reflections_in_words"]


def reflections_in_words(train: Any, target: str) -> str:
    """How often the light was reflected on the way, and whether the picture arrives mirrored.

    Of several paths each number is given once; of light that goes round, those of the first way and of each trip.
    """
    try:
        counts, trip = [route.reflections for route in train.routes(target)], reflections_round(train, target)
    except FastaxisError:
        return "light by many paths"
    first = _times(sorted(set(counts)))
    if trip is None:
        paths = "" if len(counts) == 1 else f"{len(counts)} paths: "
        return f"{paths}{first}{'; ' if paths else ': '}{_seen(counts)}"
    if not trip:
        return f"round and round: at first {first}"
    seen = "upright and mirrored in turn" if any(count % 2 for count in trip) else _seen(counts)
    return f"round and round: {first}, {_listed(sorted(trip))} more each trip; {seen}"


def _times(numbers: list[int]) -> str:
    if numbers == [0]:
        return "no reflection"
    return f"{_listed(numbers)} reflection{'' if numbers == [1] else 's'}"


def _listed(numbers: list[int]) -> str:
    return " or ".join(map(str, numbers)) if len(numbers) < 4 else f"{numbers[0]} to {numbers[-1]}"


def _seen(counts: list[int]) -> str:
    mirrored = sum(count % 2 for count in counts)
    return "upright" if not mirrored else "mirrored" if mirrored == len(counts) else f"{mirrored} of them mirrored"
