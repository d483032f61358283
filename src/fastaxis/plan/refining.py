"""Samples made finer until a singular axis or an edge is drawn well enough."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

from fastaxis.plan.sampling import Sampling, turned_at

__all__ = ["LARGE", "LENGTHS", "SLACK", "Asked", "refined"]

# Lengths with small prime factors, for the transform; smooth beams start at the first, rough ones at 1024.
LENGTHS = (256, 320, 384, 512, 640, 768, 1024, 1280, 1536, 2048, 3072, 4096)
LARGE = (6144, 8192, 12288, 16384)  # not taken unasked; named where nothing smaller will do
ROUNDS = 6  # finer samples may change how the light travels, and so what is asked next
SLACK = 1 + 1e-9  # of what is rounded


@dataclass(frozen=True)
class Asked:
    """The pitch that a step asks for in its plane [m]."""

    step: int
    pitch: float

    def over(self, sampling: Sampling) -> float:
        """The pitch there is over the one asked for."""
        return sampling.planes[self.step + 1].pitch / self.pitch


def refined(
    sampling: Sampling,
    again: Callable[[int, float], Sampling],
    asked: Callable[[Sampling], Iterator[Asked]],
    most: int,
    fits: Callable[[Sampling], bool] = lambda _: False,
) -> Sampling | None:
    """A sampling with as many samples more as all steps ask for; None if that is more than ``most``.

    Finer samples at the source, on the same window, make the pitch smaller; behind an odd number of single transforms
    a wider window does.

    Parameters
    ----------
    again : the sampling for another number of samples and window.
    asked : what the steps ask for.
    fits : whether a sampling holds the light otherwise; a window may then be wider without more samples.
    """
    for _ in range(ROUNDS):
        fine = wide = 1.0
        for one in asked(sampling):
            over = one.over(sampling)
            if turned_at(sampling.planes, one.step + 1):
                wide = max(wide, over)
            else:
                fine = max(fine, over)
        if fine * wide <= SLACK:
            return sampling
        if fine <= SLACK:
            wider = again(sampling.grid.samples, sampling.grid.window * wide * SLACK)
            if fits(wider) and all(one.over(wider) <= SLACK for one in asked(wider)):
                return wider
        wanted = sampling.grid.samples * fine * wide / SLACK
        length = next((n for n in LENGTHS + LARGE if n >= wanted), None)
        if length is None or length > most:
            return None
        # What rounding up leaves over goes into the pitch.
        sampling = again(length, sampling.grid.window * wide)
    return None
