"""Mirrors and splitters that change the polarization they were meant to keep."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from fastaxis.elements.beam_splitter import BeamSplitter
from fastaxis.elements.mirror import Mirror
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import state_in_words, total
from fastaxis.inspect.words import percent

__all__ = ["mirrors"]


def mirrors(bench: Bench) -> Iterator[Finding]:
    """Overlap of the reflected state with that behind an ideal mirror, which only changes its hand."""
    for visit in bench.of_kind(Mirror, BeamSplitter):
        reflected = len(visit.flips) and any(type(law).__name__ == "Flip" for law in visit.laws)
        if not reflected or visit.patterned:
            continue
        before, after = total(visit.before), total(visit.after)
        if after[0] <= 0:
            continue
        # Behind an ideal mirror S2 and S3 have changed their sign, in a fold of either plane.
        ideal = np.array([before[1], -before[2], -before[3]]) / before[0]
        lost = float(1 - after[1:] @ ideal / after[0]) / 2
        pure = float(1 - ideal @ ideal) < 1e-9
        if pure and lost > 1e-3:
            yield Finding(
                severity=Severity.MEDIUM,
                check="mirror polarization",
                element=visit.name,
                rule="a real mirror keeps the state of light along or across its plane of incidence only",
                got=f"{visit.name}: {state_in_words(visit.before)} leaves as {state_in_words(visit.after)}, "
                f"{percent(lost)} in the wrong state",
                fix="turn the light to 0 or 90 deg before it, or undo the change with a plate behind it",
            )
