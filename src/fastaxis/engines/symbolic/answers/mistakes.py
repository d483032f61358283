"""Which small error shows first in a frame, and where."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from math import pi
from typing import Any

import numpy as np
import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI
from fastaxis.engines.symbolic.presentations.series import series_terms
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.slopes import set_to_zero

__all__ = ["Mistake", "ranked_mistakes"]

HIGHEST = 4  # an error that shows in no order up to this one does not show


@dataclass(frozen=True)
class Mistake:
    """How one small error changes a frame.

    Parameters
    ----------
    error : its symbol.
    order : the lowest power of the error that changes the frame; 0 if it never does.
    change : that first term.
    azimuth : where around the axis it is largest [rad]; None where it is the same all round or has letters left.
    """

    error: Any
    order: int
    change: Any
    azimuth: float | None


def ranked_mistakes(frame: Poly, small: Sequence[Any]) -> tuple[Mistake, ...]:
    """Errors by the order in which they show: an error in first order long before one in second."""
    return tuple(sorted((_mistake(frame, error, small) for error in small), key=lambda m: m.order or HIGHEST + 1))


def _mistake(frame: Poly, error: Any, small: Sequence[Any]) -> Mistake:
    alone = set_to_zero(frame, [other for other in small if other != error])
    for order in range(1, HIGHEST + 1):
        terms = series_terms(alone, [error], order)
        term = terms.get((error,) * order)
        if term is not None:
            return Mistake(error, order, term, _largest(term / error**order))
    return Mistake(error, 0, sp.S.Zero, None)


def _largest(change: Any) -> float | None:
    if change.free_symbols != {PHI}:
        return None
    azimuths = np.linspace(0, 2 * pi, 3600, endpoint=False)
    return float(azimuths[np.argmax(np.abs(sp.lambdify(PHI, change)(azimuths)))])
