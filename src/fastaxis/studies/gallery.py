"""The families of a sweep: which value belongs to which, and the pictures of the latest ones."""

from __future__ import annotations

import math
from collections import OrderedDict
from collections.abc import Callable
from functools import cached_property
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import sensor_at
from fastaxis.engines.sharing import Relay
from fastaxis.plan import make_plan
from fastaxis.studies.family import Family, make_family
from fastaxis.studies.knobs import Knobs
from fastaxis.studies.response import response
from fastaxis.studies.spanning import spanning, squares

__all__ = ["Gallery", "Progress"]

Reals: TypeAlias = NDArray[np.float64]
Indices: TypeAlias = NDArray[np.intp]
Progress: TypeAlias = Callable[[int, int], None]

KEPT = 256 << 20  # bytes of pictures of earlier families kept beside the latest one
MOST = 1 << 30  # bytes of pictures of one family


class Gallery:
    """Pictures for all values of a sweep, propagated when first looked at.

    Values that differ in parameters the field is linear in are one family; each combination of the other parameters
    has its own.

    Parameters
    ----------
    train, target, grid, engine : as in ``train.expose``.
    knobs : the parameters and their values.
    progress : called as progress(done, expected) after each propagation.
    """

    def __init__(
        self, train: Any, target: str, knobs: Knobs, *, grid: Any, engine: str, progress: Progress | None
    ) -> None:
        self.train, self.target, self.knobs = train, target, knobs
        self.propagations = 0
        self._options = {"grid": grid, "engine": engine}
        self._progress = progress
        self._relay = Relay()
        self._families: OrderedDict[int, Family] = OrderedDict()
        self._sums: dict[int, Reals] = {}
        self._first = self._answers_within(sensor_at(train, target))
        self.linear = list(self._first)
        self.stiff = [group for group in knobs.groups() if group not in self.linear]

    def _answers_within(self, sensor: Any) -> dict[tuple[str, ...], NDArray[np.complex128]]:
        """Groups of parameters the field is linear in, as far as the pictures of all of them fit in memory.

        Those left out, the ones with the fewest values first, are propagated value by value. The tables are those of
        the first family.
        """
        start = self.train.with_changes(self.knobs.at(0))
        make_plan(start, self.target, **self._options)  # refuses letters in the train, and a target without light
        answers = {group: response(start, self.target, self.knobs.only(group)) for group in self.knobs.groups()}
        linear = {group: answer for group, answer in answers.items() if answer is not None}
        counts = {group: spanning(squares(spanning(table).coefficients)).rank for group, table in linear.items()}
        while linear and 4 * 8 * math.prod(sensor.shape) * math.prod(counts[group] for group in linear) > MOST:
            del linear[min(linear, key=lambda group: len(self.knobs.only(group)))]
        return linear

    @cached_property
    def numbers(self) -> Indices:
        """The family of each value."""
        numbers = np.zeros(len(self.knobs), dtype=np.intp)
        for group in self.stiff:
            numbers = numbers * len(self.knobs.only(group)) + self.knobs.places(group)
        return numbers

    @cached_property
    def members(self) -> dict[int, Indices]:
        """The values of each family, in order."""
        order = np.argsort(self.numbers, kind="stable")
        found, starts = np.unique(self.numbers[order], return_index=True)
        return dict(zip(found.tolist(), np.split(order, starts[1:]), strict=True))

    @cached_property
    def _places(self) -> list[Indices]:
        return [self.knobs.places(group) for group in self.linear]

    def family(self, number: int) -> Family:
        """The pictures of a family, propagated unless they are at hand."""
        if number not in self._families:
            family = self._made(number)
            self._sums[number] = self.shares(family, self.members[number]) @ family.images.sum(axis=(2, 3)).T
            self._families[number] = family
            while len(self._families) > 1 and sum(f.images.nbytes for f in self._families.values()) > KEPT:
                self._families.popitem(last=False)
        self._families.move_to_end(number)
        return self._families[number]

    def _made(self, number: int) -> Family:
        changes = self.knobs.at(int(self.members[number][0]))
        fixed = {name: changes[name] for group in self.stiff for name in group}
        train, groups = self.train.with_changes(fixed), [self.knobs.only(group) for group in self.linear]
        return make_family(
            train,
            self.target,
            groups,
            list(self._first.values()) if number == 0 else [_table(train, self.target, group) for group in groups],
            relay=self._relay,
            done=self._moved_on,
            **self._options,
        )

    def _moved_on(self, count: int) -> None:
        self.propagations += 1
        if self._progress is not None:
            self._progress(self.propagations, max(self.propagations, count * len(self.members)))

    def shares(self, family: Family, indices: Indices) -> Reals:
        """What values of a family take of each of its pictures, shape (values, pictures)."""
        return family.shares([places[indices] for places in self._places], len(indices))

    @cached_property
    def total_stokes(self) -> Reals:
        """Stokes parameters of all light on the sensor [W], shape (values, 4)."""
        out = np.empty((len(self.knobs), 4))
        for number, indices in self.members.items():
            if number not in self._sums:
                self.family(number)
            out[indices] = self._sums[number]
        return out


def _table(train: Any, target: str, group: Knobs) -> NDArray[np.complex128]:
    """The answer to a group that is known to be linear."""
    table = response(train, target, group)
    assert table is not None
    return table
