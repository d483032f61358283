"""Errors to be expected, worked out when somebody asks: they take a finer integral, which no picture needs."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Protocol

__all__ = ["Estimate", "Known", "total"]


class Estimate(Protocol):
    """What one step on the way adds to the error of a field."""

    @property
    def error(self) -> float:
        """As a share of the peak."""


@dataclass(frozen=True)
class Known:
    """An error that is known already, as a share of the peak."""

    error: float


def total(estimates: Iterable[Estimate]) -> float:
    """The sum of them, as if no two errors ever cancelled.

    >>> total([Known(0.25), Known(0.5)])
    0.75
    """
    return float(sum(estimate.error for estimate in estimates))
