"""Sums of coherent light at one target, for engines that can add their fields."""

from __future__ import annotations

from collections.abc import Sequence
from importlib import import_module

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import PlaneField

__all__ = ["combined", "combines"]


def combines(engine: str, *, totals: bool = False) -> bool:
    """Whether an engine can add fields; the others propagate so fast that another propagation costs as little.

    Parameters
    ----------
    engine : its name, as in a plan.
    totals : whether the sums will be asked for all their light, beside pictures.
    """
    room = import_module(f"fastaxis.engines.{engine}")
    return hasattr(room, "combined") and (not totals or getattr(room, "TOTALS_ADD", True))


def combined(
    engine: str, fields: Sequence[tuple[PlaneField, ...]], coefficients: NDArray[np.complex128]
) -> tuple[PlaneField, ...]:
    """The sum of coefficient * field for each incoherent part, of several answers of one engine to one target.

    Parameters
    ----------
    engine : its name, as in a plan.
    fields : the answers, each with one field for each incoherent part of the source.
    coefficients : one complex number an answer.
    """
    add = import_module(f"fastaxis.engines.{engine}").combined
    return tuple(add(parts, coefficients) for parts in zip(*fields, strict=True))
