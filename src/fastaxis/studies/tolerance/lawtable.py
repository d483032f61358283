"""What the laws of one part become at many values of its parameters."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.polynomial.chebyshev import chebpts1, chebvander
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
FROM_NODES = np.exp(-1j * np.multiply.outer(HARMONICS, NODES)) / len(NODES)
# A law is smooth in any other number; over errors of up to a third of it, polynomials of this many terms converge to
# roundings, and where they don't, the laws are asked at every value.
SMOOTH = 18
MOST = 1500  # nodes of several parameters together, above which asking at every value is no slower
# A few dozen products of numbers near 1 cost some ten roundings; a law of another shape is off by far more.
ROUNDED = 1e-13


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
    trigonometric sums in angles and retardances, so nine values of an angle give all others; in any other number they
    are smooth, so that a few values do. Both are checked, and where they fail the laws are asked at every value.

    Parameters
    ----------
    element, passage, wavelength : the part, the faces met and left, and [m].
    names : parameters that change; "wavelength" for that of the light.
    values : (rows, names).

    Returns
    -------
    None where the parameters change more than such numbers.
    """

    def asked(row: Reals) -> list[tuple[Any, Complexes]]:
        changes = dict(zip(names, row.tolist(), strict=True))
        colour = changes.pop("wavelength", wavelength)
        return [_numbers(bound(law)) for law in element.changed(**changes).passages(colour)[passage].steps()]

    bases = [_basis(name, column) for name, column in zip(names, values.T, strict=True)]
    if math.prod(len(basis.nodes) for basis in bases) < min(len(values), MOST):
        found = _interpolated(asked, bases, values)
        if found is not None:
            return found
    rows, back = np.unique(values, axis=0, return_inverse=True)
    return _stacked([asked(row) for row in rows], back.ravel())


@dataclass(frozen=True, eq=False)
class _Basis:
    """Functions of one parameter that the numbers of a law are sums of.

    Parameters
    ----------
    nodes : values that are asked.
    functions : (rows, functions) at all values.
    from_nodes : (functions, nodes), what of each function is in a law known at the nodes.
    """

    nodes: Reals
    functions: NDArray[Any] = field(repr=False)
    from_nodes: NDArray[Any] = field(repr=False)


def _basis(name: str, column: Reals) -> _Basis:
    """Harmonics of an angle; Chebyshev polynomials of any other parameter, over the values it takes."""
    if name in ANGLES:
        return _Basis(NODES, np.exp(1j * np.multiply.outer(column, HARMONICS)), FROM_NODES)
    low, high = float(column.min()), float(column.max())
    if low == high:
        return _Basis(np.array([low]), np.ones((len(column), 1)), np.ones((1, 1)))
    places = chebpts1(SMOOTH)
    from_nodes = 2 / SMOOTH * chebvander(places, SMOOTH - 1).T
    from_nodes[0] /= 2
    # Halves first, so that the ends come out where they were.
    nodes = (low + high) / 2 + (high - low) / 2 * places
    return _Basis(nodes, chebvander((column - (low + high) / 2) / ((high - low) / 2), SMOOTH - 1), from_nodes)


def _numbers(law: Any) -> tuple[Any, Complexes]:
    matrix = uniform_matrix(law)
    return coordinates(law) if matrix is None else (None, matrix.ravel())


def _stacked(answers: list[list[tuple[Any, Complexes]]], back: NDArray[np.intp]) -> list[tuple[Any, Complexes]] | None:
    frames = [frame for frame, _ in answers[0]]
    if any([frame for frame, _ in answer] != frames for answer in answers[1:]):
        return None
    return [(frame, np.array([a[k][1] for a in answers])[back]) for k, frame in enumerate(frames)]


def _interpolated(asked: Any, bases: list[_Basis], values: Reals) -> list[tuple[Any, Complexes]] | None:
    grid = np.stack(np.meshgrid(*[basis.nodes for basis in bases], indexing="ij"), axis=-1).reshape(-1, len(bases))
    try:
        nodes = _stacked([asked(row) for row in grid], np.arange(len(grid)))
    except FastaxisError:
        return None  # the part refuses some values
    if nodes is None:
        return None
    found = [(frame, _summed(bases, numbers)) for frame, numbers in nodes]
    tried = np.linspace(0, len(values) - 1, 8).astype(int).tolist()
    return found if all(_agrees(found, asked(values[row]), row) for row in tried) else None


def _summed(bases: list[_Basis], numbers: Complexes) -> Complexes:
    """A row of numbers for each row of values, from those at the nodes."""
    shape = tuple(len(basis.nodes) for basis in bases)
    terms = numbers.reshape(*shape, -1)
    for axis, basis in enumerate(bases):
        terms = np.moveaxis(np.tensordot(basis.from_nodes, terms, axes=(1, axis)), 0, axis)
    first, *others = bases
    rows = (first.functions @ terms.reshape(shape[0], -1)).reshape(-1, *terms.shape[1:])
    for basis in others:
        rows = np.einsum("vi,vi...->v...", basis.functions, rows)
    return np.asarray(rows)


def _agrees(found: list[tuple[Any, Complexes]], exact: list[tuple[Any, Complexes]], row: int) -> bool:
    return all(
        frame == true and np.abs(numbers[row] - vector).max() <= ROUNDED * max(1.0, np.abs(vector).max())
        for (frame, numbers), (true, vector) in zip(found, exact, strict=True)
    )
