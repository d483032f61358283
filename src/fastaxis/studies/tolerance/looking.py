"""Everything a study looks at beside its draws: slopes, what each error does alone, and the worst corners."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.studies.tolerance.causes import Causes
from fastaxis.studies.tolerance.choosing import Chosen, Wish, chosen
from fastaxis.studies.tolerance.merits import Merit
from fastaxis.studies.tolerance.preparing import anew, prepared
from fastaxis.studies.tolerance.reading import Reading, readings
from fastaxis.studies.tolerance.result import Range
from fastaxis.studies.tolerance.slopes import (
    Answer,
    Slope,
    answer_rows,
    answers,
    difference,
    difference_rows,
    exact_slopes,
)
from fastaxis.studies.tolerance.surface import Surface
from fastaxis.studies.tolerance.working import Work

__all__ = ["Looked"]

Reals: TypeAlias = NDArray[np.float64]


class Looked:
    """The figures of merit of a study, those of one light together.

    Parameters
    ----------
    train, causes : of the study.
    merits : what is read.
    offsets : (draws, parameters).
    options : grid and engine.
    accuracy, seed : of a response surface, and of the study.
    """

    def __init__(
        self,
        train: Any,
        causes: Causes,
        merits: Sequence[Merit],
        offsets: Reals,
        *,
        options: dict[str, Any],
        accuracy: float,
        seed: int,
    ) -> None:
        self._train, self._causes, self._options = train, causes, options
        self._widths = _widths(causes)
        self._alone, self._apart = answer_rows(causes), difference_rows(self._widths)
        rows = np.concatenate([self._alone, self._apart, offsets])
        wish = Wish(accuracy, len(self._alone) + len(self._apart), seed)
        count = len(merits)
        self.nominal: list[float] = [np.nan] * count
        self.answers: list[tuple[Answer, ...]] = [()] * count
        self.slopes: list[dict[str, Slope]] = [{}] * count
        self.worst: list[Range] = [Range(np.nan, np.nan)] * count
        self.surfaces: list[Surface | None] = [None] * count
        self.draws: list[Work] = []
        for reading in readings(merits):
            for one in chosen(train, causes, rows, reading, options=options, wish=wish):
                self._look(one)
                self.draws.append(one.work.rows(slice(wish.first, None)))

    def _look(self, one: Chosen) -> None:
        """Read all but the draws."""
        reading, work = one.work.reading, one.work
        alone = work.rows(slice(0, len(self._alone))).values()
        corners = []
        exact = exact_slopes(self._train, self._causes, reading, self._options)
        by_steps = self._differences(one, exact)
        for place, column in enumerate(reading.columns):
            self.answers[column] = answers(self._causes, alone[:, place])
            self.slopes[column] = by_steps[place]
            self.surfaces[column] = one.surfaces[place]
            corners += _corners(self._causes, self.answers[column])
        ends = self._exactly(np.array(corners), reading, one)
        for place, column in enumerate(reading.columns):
            pair = ends[2 * place : 2 * place + 2, place]
            self.worst[column] = Range(float(pair.min()), float(pair.max()))
        start = alone[0]
        if any(surface is not None and surface.used for surface in one.surfaces):
            start = self._exactly(self._alone[:1], reading, one)[0]
        for place, column in enumerate(reading.columns):
            self.nominal[column] = float(start[place])

    def _exactly(self, offsets: Reals, reading: Reading, one: Chosen) -> Reals:
        """Values at a few rows, without a surface."""
        make = anew if any(one.surfaces) or reading.kind == "train" else prepared
        return make(self._train, self._causes, offsets, reading, self._options).values()

    def _differences(self, one: Chosen, exact: Sequence[dict[str, Slope]]) -> list[dict[str, Slope]]:
        """Slopes, by differences where they are not known exactly."""
        names = self._causes.names
        rest = [k for k, name in enumerate(names) if any(name not in slopes for slopes in exact)]
        values = {k: self._four(one, k) for k in rest}
        out = []
        for place, slopes in enumerate(exact):
            stepped = {names[k]: difference(four[:, place], self._widths[k]) for k, four in values.items()}
            out.append({name: slopes.get(name) or stepped[name] for name in names})
        return out

    def _four(self, one: Chosen, parameter: int) -> Reals:
        """The figures of merit at the four steps of one parameter."""
        start = 4 * parameter
        surfaces = [surface for surface in one.surfaces if surface is not None and surface.used]
        # A surface is good to a share of the spread, which a slope over a part of it is not.
        if surfaces and self._causes.names[parameter] in surfaces[0].parameters:
            return self._exactly(self._apart[start : start + 4], one.work.reading, one)
        first = len(self._alone) + start
        return one.work.rows(slice(first, first + 4)).values()


def _widths(causes: Causes) -> Reals:
    """Standard deviation of each parameter."""
    sigmas = np.array([error.sigma for error in causes.errors])
    return np.asarray(np.sqrt(((causes.directions * sigmas[:, None]) ** 2).sum(axis=0)))


def _corners(causes: Causes, each: tuple[Answer, ...]) -> list[Reals]:
    """The offsets that give the least and the most by slope and curvature."""
    corners = []
    for sign in (-1, 1):
        sizes = []
        for error, answer in zip(causes.errors, each, strict=True):
            tried = (0.0, error.limit, -error.limit)
            sizes.append(max(tried, key=lambda size, a=answer: sign * a.shift(size)))  # type: ignore[misc]  # default binds a
        corners.append(np.array(sizes) @ causes.directions)
    return corners
