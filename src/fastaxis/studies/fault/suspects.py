"""Which single mistakes explain what is seen, and how well."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from fastaxis.studies.fault.mistakes import Mistake, mistakes
from fastaxis.studies.fault.watching import Watch

__all__ = ["Suspect", "suspects"]

LEAST = math.radians(0.05)  # half a step of the values tried


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
