"""Windows: what their two faces do to coherent light."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.window import Window
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import percent

__all__ = ["windows"]


def windows(bench: Bench) -> Iterator[Finding]:
    """Swing of the power behind a parallel window, and the ghost of a wedged one.

    Two faces that reflect R each make fringes between 1 and (1 - R)^2/(1 + R)^2: about 2 R either way of the mean.
    """
    for visit in bench.first_visits():
        part = visit.element
        if not isinstance(part, Window):
            continue
        R = float(part.reflectance(bench.wavelength))
        if part.wedge == 0 and R > 1e-4:
            yield Finding(
                severity=Severity.MEDIUM if R > 0.01 else Severity.LOW,
                check="parallel window",
                element=part.name,
                rule="a parallel window is a weak cavity: the power behind it swings with its temperature",
                got=f"{part.name}: each face reflects {percent(R)}, the power swings by {percent(2 * R)} either way",
                fix=f'train.with_changes({{"{part.name}.wedge": 0.5*deg}})',
            )
        if part.wedge != 0:
            yield Finding(
                severity=Severity.NOTE,
                check="ghost",
                element=part.name,
                rule="the light reflected twice inside a wedge leaves beside the beam and is not followed",
                got=f"{part.name}: a ghost of {percent(R**2)} and reflections of {percent(R)} towards the laser side",
                fix="stop them with an iris or a dump",
            )
