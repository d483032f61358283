"""From rows of errors to the work of reading figures of merit: what it takes in propagations is done here."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import sensor_at
from fastaxis.engines.combining import combined, combines
from fastaxis.engines.sharing import Relay
from fastaxis.light import muellers
from fastaxis.plan import make_plan
from fastaxis.studies.spanning import Span, spanning, squares
from fastaxis.studies.tolerance.chain import Chain, make_chain
from fastaxis.studies.tolerance.condensing import condensed
from fastaxis.studies.tolerance.reading import Reading, seen
from fastaxis.studies.tolerance.working import Anew, Summed, Work

__all__ = ["Pictures", "Rows", "anew", "fewer", "prepared", "rows_of", "summed"]

Reals: TypeAlias = NDArray[np.float64]

TURNS = (5, 9, 17)  # readings that tell a turned plate met once, twice, four times
SAME = 1e-11  # of the largest power: a few dozen products of numbers good to 1e-14


@dataclass(frozen=True, eq=False)
class Rows:
    """Values of parameters, a row for each step of a knob at each draw.

    Parameters
    ----------
    names : "part.parameter".
    values : (draws * steps, names).
    """

    names: tuple[str, ...]
    values: Reals = field(repr=False)

    def only(self, names: Sequence[str]) -> Rows:
        """Some of the parameters."""
        return Rows(tuple(names), self.values[:, [self.names.index(name) for name in names]])


def rows_of(train: Any, causes: Any, offsets: Reals, reading: Reading) -> Rows:
    """The values of all parameters at each draw and step; the knob is among them."""
    names, nominal = causes.names, list(causes.nominal.values())
    if reading.knob and reading.knob not in names:
        part, _, parameter = reading.knob.partition(".")
        names, nominal = (*names, reading.knob), [*nominal, float(train.elements[part].parameters()[parameter])]
        offsets = np.hstack([offsets, np.zeros((len(offsets), 1))])
    values = np.repeat(offsets + np.array(nominal), len(reading.steps), axis=0)
    if reading.knob:
        values[:, names.index(reading.knob)] += np.tile(reading.steps, len(offsets))
    return Rows(names, values)


def anew(train: Any, causes: Any, offsets: Reals, reading: Reading, options: dict[str, Any]) -> Anew:
    """Every draw for itself."""
    return Anew(reading, train.copy(), tuple(causes.changes(row) for row in offsets), options)


def prepared(train: Any, causes: Any, offsets: Reals, reading: Reading, options: dict[str, Any]) -> Work:
    """Sums where the errors move polarization alone; else every draw for itself."""
    found = summed(train, causes, offsets, reading, options) if reading.kind != "train" else None
    return found or anew(train, causes, offsets, reading, options)


def summed(train: Any, causes: Any, offsets: Reals, reading: Reading, options: dict[str, Any]) -> Summed | None:
    """Sums of a few pictures; None where the errors move more than polarization."""
    few = fewer(train, causes, offsets, reading, options)
    return _at_every_step(train, causes, offsets, few, options)


def _at_every_step(train: Any, causes: Any, offsets: Reals, reading: Reading, options: dict[str, Any]) -> Summed | None:
    rows = rows_of(train, causes, offsets, reading)
    chain = make_chain(train, reading.target, rows.names, rows.values)
    return None if chain is None else Pictures(train, reading, rows, chain, options).summed()


def fewer(train: Any, causes: Any, offsets: Reals, reading: Reading, options: dict[str, Any]) -> Reading:
    """A reading with as few steps of its knob as tell the same, as three of the draws show."""
    three = offsets[[0, len(offsets) // 2, -1]]
    whole = _at_every_step(train, causes, three, reading, options) if len(reading.steps) > min(TURNS) else None
    for count in TURNS if whole is not None else ():
        few = condensed(reading, count)
        found = _at_every_step(train, causes, three, few, options)
        if count < len(reading.steps) and whole is not None and found is not None and _agree(whole, found):
            return few
    return reading


def _agree(whole: Summed, few: Summed) -> bool:
    """Whether the light as reduced is the same."""
    for one, other in zip(whole.reading.merits, few.reading.merits, strict=True):
        exact, found = (
            work.stokes().reshape(len(work.shares), -1) @ m.rows.T for work, m in ((whole, one), (few, other))
        )
        if np.abs(exact - found).max() > SAME * max(float(np.abs(exact).max()), 1e-300):
            return False
    return True


class Pictures:
    """The few pictures that the light of all rows is summed of, in front of the last uniform parts.

    Parameters
    ----------
    train : as declared.
    reading : what is read.
    rows : parameters that move polarization alone.
    chain : how the light answers to them.
    options : grid and engine.
    """

    def __init__(self, train: Any, reading: Reading, rows: Rows, chain: Chain, options: dict[str, Any]) -> None:
        self.reading, self.rows, self.chain, self.options = reading, rows, chain, options
        self.bare = chain.stripped(train)
        self.kept = [k for k, name in enumerate(rows.names) if name.partition(".")[0] not in chain.removed]
        self.fields: Span = spanning(chain.fields)
        self.pictures: Span = spanning(squares(self.fields.coefficients))

    def _at(self, row: int, further: dict[str, float]) -> Any:
        own = {self.rows.names[k]: float(self.rows.values[row, k]) for k in self.kept}
        return self.bare.with_changes({**own, **further})

    def _plan(self, train: Any) -> Any:
        return make_plan(train, self.reading.target, power_only=self.reading.kind == "powers", **self.options)

    def _sums(self, further: dict[str, float]) -> bool:
        """Whether pictures are made of sums of fields."""
        train = self._at(int(self.fields.nodes[0]), further)
        powers = self.reading.kind == "powers"
        return combines(
            self._plan(train).engine, totals=powers or not hasattr(sensor_at(train, self.reading.target), "pixel")
        )

    def count(self, further: dict[str, float]) -> int:
        """How many propagations they take."""
        return (self.fields if self._sums(further) else self.pictures).rank

    def taken(self, further: dict[str, float]) -> tuple[Reals, Any, Any]:
        """(images (4, pictures, ny, nx), columns, rows) with further changes made."""
        sums, reading = self._sums(further), self.reading
        trains = [self._at(int(row), further) for row in (self.fields if sums else self.pictures).nodes]
        plans = [self._plan(train) for train in trains]
        lights = list(Relay().propagate(plans))
        if sums:
            weights = [self.fields.coefficients[row] for row in self.pictures.nodes]
            lights = [combined(plans[0].engine, lights, one) for one in weights]
            trains = [trains[0]] * len(lights)
        found = [seen(each, reading.target, reading.kind, light) for each, light in zip(trains, lights, strict=True)]
        return np.stack([stokes for stokes, _, _ in found], axis=1), found[0][1], found[0][2]

    def by_draw(self, table: Reals) -> Reals:
        """(rows, ...) -> (draws, steps, ...)."""
        steps = len(self.reading.steps)
        return np.asarray(table.reshape(-1, steps, *table.shape[1:]))

    @property
    def shares(self) -> Reals:
        """What each draw and step takes of each picture, (draws, steps, pictures)."""
        return self.by_draw(self.pictures.coefficients)

    @property
    def last(self) -> Reals:
        """Mueller matrices of the last uniform parts, (draws, steps, 4, 4)."""
        return self.by_draw(np.broadcast_to(muellers(self.chain.last), (len(self.rows.values), 4, 4)))

    def summed(self) -> Summed:
        """All draws, nothing else being changed."""
        images, x, y = self.taken({})
        flat = images.reshape(*images.shape[:2], -1)
        return Summed(self.reading, flat, self.shares, self.last, None, images.shape[2:], x, y)
