"""A surveyed bench: every part as the light meets it, and the watts at every port."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

from fastaxis.errors import FastaxisError
from fastaxis.inspect.strands import Strand, total
from fastaxis.laws import AxisLaw, Flip, ScalarLaw, TravelLaw

__all__ = ["DARK", "Bench", "Visit"]

DARK = 1e-9  # of the power of all lasers; an ideal port that should be dark is, to roundings


@dataclass(frozen=True, eq=False)
class Visit:
    """One part as the light meets it once.

    Parameters
    ----------
    element : the part; of whichever class, as ``of_kind`` has chosen it.
    entered, left : faces; ``left`` is "" where the light ends.
    laws : what happens in between, at the wavelength of the train.
    before, after : the light that arrives and that leaves; the latter empty where the light ends.
    distance : travelled from the laser to the part [m].
    previous : the visit upstream; None for the first part behind a laser.
    source : name of the laser.
    """

    element: Any
    entered: str
    left: str
    laws: tuple[Any, ...]
    before: tuple[Strand, ...]
    after: tuple[Strand, ...]
    distance: float
    previous: Visit | None
    source: str

    @property
    def name(self) -> str:
        return str(self.element.name)

    @property
    def power(self) -> float:
        """Power that arrives [W], by second moments."""
        return float(total(self.before)[0])

    @property
    def widest(self) -> Strand:
        """The strand with the largest beam that carries light."""
        lit = [strand for strand in self.before if strand.stokes[0] > 0] or list(self.before)
        return max(lit, key=lambda strand: strand.spread.size)

    @property
    def radius(self) -> float:
        """Beam radius where the light arrives [m], 2 rms: w of a Gaussian."""
        return 2 * self.widest.spread.size

    @property
    def patterned(self) -> bool:
        """Whether the polarization that arrives varies over the beam."""
        return any(strand.patterned for strand in self.before)

    def chain(self) -> tuple[Visit, ...]:
        """All visits from the laser to this one."""
        visits: list[Visit] = []
        here: Visit | None = self
        while here is not None:
            visits.append(here)
            here = here.previous
        return tuple(reversed(visits))

    @property
    def returning(self) -> bool:
        """Whether this light came through the part before, the other way."""
        return any((v.name, v.left) == (self.name, self.entered) for v in self.chain()[:-1])

    @property
    def shapes(self) -> bool:
        """Whether the part gives the beam a shape: a pattern, a charge or an axis that turns."""
        return any(
            (isinstance(law, AxisLaw) and not law.uniform)
            or (isinstance(law, ScalarLaw) and (law.charge or not law.transmission.uniform))
            for law in self.laws
        )

    @property
    def flips(self) -> tuple[int, int]:
        """How often x and y were reversed by reflections on the way here."""
        axes = [law.axis for visit in self.chain()[:-1] for law in visit.laws if isinstance(law, Flip)]
        return axes.count("x"), axes.count("y")


def ray_matrix(visits: tuple[Visit, ...]) -> TravelLaw:
    """The ABCD section of some visits in a row, lenses included."""
    section = TravelLaw()
    for visit in visits:
        for law in visit.laws:
            if isinstance(law, TravelLaw):
                section = section.then(law)
            elif isinstance(law, ScalarLaw) and law.vergence != 0:
                section = section.then(TravelLaw.lens(law.vergence))
    return section


@dataclass(frozen=True, eq=False)
class Bench:
    """What the checks look at.

    Parameters
    ----------
    train : the train, numbers only.
    visits : every part on every path, in the order the light meets them.
    ledger : exact power [W] at the ports that light leaves, where it could be worked out.
    whole : whether all paths were followed to their end.
    loops : parts at which light on its way round comes back to where it was; followed once round.
    obstacle : why the ledger is empty, if it is.
    """

    train: Any
    visits: tuple[Visit, ...]
    ledger: Mapping[tuple[str, str], float] = field(default_factory=dict)
    whole: bool = True
    loops: tuple[str, ...] = ()
    obstacle: FastaxisError | None = None

    @property
    def wavelength(self) -> float:
        return float(self.train.wavelength)

    @cached_property
    def total(self) -> float:
        """Power of all lasers [W]."""
        return math.fsum(float(self.train.elements[name].source.power) for name in self.train.sources)

    def lit(self, visit: Visit) -> bool:
        """Whether more than roundings of light arrives."""
        return self.arriving(visit) > DARK * self.total

    def arriving(self, visit: Visit) -> float:
        """Power that arrives at a visit [W]: of the ledger where it has it, else by second moments."""
        return self.ledger.get(self.upstream(visit), visit.power)

    def upstream(self, visit: Visit) -> tuple[str, str]:
        """(part, face) that the light of a visit comes from."""
        before = visit.previous
        if before is not None:
            return before.name, before.left
        return visit.source, self.train.elements[visit.source].exit

    def arriving_together(self, visits: Iterable[Visit]) -> float:
        """Power [W] of several visits; light of several paths through one port is counted once if it is known."""
        by_port: dict[tuple[str, str], list[float]] = {}
        for visit in visits:
            by_port.setdefault(self.upstream(visit), []).append(visit.power)
        return math.fsum(self.ledger.get(port, self._at_most(powers)) for port, powers in by_port.items())

    def leaving_together(self, visits: Iterable[Visit]) -> float:
        """Power [W] that leaves by one port, on whichever paths it came."""
        several = list(visits)
        estimate = self._at_most([float(total(visit.after)[0]) for visit in several])
        return self.ledger.get((several[0].name, several[0].left), estimate)

    def _at_most(self, powers: list[float]) -> float:
        """The most that light of several paths can carry together: the square of the sum of their amplitudes.

        A caution must not be too small, so interference is taken at its brightest, and a cavity as letting all through.
        """
        if self.loops:
            return self.total
        return powers[0] if len(powers) == 1 else min(self.total, math.fsum(math.sqrt(power) for power in powers) ** 2)

    def leaving(self, visit: Visit) -> float:
        """Power that leaves by the port of a visit [W]."""
        return self.ledger.get((visit.name, visit.left), float(total(visit.after)[0]))

    def of_kind(self, *kinds: type) -> Iterator[Visit]:
        """Lit visits of parts of these kinds."""
        return (visit for visit in self.visits if isinstance(visit.element, kinds) and self.lit(visit))

    def first_visits(self) -> Iterator[Visit]:
        """Each lit part where the light meets it first."""
        told: set[str] = set()
        for visit in self.visits:
            if visit.name not in told and self.lit(visit):
                told.add(visit.name)
                yield visit

    @cached_property
    def wavelengths(self) -> tuple[float, ...]:
        """All wavelengths among the light [m]."""
        return tuple(sorted({strand.wavelength for visit in self.visits for strand in visit.before}))
