"""Angles at which paraxial light is no longer a good word for the light."""

from __future__ import annotations

import math
from collections.abc import Iterator

from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import Strand

__all__ = ["divergence", "paraxial"]

# sin and tan differ by 1 % at 0.14 rad and by 13 % at 0.5 rad.
SLIGHT, GROSS = 0.14, 0.5


def paraxial(bench: Bench) -> Iterator[Finding]:
    """The steepest beam of the bench, where it is too steep."""
    angles = [(divergence(visit.widest), visit) for visit in bench.visits if bench.lit(visit)]
    if not angles:
        return
    steepest, visit = max(angles, key=lambda pair: pair[0])
    if steepest <= SLIGHT:
        return
    part = visit.previous.name if visit.previous else visit.source
    yield Finding(
        severity=Severity.HIGH if steepest > GROSS else Severity.MEDIUM,
        check="not paraxial",
        element=part,
        rule="beams are paraxial to 1 % below 0.14 rad; a waist or a focal length may have lost its unit",
        got=f"{part}: the beam behind it has a half-angle of {steepest:.2g} rad",
        fix="a larger waist or a longer focal length",
    )


def divergence(strand: Strand) -> float:
    """Half-angle of the beam [rad], two rms: wavelength/(pi w0) for a Gaussian."""
    spread = strand.spread
    return 0.0 if spread.infinite else 2 * math.hypot(spread.angle, spread.curvature * spread.size)
