"""What is looked at on a train and on trains with mistakes: powers at a port, frames, or the train itself."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import expose
from fastaxis.errors import FastaxisError
from fastaxis.studies.fault.mistakes import Mistake
from fastaxis.studies.sweep import sweep
from fastaxis.studies.tolerance.causes import read_causes
from fastaxis.studies.tolerance.distributions import normal
from fastaxis.studies.tolerance.merits import power_at
from fastaxis.studies.tolerance.preparing import summed
from fastaxis.studies.tolerance.reading import light_at, readings

__all__ = ["Watch"]

Reals: TypeAlias = NDArray[np.float64]
COARSE = 50  # values of a knob between two first looks: 5 deg
WORST = 1e9  # for a train that cannot be asked


@dataclass(frozen=True, eq=False)
class Watch:
    """A question to a train with a number as its answer: 0 is perfect, up to 1 is good.

    Parameters
    ----------
    target : camera, detector or port.
    misfit : of what is seen: Stokes powers (4,) [W] of all the light for "stokes", an Exposure for "shots", the train
        for "train".
    kind : what is seen.
    settings : of the exposure.
    """

    target: str
    misfit: Callable[[Any], float]
    kind: str
    settings: tuple[Any, ...] = field(default=(), repr=False)

    def look(self, train: Any) -> Any:
        """What is seen of a train."""
        if self.kind == "stokes":
            return light_at(train, self.target, "powers", {})[0].sum(axis=(1, 2))
        return expose(train, self.target, self.settings) if self.kind == "shots" else train

    def of(self, train: Any) -> float:
        """The misfit of a train; a large number if it cannot be asked."""
        try:
            found = float(self.misfit(self.look(train)))
        except FastaxisError:
            return WORST
        return found if np.isfinite(found) else WORST

    def along(self, mistake: Mistake) -> Reals | None:
        """The misfit at the values of a knob, nan where it was not looked; None if that takes too long."""
        try:
            seen = self._seen(mistake)
        except FastaxisError:
            return None
        if seen is None:
            return None
        out = np.full(len(mistake.values), np.nan)
        for index in range(0, len(out), COARSE if self.kind == "shots" else 1):
            out[index] = self._score(seen, index)
        if self.kind == "shots":
            for dip in _dips(out):
                self._refine(seen, out, dip)
        return out

    def _refine(self, seen: Callable[[int], Any], out: Reals, best: int) -> None:
        """Look closer around a value: at every degree, then at every tenth."""
        for step in (10, 1):
            around = range(max(best - 5 * step, 0), min(best + 5 * step + 1, len(out)), step)
            for index in around:
                if np.isnan(out[index]):
                    out[index] = self._score(seen, index)
            best = min(around, key=out.__getitem__)

    def _score(self, seen: Callable[[int], Any], index: int) -> float:
        try:
            found = float(self.misfit(seen(index)))
        except FastaxisError:
            return WORST
        return found if np.isfinite(found) else WORST

    def _seen(self, mistake: Mistake) -> Callable[[int], Any] | None:
        """What is seen at each value of a knob the light is linear in."""
        if self.kind == "stokes":
            causes = read_causes(mistake.train, {mistake.knob: normal(0.0)})
            offsets = (mistake.values - mistake.nominal)[:, None]
            (reading,) = readings([power_at(self.target)])
            work = summed(mistake.train, causes, offsets, reading, {"grid": None, "engine": "auto"})
            return None if work is None else work.stokes()[:, 0].__getitem__
        if self.kind == "shots":
            swept = sweep(mistake.train, {mistake.knob: mistake.values}, self.target, self.settings)
            return swept.exposure if not swept.gallery.stiff else None
        return None


def _dips(out: Reals) -> list[int]:
    """Where a first look found less than on both sides, at most four places: a plate repeats after a quarter turn."""
    looked = np.flatnonzero(~np.isnan(out))
    first = out[looked]
    low = (first <= np.append(first[1:], np.inf)) & (first <= np.insert(first[:-1], 0, np.inf))
    places = looked[low]
    return [int(place) for place in places[np.argsort(out[places], kind="stable")][:4]]
