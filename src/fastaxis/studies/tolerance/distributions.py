"""How far off a value may be: normal, uniform, triangular, or always at one of its limits."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.special import ndtri

from fastaxis.checks import number
from fastaxis.errors import ParameterError

__all__ = ["Distribution", "normal", "triangular", "uniform", "worst_case"]

Reals = NDArray[np.float64]
KINDS = ("normal", "uniform", "triangular", "worst_case")
# Standard deviation per width, limit per width, and fourth moment per squared variance.
SHAPES = {
    "normal": (1.0, 3.0, 3.0),
    "uniform": (1 / math.sqrt(3), 1.0, 1.8),
    "triangular": (1 / math.sqrt(6), 1.0, 2.4),
    "worst_case": (1.0, 1.0, 1.0),
}


@dataclass(frozen=True)
class Distribution:
    """An error about zero, symmetric; made by :func:`normal`, :func:`uniform`, :func:`triangular`, :func:`worst_case`.

    Parameters
    ----------
    kind : name of the shape.
    width : standard deviation of a normal error, largest value of the others [unit of the parameter].
    """

    kind: str
    width: float

    def __post_init__(self) -> None:
        width = number(self.kind, "width", self.width, fix=f"{self.kind}(0.5*deg)")
        if not width >= 0:
            raise ParameterError(
                "the width of an error is zero or more", got=f"{self.kind}({width:g})", fix=f"{self.kind}({-width:g})"
            )
        object.__setattr__(self, "width", width)

    @property
    def sigma(self) -> float:
        """Standard deviation."""
        return self.width * SHAPES[self.kind][0]

    @property
    def limit(self) -> float:
        """What counts as its worst case: the largest value; three standard deviations of a normal error."""
        return self.width * SHAPES[self.kind][1]

    @property
    def kurtosis(self) -> float:
        """Fourth moment over the square of the variance."""
        return SHAPES[self.kind][2]

    def values(self, shares: Reals) -> Reals:
        """The errors below which these shares (0 .. 1) of all errors lie."""
        return np.asarray(self.width * _unit(self.kind, shares))

    def __str__(self) -> str:
        return f"{self.kind}({self.width:g})"


def _unit(kind: str, shares: Reals) -> Any:
    if kind == "normal":
        return ndtri(np.clip(shares, 1e-16, 1 - 1e-16))
    if kind == "uniform":
        return 2 * shares - 1
    if kind == "triangular":
        lower = np.sqrt(2 * np.minimum(shares, 1 - shares)) - 1
        return np.where(shares < 0.5, lower, 0.0 - lower)
    return np.where(shares < 0.5, -1.0, 1.0)


def normal(sigma: float) -> Distribution:
    """A normal error of this standard deviation.

    >>> round(float(normal(2.0).values(np.array([0.8413447460685429]))[0]), 9)
    2.0
    """
    return Distribution("normal", sigma)


def uniform(half_width: float) -> Distribution:
    """An error anywhere between -half_width and +half_width with equal chance.

    >>> uniform(3.0).values(np.array([0.0, 0.5, 0.75])).tolist()
    [-3.0, 0.0, 1.5]
    """
    return Distribution("uniform", half_width)


def triangular(half_width: float) -> Distribution:
    """An error between -half_width and +half_width, most often near zero: the sum of two equal uniform ones.

    >>> triangular(1.0).values(np.array([0.0, 0.125, 0.5, 1.0])).tolist()
    [-1.0, -0.5, 0.0, 1.0]
    """
    return Distribution("triangular", half_width)


def worst_case(limit: float) -> Distribution:
    """An error that is always at one of its limits, either with equal chance: a stop screwed to one side.

    >>> worst_case(0.5).values(np.array([0.1, 0.9])).tolist()
    [-0.5, 0.5]
    """
    return Distribution("worst_case", limit)
