"""How the light at a target answers to a group of parameters: linear in a few numbers, or not."""

from __future__ import annotations

from collections.abc import Iterator
from functools import reduce
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import WiringError
from fastaxis.plan.binding import bound
from fastaxis.studies.coordinates import coordinates
from fastaxis.studies.knobs import Knobs
from fastaxis.studies.spanning import compressed, products

__all__ = ["response"]

Complexes = NDArray[np.complex128]


def response(train: Any, target: str, knobs: Knobs) -> Complexes | None:
    """A table with a row for each value of the knobs, such that the field at the target is linear in the row.

    The laws of the swept parts are asked for at every value and compared, so any part whose laws move in such a way
    qualifies. A field is linear in the coordinates of each law it passed, so in their products: a plate passed
    twice is of second degree, and so are two plates turned together.

    Parameters
    ----------
    train : with numbers everywhere.
    target : where light is looked at.
    knobs : the parameters.

    Returns
    -------
    complex (values, columns); None where the values change more than coordinates of laws: the source, the sensor,
    the wavelength, or what a law does from place to place; and where light comes by several paths.
    """
    try:
        route = train.route(target)
    except WiringError:
        return None  # by several paths: there is no one row of laws
    swept = {name.partition(".")[0] for name in knobs.names}
    if swept & {"wavelength", route.source_name, target.partition(".")[0]}:
        return None
    passed = [(leg.element_name, leg.entered, leg.left) for leg in route.legs if leg.element_name in swept]
    lines = [float(part.wavelength_or(train.wavelength)) for part in route.laser.source.components]
    tables = [_of_line(train, knobs, passed, line) for line in dict.fromkeys(lines)]
    if any(table is None for table in tables):
        return None
    return np.concatenate([table for table in tables if table is not None], axis=1)


def _of_line(train: Any, knobs: Knobs, passed: list[tuple[str, str, str]], wavelength: float) -> Complexes | None:
    """The table for light of one wavelength."""
    frames, vectors = None, []
    for index in range(len(knobs)):
        elements = train.with_changes(knobs.at(index)).elements
        pairs = list(_coordinates(elements, passed, wavelength))
        if frames is None:
            frames = [frame for frame, _ in pairs]
        elif frames != [frame for frame, _ in pairs]:
            return None
        vectors.append([vector for _, vector in pairs])
    return reduce(_multiplied, _columns(vectors), np.ones((len(knobs), 1), dtype=complex))


def _coordinates(
    elements: Any, passed: list[tuple[str, str, str]], wavelength: float
) -> Iterator[tuple[Any, Complexes]]:
    for name, entered, left in passed:
        for law in elements[name].passages(wavelength)[entered, left].steps():
            yield coordinates(bound(law))


def _columns(vectors: list[list[Complexes]]) -> Iterator[Complexes]:
    """The coordinates of each law at all values, of laws that change at all."""
    for table in (np.array(column) for column in zip(*vectors, strict=True)):
        if (table != table[0]).any():
            yield table


def _multiplied(one: Complexes, other: Complexes) -> Complexes:
    return products(compressed(one), compressed(other))
