"""Coordinates of parts from what is known about them: some share a row or a column, some stand before others."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field

__all__ = ["Axis", "Run"]

Run = tuple[str, str, float]
"""(part before, part behind, least distance) along one axis."""

CLOSE = 1e-9


@dataclass
class Axis:
    """One coordinate of all parts.

    Parameters
    ----------
    group : the part that stands for all those with the same coordinate, by name.
    runs : least distances that are kept.
    beams : those of the runs that are beams, which are drawn as short as possible.
    """

    group: dict[str, str]
    runs: list[Run] = field(default_factory=list)
    beams: list[tuple[str, str]] = field(default_factory=list)

    @classmethod
    def of(cls, names: Iterable[str]) -> Axis:
        return cls({name: name for name in names})

    def joined(self, one: str, other: str) -> Axis:
        """With one more pair at the same coordinate."""
        kept, old = self.group[one], self.group[other]
        group = {name: kept if held == old else held for name, held in self.group.items()}
        return Axis(group, list(self.runs), list(self.beams))

    def ordered(self, run: Run, *, beam: bool = False) -> Axis:
        """With one more part behind another."""
        return Axis(self.group, [*self.runs, run], [*self.beams, run[:2]] if beam else self.beams)

    def places(self) -> dict[str, float] | None:
        """Least coordinates from 0 up that keep all runs; None if they contradict each other."""
        group = self.group
        runs = [(group[before], group[behind], gap) for before, behind, gap in self.runs]
        found = dict.fromkeys(group.values(), 0.0)
        # Each round settles at least one more group, unless the runs contradict each other.
        for _ in range(len(found) + 1):
            settled = True
            for before, behind, gap in runs:
                if found[behind] < found[before] + gap - CLOSE:
                    found[behind], settled = found[before] + gap, False
            if settled:
                self._pull(found, runs)
                return {name: found[held] for name, held in group.items()}
        return None

    def _pull(self, found: dict[str, float], runs: list[Run]) -> None:
        """Move what has room towards the parts behind it, where that makes no beam longer."""
        ahead: dict[str, list[Run]] = {}
        for run in runs:
            ahead.setdefault(run[0], []).append(run)
        weight = dict.fromkeys(found, 0)
        for before, behind in self.beams:
            weight[self.group[before]] += 1
            weight[self.group[behind]] -= 1
        for name in sorted(ahead, key=lambda held: -found[held]):
            if weight[name] >= 0:
                found[name] = max(found[name], min(found[behind] - gap for _, behind, gap in ahead[name]))
