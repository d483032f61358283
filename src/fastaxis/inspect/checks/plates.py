"""Wave plates away from the wavelength they were made for, of high order, or not what their name says."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import replace

from fastaxis.elements.retarder import HalfWavePlate, QuarterWavePlate, Retarder
from fastaxis.elements.spiral_plate import SpiralPlate
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import degrees, length

__all__ = ["plates"]

NAMED = ((HalfWavePlate, math.pi, "half"), (QuarterWavePlate, math.pi / 2, "quarter"))


def plates(bench: Bench) -> Iterator[Finding]:
    """Retardance of each plate at the wavelengths it meets, against its nominal one."""
    for visit in bench.first_visits():
        if isinstance(visit.element, Retarder):
            plate = _at_design_temperature(visit.element)  # what warmth does is told by a check of its own
            yield from _named(plate)
            for wavelength in bench.wavelengths:
                yield from _detuned(plate, wavelength)
            yield from _order(plate, bench.wavelength)
        if isinstance(visit.element, SpiralPlate):
            for wavelength in bench.wavelengths:
                yield from _spiral(visit.element, wavelength)


def _at_design_temperature(plate: Retarder) -> Retarder:
    return replace(plate, temperature=plate.design_temperature)


def _named(plate: Retarder) -> Iterator[Finding]:
    for kind, nominal, word in NAMED:
        error = float(plate.retardance) - nominal
        if isinstance(plate, kind) and abs(error) > math.radians(20):
            yield Finding(
                severity=Severity.MEDIUM,
                check="plate name",
                element=plate.name,
                rule=f"a {word}-wave plate has a retardance near {degrees(nominal)}",
                got=f"{plate.name}: retardance {degrees(float(plate.retardance))}",
                fix=f"fa.Retarder(fast={degrees(float(plate.fast_axis)).rstrip('°')}*deg, "
                f"retardance={degrees(float(plate.retardance)).rstrip('°')}*deg)",
            )


def _detuned(plate: Retarder, wavelength: float) -> Iterator[Finding]:
    actual = float(plate.retardance_at(wavelength))
    error = (actual - float(plate.retardance) + math.pi) % (2 * math.pi) - math.pi
    if plate.design is None or abs(error) < math.radians(0.2):
        return
    severity = Severity.LOW if abs(error) < math.radians(2) else Severity.MEDIUM
    yield Finding(
        severity=Severity.HIGH if abs(error) > math.radians(20) else severity,
        check="design wavelength",
        element=plate.name,
        rule=f"it was made for {length(float(plate.design))} and {degrees(float(plate.retardance))}",
        got=f"{plate.name}: retardance {degrees(actual % (2 * math.pi))} at {length(wavelength)}, "
        f"off by {degrees(error)}",
        fix=f'train.with_changes({{"{plate.name}.design": {wavelength * 1e9:.6g}*nm}})',
    )


def _order(plate: Retarder, wavelength: float) -> Iterator[Finding]:
    if plate.order == 0:
        return
    slope = float(plate.retardance_at(wavelength)) / wavelength * 1e-9
    yield Finding(
        # More than a degree in a nanometre: a diode laser that warms by 4 K shows it.
        severity=Severity.LOW if slope > math.radians(1) else Severity.NOTE,
        check="plate order",
        element=plate.name,
        rule="a plate of high order changes with wavelength and temperature; a zero-order plate hardly",
        got=f"{plate.name}: order {plate.order}, retardance changes by {degrees(slope)} a nanometre",
        fix=f'train.with_changes({{"{plate.name}.order": 0}})',
    )


def _spiral(plate: SpiralPlate, wavelength: float) -> Iterator[Finding]:
    charge = float(plate.charge_at(wavelength))
    error = abs(charge - float(plate.charge))
    if plate.design is None or error < 1e-3:
        return
    yield Finding(
        severity=Severity.HIGH if error > 0.1 else Severity.MEDIUM if error > 0.01 else Severity.LOW,
        check="design wavelength",
        element=plate.name,
        rule="a charge that is not whole leaves a cut in the ring",
        got=f"{plate.name}: charge {charge:.4g} at {length(wavelength)}, made for {length(float(plate.design))}",
        fix=f'train.with_changes({{"{plate.name}.design": {wavelength * 1e9:.6g}*nm}})',
    )
