"""A Faraday rotator between two polarizers: does it pass the light forwards and stop it backwards?"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.checks.polarizers import axis_fix, passing
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.isolating import Isolator, isolators_of
from fastaxis.inspect.words import degrees, percent
from fastaxis.laws import AxisLaw, CircularLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan.binding import bound

__all__ = ["backward_leak", "isolators"]


def isolators(bench: Bench) -> Iterator[Finding]:
    """Forward loss at the output polarizer and light let through backwards."""
    for trio in isolators_of(bench):
        visit = trio[2]
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
            yield _leaking(trio, leak)


def _leaking(trio: Isolator, leak: float) -> Finding:
    rotator = trio[1]
    return Finding(
        severity=Severity.HIGH if leak > 0.1 else Severity.MEDIUM,
        check="isolator",
        element=rotator.name,
        rule="a Faraday rotator isolates at 45°, where light coming back is turned by 90° in all",
        got=f"{rotator.name}: angle {degrees(float(rotator.element.angle))}, {percent(leak)} passes backwards",
        fix=_set_right(*trio),
    )


def _set_right(first: Visit, rotator: Visit, last: Visit) -> str:
    """Code for a rotator of 45 degrees in its own sense, and the output polarizer where that turns the light to."""
    turn = math.copysign(45.0, float(rotator.element.angle))
    # As met: from behind an axis stands mirrored, and the rotator turns the other way.
    met = float(first.laws[0].angle) + math.radians(turn if rotator.entered == "front" else -turn)
    axis = met if last.entered == "front" else -met
    told = f'"{rotator.name}.angle": {turn:g}*deg, "{last.name}.axis": {degrees(axis).rstrip("°")}*deg'
    return f"train.with_changes({{{told}}})"


def backward_leak(trio: tuple[Visit, ...], wavelength: float) -> float:
    """Largest share of power, over polarizations, that passes the three parts the other way."""
    jones = np.eye(2, dtype=complex)
    for visit in reversed(trio):
        for law in visit.element.passages(wavelength)[visit.left, visit.entered].laws:
            if isinstance(law, AxisLaw | CircularLaw):
                jones = np.array(bound(law).linear(NUMBERS), dtype=complex) @ jones
    return float(np.linalg.norm(jones, 2) ** 2)
