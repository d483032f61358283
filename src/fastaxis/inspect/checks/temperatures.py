"""Plates at another temperature than the one they were made for."""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import Any

from fastaxis.elements.patterned_retarder import PatternedRetarder
from fastaxis.elements.q_plate import QPlate
from fastaxis.elements.retarder import Retarder
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import degrees
from fastaxis.maths import Pattern

__all__ = ["gained", "temperatures"]

SEEN = math.radians(0.2)  # below it a half-wave plate leaks 3e-6 of the light: no null shows it


def temperatures(bench: Bench) -> Iterator[Finding]:
    """Retardance that each plate has gained or lost away from its design temperature."""
    for visit in bench.first_visits():
        plate = visit.element
        if isinstance(plate, Retarder | QPlate | PatternedRetarder) and plate.temperature != plate.design_temperature:
            yield from _without_drift(plate) if plate.drift == 0 else _drifted(plate, bench.wavelength)


def gained(plate: Any, wavelength: float) -> float:
    """Retardance at the plate's temperature, less that at its design temperature [rad]; the largest of a pattern."""
    drift = float(plate.drift * (plate.temperature - plate.design_temperature))
    if isinstance(plate, PatternedRetarder):
        return drift * _largest(plate.retardance)
    cold = plate.changed(temperature=plate.design_temperature)
    return drift * float(cold.retardance_at(wavelength))


def _largest(retardance: Any) -> float:
    if not isinstance(retardance, Pattern):
        return float(retardance)
    # Of a function nothing is known in advance; a half wave is what most such plates have.
    return math.pi if callable(retardance.source) else float(abs(retardance.source).max())


def _drifted(plate: Any, wavelength: float) -> Iterator[Finding]:
    error = gained(plate, wavelength)
    if abs(error) < SEEN:
        return
    kelvin = float(plate.temperature - plate.design_temperature)
    order = getattr(plate, "order", 0)
    told = f"order {order}, " if order else ""
    severity = Severity.LOW if abs(error) < math.radians(2) else Severity.MEDIUM
    yield Finding(
        severity=Severity.HIGH if abs(error) > math.radians(20) else severity,
        check="plate temperature",
        element=plate.name,
        rule="the whole path difference of a plate drifts, its whole waves included: a zero-order plate drifts least",
        got=f"{plate.name}: {told}{abs(kelvin):.3g} K {'above' if kelvin > 0 else 'below'} its design temperature, "
        f"retardance off by {degrees(error)}",
        fix=f'train.with_changes({{"{plate.name}.temperature": {float(plate.design_temperature):g}}})',
    )


def _without_drift(plate: Any) -> Iterator[Finding]:
    yield Finding(
        severity=Severity.NOTE,
        check="plate temperature",
        element=plate.name,
        rule="a temperature changes a plate that is declared with its drift",
        got=f"{plate.name}: temperature {float(plate.temperature):g} K, "
        f"design_temperature {float(plate.design_temperature):g} K, drift 0",
        fix=f'train.with_changes({{"{plate.name}.drift": -1e-4}})',
    )
