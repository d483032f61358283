"""The ports at which an eye, or a sensor, can meet a beam."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

from fastaxis.elements.detector import BeamDump
from fastaxis.inspect.bench import DARK, Bench, Visit
from fastaxis.inspect.strands import Strand

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
    found: dict[str, list[tuple[float, tuple[Strand, ...], bool]]] = {}
    for visit in bench.visits:
        if visit.left and f"{visit.name}.{visit.left}" in open_ports:
            found.setdefault(f"{visit.name}.{visit.left}", []).append((bench.leaving(visit), visit.after, True))
        if not visit.left and not isinstance(visit.element, BeamDump):
            found.setdefault(_entered(visit), []).append((bench.arriving(visit), visit.before, False))
    for port, beams in found.items():
        power = sum(watts for watts, _, _ in beams)
        if power > DARK * bench.total:
            strands = [strand for _, part, _ in beams for strand in part if strand.stokes[0] > 0]
            yield PortLight(
                port,
                power,
                min((2 * strand.spread.size for strand in strands), default=math.inf),
                tuple(sorted({strand.wavelength for strand in strands})),
                beams[0][2],
            )


def _entered(visit: Visit) -> str:
    return f"{visit.name}.{visit.entered}"
