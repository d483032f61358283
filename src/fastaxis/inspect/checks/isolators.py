"""A Faraday rotator between two polarizers: does it pass the light forwards and stop it backwards?"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from fastaxis.elements.polarizer import Polarizer
from fastaxis.elements.rotator import FaradayRotator
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.checks.polarizers import axis_fix, passing
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import degrees, percent
from fastaxis.laws import AxisLaw, CircularLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan.binding import bound

__all__ = ["backward_leak", "isolators"]


def isolators(bench: Bench) -> Iterator[Finding]:
    """Forward loss at the output polarizer and light let through backwards."""
    for visit in bench.of_kind(Polarizer):
        trio = _trio(visit)
        if trio is None or visit.returning:
            continue  # met on the way back it is there to block
        share, leak = passing(visit), backward_leak(trio, bench.wavelength)
        if share < 0.95:
            yield Finding(
                severity=Severity.HIGH,
                check="isolator",
                element=visit.name,
                rule="the output polarizer of an isolator stands where the rotator turns the light to",
                got=f"{visit.name}: {percent(share)} passes forwards, axis at {degrees(float(visit.laws[0].angle))}",
                fix=axis_fix(visit),
            )
        elif leak > 1e-3:
            yield _leaking(trio[1], leak)


def _leaking(rotator: Visit, leak: float) -> Finding:
    return Finding(
        severity=Severity.HIGH if leak > 0.1 else Severity.MEDIUM,
        check="isolator",
        element=rotator.name,
        rule="a Faraday rotator isolates at 45°, where light coming back is turned by 90° in all",
        got=f"{rotator.name}: angle {degrees(float(rotator.element.angle))}, {percent(leak)} passes backwards",
        fix=f'train.with_changes({{"{rotator.name}.angle": 45*deg}})',
    )


def _trio(visit: Visit) -> tuple[Visit, Visit, Visit] | None:
    """(input polarizer, rotator, output polarizer) when the three follow one another, with free space at most."""
    rotator = _part_before(visit)
    first = _part_before(rotator) if rotator is not None and isinstance(rotator.element, FaradayRotator) else None
    if rotator is None or first is None or not isinstance(first.element, Polarizer):
        return None
    return first, rotator, visit


def _part_before(visit: Visit) -> Visit | None:
    before = visit.previous
    while before is not None and type(before.element).__name__ == "FreeSpace":
        before = before.previous
    return before


def backward_leak(trio: tuple[Visit, ...], wavelength: float) -> float:
    """Largest share of power, over polarizations, that passes the three parts the other way."""
    jones = np.eye(2, dtype=complex)
    for visit in reversed(trio):
        for law in visit.element.passages(wavelength)[visit.left, visit.entered].laws:
            if isinstance(law, AxisLaw | CircularLaw):
                jones = np.array(bound(law).linear(NUMBERS), dtype=complex) @ jones
    return float(np.linalg.norm(jones, 2) ** 2)
