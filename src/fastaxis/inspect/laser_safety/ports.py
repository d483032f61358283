"""The ports at which an eye, or a sensor, can meet a beam."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator
from dataclasses import dataclass

from fastaxis.elements.detector import BeamDump
from fastaxis.inspect.bench import DARK, Bench, Visit
from fastaxis.inspect.strands import Strand
from fastaxis.plan.spread import of_beam

__all__ = ["PortLight", "lit_ports"]


@dataclass(frozen=True)
class PortLight:
    """The light at one port.

    Parameters
    ----------
    port : its name.
    power : [W].
    radius : w, 1/e^2 of a Gaussian [m].
    wavelengths : among the light [m].
    leaves : whether nothing is joined there, so that the beam leaves the bench.
    """

    port: str
    power: float
    radius: float
    wavelengths: tuple[float, ...]
    leaves: bool

    @property
    def diameters(self) -> tuple[float, float]:
        """Diameters [m] at 1/e^2 and at 1/e of the peak of a Gaussian; the latter is smaller by sqrt 2."""
        return 2 * self.radius, math.sqrt(2) * self.radius


def lit_ports(bench: Bench) -> Iterator[PortLight]:
    """Open ports, cameras and detectors with light; dumps are where a beam is meant to end."""
    open_ports = set(bench.train.open_ports())
    leaving: dict[str, list[Visit]] = defaultdict(list)
    ending: dict[str, list[Visit]] = defaultdict(list)
    for visit in bench.visits:
        if f"{visit.name}.{visit.left}" in open_ports:
            leaving[f"{visit.name}.{visit.left}"].append(visit)
        if not visit.left and not isinstance(visit.element, BeamDump):
            ending[f"{visit.name}.{visit.entered}"].append(visit)
    for name in bench.train.sources:
        if f"{name}.{bench.train.elements[name].exit}" in open_ports:
            yield _of_bare_laser(bench, name)
    for port, visits in leaving.items():
        yield from _lit(bench, port, bench.leaving_together(visits), [s for v in visits for s in v.after], leaves=True)
    for port, visits in ending.items():
        yield from _lit(bench, port, bench.arriving_together(visits), [s for v in visits for s in v.before])


def _lit(bench: Bench, port: str, power: float, strands: list[Strand], *, leaves: bool = False) -> Iterator[PortLight]:
    if power <= DARK * bench.total:
        return
    lit = [strand for strand in strands if strand.stokes[0] > 0]
    radius = min((2 * strand.spread.size for strand in lit), default=math.inf)
    yield PortLight(port, power, radius, tuple(sorted({strand.wavelength for strand in lit})), leaves)


def _of_bare_laser(bench: Bench, name: str) -> PortLight:
    source = bench.train.elements[name].source
    wavelengths = tuple(sorted({float(part.wavelength_or(bench.wavelength)) for part in source.components}))
    spreads = [of_beam(part.beam, float(part.wavelength_or(bench.wavelength))) for part in source.components]
    port = f"{name}.{bench.train.elements[name].exit}"
    return PortLight(port, float(source.power), min(2 * spread.size for spread in spreads), wavelengths, leaves=True)
