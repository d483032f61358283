"""The light at a target as a sum over few propagations, for errors that only move polarization laws."""

from __future__ import annotations

from collections import Counter
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements.base import ThroughElement
from fastaxis.errors import WiringError
from fastaxis.laws import AxisLaw, Law, ScalarLaw
from fastaxis.plan.binding import bound
from fastaxis.studies.spanning import compressed, products
from fastaxis.studies.tolerance.lawtable import law_tables, uniform_matrix

__all__ = ["Chain", "Nothing", "make_chain"]

Complexes: TypeAlias = NDArray[np.complex128]
Reals: TypeAlias = NDArray[np.float64]


@dataclass(frozen=True, kw_only=True)
class Nothing(ThroughElement):
    """Stands for a uniform part whose matrix is applied to the finished picture."""

    def laws(self, wavelength: Any) -> tuple[Law, ...]:
        return ()


@dataclass(frozen=True, eq=False)
class Chain:
    """How light at a target answers to many rows of values.

    Parameters
    ----------
    fields : (rows, columns); the field in front of the last uniform parts is linear in a row.
    last : (rows, 2, 2) or (1, 2, 2), the matrix of those parts.
    removed : names of those parts, left out of the propagations.
    """

    fields: Complexes = field(repr=False)
    last: Complexes = field(repr=False)
    removed: tuple[str, ...]

    def stripped(self, train: Any) -> Any:
        """A copy of a train without the last uniform parts."""
        copy = train.copy()
        copy.elements = {n: Nothing(name=n) if n in self.removed else part for n, part in copy.elements.items()}
        return copy


def make_chain(
    train: Any, target: str, names: tuple[str, ...], values: Reals, wavelengths: Reals | None = None
) -> Chain | None:
    """Follow the laws from source to target at every row of values.

    Neighbouring uniform laws are multiplied to one matrix, since what stands between them acts on both components
    alike; patterned plates part one such matrix from the next.

    Parameters
    ----------
    train, target : with numbers everywhere.
    names : parameters, "part.parameter".
    values : (rows, names).
    wavelengths : (rows,) [m], for the matrix of the last uniform parts; that of the light if left out.

    Returns
    -------
    None where light comes by several paths or in several colours, or a value changes more than polarization.
    """
    try:
        route = train.route(target)
    except WiringError:
        return None  # by several paths: there is no one row of laws
    parts = {name.partition(".")[0] for name in names}
    lines = {float(part.wavelength_or(train.wavelength)) for part in route.laser.source.components}
    end = target.partition(".")[0]
    stiff = {"wavelength", route.source_name, *([end] if train.elements[end].exit is None else [])}
    if parts & stiff or len(lines) > 1:
        return None
    line = lines.pop()
    chain = _Follower(train, route, (names, values), {}, line).followed()
    if chain is None or wavelengths is None:
        return chain
    # What stands in front of the last pattern is propagated at every wavelength; the last parts are not.
    return _Follower(train, route, (names, values), dict.fromkeys(chain.removed, wavelengths), line).followed()


class _Follower:
    """Walks along a route once and gathers columns."""

    def __init__(
        self, train: Any, route: Any, rows: tuple[tuple[str, ...], Reals], colours: dict[str, Reals], wavelength: float
    ) -> None:
        self.names, self.values = rows
        self.train, self.route, self.wavelength, self.colours = train, route, wavelength, colours
        self.columns: Complexes | None = None
        self.matrix = np.eye(2, dtype=complex)[None]
        self.removable: list[str] = []

    def followed(self) -> Chain | None:
        visits = Counter(leg.element_name for leg in self.route.legs)
        for leg in self.route.legs:
            tables = self._tables(leg)
            if tables is None:
                return None
            element, laws = self.train.elements[leg.element_name], self._laws(leg)
            uniform = [isinstance(law, AxisLaw) or uniform_matrix(law) is not None for law in laws]
            alone = visits[leg.element_name] == 1 and isinstance(element, ThroughElement)
            for law, table in zip(laws, tables, strict=True):
                self._take(law, table)
            acts = any(uniform) and not all(isinstance(law, AxisLaw) and not law.uniform for law in laws)
            if acts and alone and all(uniform_matrix(law) is not None for law in laws):
                self.removable.append(leg.element_name)
            elif acts:
                self._flush()
        fields = np.ones((1, 1), dtype=complex) if self.columns is None else self.columns
        return Chain(np.broadcast_to(fields, (len(self.values), fields.shape[1])), self.matrix, tuple(self.removable))

    def _laws(self, leg: Any) -> list[Any]:
        element = self.train.elements[leg.element_name]
        return [bound(law) for law in element.passages(self.wavelength)[leg.entered, leg.left].steps()]

    def _tables(self, leg: Any) -> list[Any] | None:
        """The numbers of each law of a leg at every row; None for a law that stays."""
        own = [k for k, name in enumerate(self.names) if name.partition(".")[0] == leg.element_name]
        short = tuple(self.names[k].partition(".")[2] for k in own)
        values = self.values[:, own]
        if leg.element_name in self.colours:
            short, values = (*short, "wavelength"), np.column_stack([values, self.colours[leg.element_name]])
        if not short:
            return [None] * len(self._laws(leg))
        element, faces = self.train.elements[leg.element_name], (leg.entered, leg.left)
        found = law_tables(element, faces, self.wavelength, short, values)
        return None if found is None else [numbers for _, numbers in found]

    def _take(self, law: Any, table: Complexes | None) -> None:
        matrix = uniform_matrix(law)
        if matrix is not None:
            own = matrix[None] if table is None else table.reshape(-1, 2, 2)
            self.matrix = own @ self.matrix
            return
        if isinstance(law, AxisLaw):
            self._flush()
        if table is not None and (table != table[0]).any():
            # A scalar law acts on both components alike: its one number may stand anywhere.
            if isinstance(law, ScalarLaw):
                self.matrix = self.matrix * table[:, 0, None, None]
            else:
                self._append(table)

    def _flush(self) -> None:
        """End a run of uniform laws: its matrix, or what it makes of the source, becomes columns."""
        self.removable = []
        if self.columns is None:
            beams = [part.beam for part in self.route.laser.source.components]
            states = {tuple(bound(term.state).jones.tolist()) for beam in beams for term in beam.terms}
            vectors = np.array(sorted(states, key=str), dtype=complex).T
            self._append((self.matrix @ vectors).reshape(len(self.matrix), -1))
        elif len(self.matrix) > 1:
            self._append(self.matrix.reshape(-1, 4))
        self.matrix = np.eye(2, dtype=complex)[None]

    def _append(self, table: Complexes) -> None:
        if len(table) == 1:
            table = np.ones((1, 1), dtype=complex)  # the same for all rows: no column of its own
        elif len(table) > 1:
            table = compressed(table)
        self.columns = table if self.columns is None else _multiplied(self.columns, table)


def _multiplied(one: Complexes, other: Complexes) -> Complexes:
    rows = max(len(one), len(other))
    wide = [np.broadcast_to(table, (rows, table.shape[1])) for table in (one, other)]
    return compressed(products(*wide))
