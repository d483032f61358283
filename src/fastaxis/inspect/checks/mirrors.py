"""Mirrors, splitters and prisms that change the polarization they were meant to keep."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from fastaxis.elements.polarizing_beam_splitter import PolarizingBeamSplitter
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import state_in_words, total
from fastaxis.inspect.words import percent
from fastaxis.laws import Flip, Turn

__all__ = ["mirrors", "wrong_share"]


def mirrors(bench: Bench) -> Iterator[Finding]:
    """Overlap of the reflected state with that behind an ideal mirror, which only changes its hand."""
    for visit in bench.visits:
        # A polarizing splitter is there to change the state.
        if visit.patterned or isinstance(visit.element, PolarizingBeamSplitter) or not bench.lit(visit):
            continue
        # So is a prism that turns the picture.
        turning = any(isinstance(law, Turn) for law in visit.laws)
        if turning or sum(isinstance(law, Flip) for law in visit.laws) % 2 == 0:
            continue
        lost = wrong_share(visit)
        if lost > 1e-3:
            yield Finding(
                severity=Severity.MEDIUM,
                check="mirror polarization",
                element=visit.name,
                rule="a real mirror keeps the state of light along or across its plane of incidence only",
                got=f"{visit.name}: {state_in_words(visit.before)} leaves as {state_in_words(visit.after)}, "
                f"{percent(lost)} in the wrong state",
                fix="turn the light to 0 or 90 deg before it, or undo the change with a plate behind it",
            )


def wrong_share(visit: Visit) -> float:
    """Share of the light in the state orthogonal to the one behind an ideal mirror; 0 for light that is not pure.

    Behind an ideal mirror S2 and S3 have changed their sign, in a fold of either plane.
    """
    before, after = total(visit.before), total(visit.after)
    if after[0] <= 0:
        return 0.0
    ideal = np.array([before[1], -before[2], -before[3]]) / before[0]
    pure = float(1 - ideal @ ideal) < 1e-9
    return float(1 - after[1:] @ ideal / after[0]) / 2 if pure else 0.0
