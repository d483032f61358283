"""Every picture of parameters the light is linear in, from a few propagations."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from functools import reduce
from itertools import product
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import merge_guards, recorded, sensor_at
from fastaxis.engines.combining import combined, combines
from fastaxis.engines.sharing import Relay
from fastaxis.plan import Plan, make_plan
from fastaxis.studies.knobs import Knobs
from fastaxis.studies.spanning import Span, products, spanning, squares

__all__ = ["Family", "make_family"]

Reals = NDArray[np.float64]


@dataclass(frozen=True, kw_only=True, eq=False)
class Family:
    """Stokes images of a few chosen values, and what each other value makes of them.

    Parameters
    ----------
    tables : for each group of parameters, (values, chosen): every value as a combination of the chosen ones.
    images : S0 .. S3 at all combinations of chosen values [W per pixel], shape (4, chosen, ny, nx).
    x, y : columns and rows of the picture [m].
    pixel : of the sensor [m]; None for a detector.
    orientation : of the sensor.
    guard : the worst of the propagations.
    plan : of the first propagation.
    propagations : how many it took.
    """

    tables: tuple[Reals, ...]
    images: Reals
    x: Reals
    y: Reals
    pixel: float | None
    orientation: str
    guard: Any
    plan: Plan
    propagations: int

    def shares(self, places: Sequence[NDArray[np.intp]], count: int) -> Reals:
        """Weights of the images, (count, chosen), at so many places, given in each group of parameters."""
        rows = [table[place] for table, place in zip(self.tables, places, strict=True)]
        return reduce(products, rows, np.ones((count, 1)))

    def contracted(self, weights: Reals) -> Reals:
        """The images behind an analyzer of these four weights, (chosen, pixels)."""
        return np.asarray((weights @ self.images.reshape(4, -1)).reshape(self.images.shape[1], -1))


def make_family(
    train: Any,
    target: str,
    groups: Sequence[Knobs],
    answers: Sequence[NDArray[np.complex128]],
    *,
    relay: Relay,
    grid: Any = None,
    engine: str = "auto",
    done: Callable[[int], None],
) -> Family:
    """Propagate the few values that span all the others, and take their pictures.

    A field linear in n numbers has Stokes images linear in the up to n^2 products of pairs of them. Both spans are
    found from the values themselves: of fields propagated at the fewest values, and of pictures, made of sums
    of those fields, at the fewest values again. A plate's axis takes 3 fields and 5 pictures (a half-wave plate's 2
    and 3), a retardance 2 and 3.

    Parameters
    ----------
    train, target : with the parameters outside of the groups at their values.
    groups : parameters the field is linear in, each group for itself.
    answers : for each group, the table from :func:`fastaxis.studies.response.response`.
    relay : carries light that earlier families share with this one.
    done : called after each propagation with the number that is needed in all.
    """
    fields = [spanning(table) for table in answers]
    pictures = [spanning(squares(span.coefficients)) for span in fields]
    first = make_plan(_at(train, groups, [span.nodes[:1] for span in fields])[0], target, grid=grid, engine=engine)
    sensor = sensor_at(train, target)
    summed = bool(fields) and combines(first.engine, totals=not hasattr(sensor, "pixel"))
    chosen = fields if summed else pictures
    trains = _at(train, groups, [span.nodes for span in chosen])
    plans = [first] if len(trains) == 1 else [make_plan(each, target, grid=grid, engine=engine) for each in trains]
    lights = []
    for light in relay.propagate(plans):
        lights.append(light)
        done(len(plans))
    shots = [recorded(sums, sensor) for sums in (_sums(first.engine, lights, fields, pictures) if summed else lights)]
    return Family(
        tables=tuple(span.coefficients for span in pictures),
        images=np.stack([stokes for stokes, _, _ in shots], axis=1),
        x=shots[0][1],
        y=shots[0][2],
        pixel=getattr(sensor, "pixel", None),
        orientation=getattr(sensor, "orientation", "upright"),
        guard=merge_guards([field.guard for light in lights for field in light]),
        plan=plans[0],
        propagations=len(plans),
    )


def _at(train: Any, groups: Sequence[Knobs], nodes: Sequence[NDArray[np.intp]]) -> list[Any]:
    """Trains at every combination of nodes, the last group running fastest."""
    trains = []
    for places in product(*nodes):
        changes = [group.at(int(place)) for group, place in zip(groups, places, strict=True)]
        trains.append(train.with_changes({name: value for change in changes for name, value in change.items()}))
    return trains


def _sums(engine: str, lights: list[Any], fields: list[Span], pictures: list[Span]) -> Any:
    """The light at each combination of values whose picture is needed, as sums of the fields propagated."""
    for places in product(*(span.nodes for span in pictures)):
        rows = [span.coefficients[[place]] for span, place in zip(fields, places, strict=True)]
        yield combined(engine, lights, reduce(products, rows, np.ones((1, 1), dtype=complex))[0])
