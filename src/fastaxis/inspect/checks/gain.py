"""No passive part gives more light than it got."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.laws import AxisLaw, CircularLaw, ScalarLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan.binding import bound

__all__ = ["gain", "largest_gain"]

# Products of two or three amplitudes, each good to a few roundings.
ROUNDING = 1e-12
STEPS = 33  # places a side, over two beam radii either way

Complexes = NDArray[np.complex128]


def gain(bench: Bench) -> Iterator[Finding]:
    """A part whose ports together give back more than entered by one of them, whatever the polarization."""
    for visit in bench.first_visits():
        most = largest_gain(visit, bench.wavelength)
        if most > 1 + ROUNDING:
            yield Finding(
                severity=Severity.HIGH,
                check="gain",
                element=visit.name,
                rule="a passive part gives back at most what it got",
                got=f"{visit.name}: {most:.4g} times the power that enters {visit.entered} leaves it somewhere",
                fix=f'train.with_changes({{"{visit.name}.transmission": 1.0}})',
            )


def largest_gain(visit: Visit, wavelength: float) -> float:
    """Largest ratio of all power out to the power in at the face entered, over polarizations and places.

    The larger eigenvalue of the sum over the ways out of J* J.
    """
    half = 2 * visit.radius if np.isfinite(visit.radius) else 5e-3
    side = np.linspace(-half, half, STEPS)
    x, y = np.meshgrid(side, side)
    ways = [way for (into, _), way in visit.element.passages(wavelength).items() if into == visit.entered]
    if not ways:
        return 0.0
    total = sum(_power_matrix(way.laws, x, y) for way in ways)
    return float(np.linalg.eigvalsh(total).max())


def _power_matrix(laws: tuple[Any, ...], x: Any, y: Any) -> Complexes:
    """J* J at each place, shape (..., 2, 2)."""
    jones = np.broadcast_to(np.eye(2, dtype=complex), (*x.shape, 2, 2))
    for law in map(bound, laws):
        jones = _matrix(law, x, y) @ jones
    return np.asarray(jones.conj().swapaxes(-1, -2) @ jones)


def _matrix(law: Any, x: Any, y: Any) -> Complexes:
    matrix = np.zeros((*x.shape, 2, 2), complex)
    cx, cy = getattr(law, "centre", (0.0, 0.0))
    x, y = x - float(cx), y - float(cy)
    if isinstance(law, AxisLaw | CircularLaw):
        rows = law.linear(NUMBERS, np.arctan2(y, x), x, y)
        for i in range(2):
            for j in range(2):
                matrix[..., i, j] = rows[i][j]
        return matrix
    # A stop only takes away; what is asked for is the most a place gives.
    amplitude = law.transmission.value(NUMBERS, x, y) if isinstance(law, ScalarLaw) else 1.0
    matrix[..., 0, 0] = matrix[..., 1, 1] = amplitude
    return matrix
