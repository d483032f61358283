"""What the laws of one part become at many values of its parameters."""

from __future__ import annotations

import math
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements.base import ANGLES
from fastaxis.errors import FastaxisError
from fastaxis.laws import AxisLaw, CircularLaw, ScalarLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan.binding import bound
from fastaxis.studies.coordinates import coordinates

__all__ = ["law_tables", "uniform_matrix"]

Complexes: TypeAlias = NDArray[np.complex128]
Reals: TypeAlias = NDArray[np.float64]
Laws: TypeAlias = tuple[Any, ...]

# Laws are trigonometric in half an angle, up to twice the angle: nine harmonics over two turns.
NODES = 4 * math.pi * (np.arange(9) - 4) / 9
HARMONICS = np.arange(-4, 5) / 2
# Nine products of numbers near 1 cost some ten roundings; a law of another shape is off by far more.
TRIGONOMETRIC = 1e-13


def uniform_matrix(law: Any) -> Complexes | None:
    """The matrix on (Ex, Ey) of a law that is the same everywhere; None for any other."""
    if isinstance(law, ScalarLaw):
        return np.eye(2, dtype=complex) * law.transmission.number() if law.uniform else None
    if isinstance(law, AxisLaw | CircularLaw) and law.uniform:
        return np.array(law.linear(NUMBERS), dtype=complex)
    return None


def law_tables(
    element: Any, passage: tuple[str, str], wavelength: float, names: tuple[str, ...], values: Reals
) -> list[tuple[Any, Complexes]] | None:
    """For each law of a passage what is fixed, and a row of numbers for each row of values.

    The numbers are the entries of the matrix of a uniform law, shape (rows, 4), else its coordinates. Laws are exact
    trigonometric sums in angles and retardances, so nine values of an angle give all others; any other parameter is
    asked for at every value.

    Parameters
    ----------
    element, passage, wavelength : the part, the faces met and left, and [m].
    names : parameters that change.
    values : (rows, names).

    Returns
    -------
    None where the parameters change more than such numbers.
    """

    def asked(row: Reals) -> list[tuple[Any, Complexes]]:
        changed = element.changed(**dict(zip(names, row.tolist(), strict=True)))
        return [_numbers(bound(law)) for law in changed.passages(wavelength)[passage].steps()]

    if len(names) <= 2 and set(names) <= set(ANGLES) and len(values) > len(NODES) ** len(names):
        found = _interpolated(asked, values)
        if found is not None:
            return found
    rows, back = np.unique(values, axis=0, return_inverse=True)
    return _stacked([asked(row) for row in rows], back.ravel())


def _numbers(law: Any) -> tuple[Any, Complexes]:
    matrix = uniform_matrix(law)
    return coordinates(law) if matrix is None else (None, matrix.ravel())


def _stacked(answers: list[list[tuple[Any, Complexes]]], back: NDArray[np.intp]) -> list[tuple[Any, Complexes]] | None:
    frames = [frame for frame, _ in answers[0]]
    if any([frame for frame, _ in answer] != frames for answer in answers[1:]):
        return None
    return [(frame, np.array([a[k][1] for a in answers])[back]) for k, frame in enumerate(frames)]


def _interpolated(asked: Any, values: Reals) -> list[tuple[Any, Complexes]] | None:
    grid = np.stack(np.meshgrid(*[NODES] * values.shape[1], indexing="ij"), axis=-1).reshape(-1, values.shape[1])
    try:
        nodes = _stacked([asked(row) for row in grid], np.arange(len(grid)))
    except FastaxisError:
        return None  # the part refuses some angles
    if nodes is None:
        return None
    shares = np.ones((len(values), 1), dtype=complex)
    for column in values.T:
        kernel = np.exp(1j * np.multiply.outer(column[:, None] - NODES, HARMONICS)).sum(axis=2) / len(NODES)
        shares = np.einsum("vi,vj->vij", shares, kernel).reshape(len(values), -1)
    found = [(frame, shares @ numbers) for frame, numbers in nodes]
    return found if all(_agrees(found, asked(values[row]), row) for row in (0, len(values) // 2, -1)) else None


def _agrees(found: list[tuple[Any, Complexes]], exact: list[tuple[Any, Complexes]], row: int) -> bool:
    return all(
        frame == true and np.abs(numbers[row] - vector).max() <= TRIGONOMETRIC * max(1.0, np.abs(vector).max())
        for (frame, numbers), (true, vector) in zip(found, exact, strict=True)
    )
