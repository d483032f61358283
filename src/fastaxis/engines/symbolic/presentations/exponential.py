"""A form as a sum of exponentials: the ring's own form."""

from __future__ import annotations

from typing import Any

from fastaxis.engines.symbolic.expressions import as_sum
from fastaxis.engines.symbolic.ring import Poly

__all__ = ["exponential"]


def exponential(poly: Poly) -> Any:
    """The sum of c exp(i angle), canonical: equal forms have equal terms."""
    return as_sum(poly)
