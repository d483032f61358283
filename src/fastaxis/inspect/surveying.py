"""Following the light of all lasers through a train by second moments."""

from __future__ import annotations

import warnings
from collections.abc import Iterator
from dataclasses import dataclass, replace
from typing import Any

from fastaxis.engines.ledger import powers
from fastaxis.errors import FastaxisError
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.strands import Strand, start, through
from fastaxis.laws import TravelLaw
from fastaxis.plan.binding import bound

__all__ = ["survey"]

MOST = 2000  # visits; splitters in a row double the paths, and a bench of more has another trouble


def survey(train: Any) -> Bench:
    """The bench as the light meets it. Needs a train without letters or impossible joints."""
    visits: list[Visit] = []
    loops: list[str] = []
    for name in train.sources:
        laser = train.elements[name]
        source = bound(laser.source)
        strands = tuple(
            strand for part in source.components for strand in start(part, float(source.power), float(train.wavelength))
        )
        _Follower(train, name, visits, loops).follow((name, laser.exit or "out", "out"), strands, None, 0.0)
    ledger, obstacle = _ledger(train)
    return Bench(train, tuple(visits[:MOST]), ledger, len(visits) <= MOST, tuple(dict.fromkeys(loops)), obstacle)


def _ledger(train: Any) -> tuple[dict[tuple[str, str], float], FastaxisError | None]:
    """Exact watts at the ports; none, and why, where light cannot be sampled or paths cannot be joined."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # the sampling check tells of them, camera by camera
        try:
            return powers(train), None
        except FastaxisError as error:
            return {}, error


@dataclass
class _Follower:
    """Walks all paths from one laser and notes each part met."""

    train: Any
    source: str
    visits: list[Visit]
    loops: list[str]

    def follow(
        self, port: tuple[str, str, str], strands: tuple[Strand, ...], previous: Visit | None, distance: float
    ) -> None:
        graph, elements = self.train.graph, self.train.elements
        for entry in graph.successors(port):
            if len(self.visits) > MOST:
                return
            if previous is not None and any((v.name, v.entered) == entry[:2] for v in previous.chain()):
                self.loops.append(entry[0])
                continue
            here = Visit(elements[entry[0]], entry[1], "", (), strands, (), distance, previous, self.source)
            ways = list(graph.successors(entry))
            if not ways:
                self.visits.append(here)
            for leaving in ways:
                there = _passed(here, leaving[1], self.train)
                self.visits.append(there)
                ahead = distance + sum(float(law.path) for law in there.laws if isinstance(law, TravelLaw))
                self.follow(leaving, there.after, there, ahead)


def _passed(visit: Visit, left: str, train: Any) -> Visit:
    after = []
    for strand in visit.before:
        for law in _laws(visit, left, strand.wavelength):
            strand = through(strand, law)  # noqa: PLW2901  # one law after the other
        after.append(strand)
    laws = tuple(_laws(visit, left, float(train.wavelength)))
    return replace(visit, left=left, laws=laws, after=tuple(after))


def _laws(visit: Visit, left: str, wavelength: float) -> Iterator[Any]:
    passage = visit.element.passages(wavelength)[visit.entered, left]
    return (bound(law) for law in passage.steps())
