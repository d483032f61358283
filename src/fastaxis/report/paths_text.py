"""How often the light was reflected on its way to a camera, in words."""

from __future__ import annotations

from typing import Any

from fastaxis.errors import FastaxisError

__all__ = ["reflections_in_words"]


def reflections_in_words(train: Any, target: str) -> str:
    """How often the light was reflected on the way, and whether the picture arrives mirrored.

    Of several paths each number is given once; light that runs round a cavity counts without whole round trips.
    """
    try:
        counts = [route.reflections for route in train.routes(target)]
    except FastaxisError:
        return "light by many paths"
    if len(counts) == 1:
        times = "no reflection" if counts[0] == 0 else f"{counts[0]} reflection{'s' if counts[0] > 1 else ''}"
        return f"{times}: {'mirrored' if counts[0] % 2 else 'upright'}"
    mirrored = sum(count % 2 for count in counts)
    seen = "upright" if not mirrored else "mirrored" if mirrored == len(counts) else f"{mirrored} of them mirrored"
    numbers = sorted(set(counts))
    listed = " or ".join(map(str, numbers)) if len(numbers) < 4 else f"{numbers[0]} to {numbers[-1]}"
    return f"{len(counts)} paths: {listed} reflections; {seen}"
