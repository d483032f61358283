"""q-plates: the share of the light that keeps its hand and its charge."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.elements.q_plate import QPlate
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import degrees, length, percent

__all__ = ["conversion"]


def conversion(bench: Bench) -> Iterator[Finding]:
    """Unconverted share cos^2(retardance/2) of each q-plate at each wavelength; half of it is a tuning of its own."""
    told: set[str] = set()
    for visit in bench.of_kind(QPlate):
        if visit.name in told:
            continue
        told.add(visit.name)
        for wavelength in bench.wavelengths:
            yield from _tuning(visit.element, wavelength)


def _tuning(plate: QPlate, wavelength: float) -> Iterator[Finding]:
    share = plate.unconverted(wavelength)
    if share < 1e-4:
        return
    half = 0.4 < share < 0.6  # tuned to a quarter wave, on purpose
    severity = Severity.NOTE if half or share < 1e-3 else Severity.LOW if share < 5e-3 else Severity.MEDIUM
    off_design = plate.design is not None and abs(wavelength / float(plate.design) - 1) > 1e-9
    warm = plate.drift != 0 and plate.temperature != plate.design_temperature
    yield Finding(
        severity=Severity.HIGH if share > 0.25 and off_design else severity,
        check="unconverted light",
        element=plate.name,
        rule="a q-plate of half a wave converts all light; the rest stays as a spot in the middle of the ring",
        got=f"{plate.name}: retardance {degrees(float(plate.retardance_at(wavelength)))} at {length(wavelength)} "
        f"leaves {percent(share)} unconverted",
        fix=_fix(plate, wavelength, off_design=off_design, warm=warm),
    )


def _fix(plate: QPlate, wavelength: float, *, off_design: bool, warm: bool) -> str:
    if off_design:
        return f'train.with_changes({{"{plate.name}.design": {wavelength * 1e9:.6g}*nm}})'
    if warm:
        return f'train.with_changes({{"{plate.name}.temperature": {float(plate.design_temperature):g}}})'
    return f'train.with_changes({{"{plate.name}.retardance": 180*deg}})'
