"""A tolerance study in words and tables, in the units of the lab."""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import TYPE_CHECKING

import numpy as np

from fastaxis.conventions import stamp
from fastaxis.studies.tolerance.quantities import lab_quantity, lab_step, lab_value

if TYPE_CHECKING:
    from fastaxis.studies.tolerance.causes import Cause
    from fastaxis.studies.tolerance.result import Tolerance
    from fastaxis.studies.tolerance.slopes import Slope

__all__ = ["told"]

LEAST = 0.0005  # of the variance; causes of less are named together
ROUNDINGS = 1e-12  # of a figure of merit: a slope that moves it by less is none


def told(study: Tolerance) -> str:
    """Errors, then for each figure of merit its spread, what causes it and its slopes; closed by the line of signs."""
    lines = [f"Tolerances of {study.train.name}: {len(study.values)} draws, seed {study.seed}"]
    lines += [f"  {cause.label}: {_errors(cause)}" for cause in study.causes.causes]
    for name in study.merits:
        lines += _about(study, name)
    if study.limits:
        lines.append(f"within all limits: {study.yield_}, 95 % sure")
    return "\n".join([*lines, stamp()])


def _errors(cause: Cause) -> str:
    """The shapes and widths of its errors; of several at once, by how much each parameter is moved."""
    shapes = ", ".join(dict.fromkeys(error.kind for error in cause.errors))
    widths = np.array([error.width for error in cause.errors])
    sizes = np.hypot.reduce(cause.directions * widths[:, None], axis=0)
    moved = [lab_value(name.rpartition(".")[2], float(size)) for name, size in zip(cause.names, sizes, strict=True)]
    return f"{shapes}({moved[0]})" if len(moved) == 1 else f"{shapes}, together by {', '.join(moved)}"


def _about(study: Tolerance, name: str) -> Iterator[str]:
    unit, values = getattr(study.merits[name], "unit", ""), study.samples[name]
    read = values[~np.isnan(values)]

    def lab(value: float) -> str:
        return lab_quantity(value, unit)

    known = math.isfinite(study.nominal[name])
    yield f"{name}: {lab(study.nominal[name]) if known else 'could not be read'} as declared"
    if read.size:
        low, middle, high = (lab(study.percentile(share, name)) for share in (5, 50, 95))
        yield f"  drawn: 5 % {low}, 50 % {middle}, 95 % {high}; standard deviation {lab(float(read.std()))}"
    if name in study.surfaces:
        yield f"  {study.surfaces[name]}"
    if len(read) < len(values):
        yield f"  {len(values) - len(read)} draws could not be read"
    if known:
        yield f"  worst case: {lab(study.worst[name].low)} to {lab(study.worst[name].high)}"
        yield from _causes(study, name, unit)
    else:
        yield "  so worst case, causes and slopes are not known"
    if name in study.limits:
        yield f"  within its limits: {study.yield_of(name)}"


def _causes(study: Tolerance, name: str, unit: str) -> Iterator[str]:
    ranking = study.rankings[name]
    for one in ranking:
        if one.share >= LEAST:
            yield f"  {100 * one.share:5.1f} %  {one.cause} (alone {lab_quantity(one.sigma, unit)})"
    small = [one.cause for one in ranking if not one.share >= LEAST]
    if small:
        yield f"  below {100 * LEAST:g} % each: {', '.join(small)}"
    for parameter, slope in study.sensitivities[name].items():
        yield f"  slope with {parameter}: {_slope(slope, parameter, unit, study.nominal[name])}"


def _slope(slope: Slope, parameter: str, unit: str, nominal: float) -> str:
    step, word = lab_step(parameter.rpartition(".")[2])
    moved = slope.value * step
    if abs(moved) <= ROUNDINGS * abs(nominal):
        return "none"
    known = "exact" if slope.exact else f"+- {lab_quantity(slope.error * step, unit, digits=1)}"
    return f"{lab_quantity(moved, unit, digits=4)} per {word} ({known})"
