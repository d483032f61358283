"""How a figure of merit answers to small errors: exact where powers are trigonometric sums, else by differences."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements.base import ANGLES
from fastaxis.studies.tolerance.causes import Causes
from fastaxis.studies.tolerance.merits import StokesMerit
from fastaxis.studies.tolerance.working import Merit, Summed, prepared

__all__ = ["Answer", "Slope", "answers", "slopes"]

Reals: TypeAlias = NDArray[np.float64]

# Powers hold up to four times an angle for each time light meets the part: 33 values serve four times.
COUNT = 33
ANGLES_TRIED = 2 * math.pi * (np.arange(COUNT) - COUNT // 2) / COUNT
BETWEEN = np.array([0.1, -1.3])  # two more places, where the sum must agree
EXACT = 1e-11  # of the largest power: a few dozen products of numbers good to 1e-14


@dataclass(frozen=True)
class Slope:
    """First derivative of a figure of merit with respect to one parameter, where everything is as declared.

    Parameters
    ----------
    value : [unit of the merit per unit of the parameter].
    error : of the value; 0 where it is exact, nan where there is no derivative.
    exact : whether it follows from the trigonometric form of the laws.
    """

    value: float
    error: float
    exact: bool


@dataclass(frozen=True)
class Answer:
    """What one independent error does by itself, to second order: slope * e + curvature * e^2 / 2.

    Parameters
    ----------
    slope, curvature : per unit of the error, and of its square.
    """

    slope: float
    curvature: float

    def variance(self, sigma: float, kurtosis: float) -> float:
        """Variance of the merit: a^2 s^2 + c^2 s^4 (kurtosis - 1)/4."""
        return self.slope**2 * sigma**2 + self.curvature**2 * sigma**4 * (kurtosis - 1) / 4

    def shift(self, error: float) -> float:
        """Change of the merit."""
        return self.slope * error + self.curvature * error**2 / 2


def slopes(train: Any, causes: Causes, merit: Merit, widths: Reals, options: dict[str, Any]) -> dict[str, Slope]:
    """The derivative with respect to each parameter.

    Parameters
    ----------
    widths : typical size of the error of each parameter; differences are taken over half and a quarter of it.
    """
    exact = _exact(train, causes, merit, options) if isinstance(merit, StokesMerit) else {}
    rest = [k for k, name in enumerate(causes.names) if name not in exact]
    differences = _differences(train, causes, merit, rest=rest, widths=widths, options=options) if rest else {}
    return {name: exact.get(name) or differences[name] for name in causes.names}


def _exact(train: Any, causes: Causes, merit: StokesMerit, options: dict[str, Any]) -> dict[str, Slope]:
    """Derivatives by angles, of powers that are trigonometric sums of the angle and were shown to be."""
    angles = [k for k, name in enumerate(causes.names) if name.partition(".")[2] in ANGLES]
    if not angles:
        return {}
    tried = np.concatenate([ANGLES_TRIED, BETWEEN])
    rows = np.zeros((len(angles), len(tried), len(causes.names)))
    for place, k in enumerate(angles):
        rows[place, :, k] = tried
    try:
        work = prepared(train, causes, rows.reshape(-1, len(causes.names)), merit, options)
    except ValueError:
        return {}  # some part refuses a full turn
    if not isinstance(work, Summed):
        return {}
    stokes = work.stokes().reshape(len(angles), len(tried), -1, 4)
    found = {}
    for place, k in enumerate(angles):
        here, between = stokes[place, :COUNT], stokes[place, COUNT:]
        guess = np.tensordot(_kernel(BETWEEN), here, axes=1)
        if np.abs(guess - between).max() <= EXACT * max(np.abs(here).max(), 1e-300):
            value = merit.slope(here[COUNT // 2], np.tensordot(_derivative(), here, axes=1))
            found[causes.names[k]] = Slope(value, 0.0 if math.isfinite(value) else math.nan, exact=True)
    return found


def _kernel(places: Reals) -> Reals:
    """Values of a trigonometric sum at places from those at equal steps of a turn, (places, COUNT)."""
    orders = np.arange(1, COUNT // 2 + 1)
    apart = places[:, None] - ANGLES_TRIED
    return np.asarray((1 + 2 * np.cos(apart[..., None] * orders).sum(axis=2)) / COUNT)


def _derivative() -> Reals:
    """Weights of the derivative at zero of a trigonometric sum known at equal steps of a turn."""
    orders = np.arange(1, COUNT // 2 + 1)
    return np.asarray(2 * (orders * np.sin(np.multiply.outer(ANGLES_TRIED, orders))).sum(axis=1) / COUNT)


def _differences(
    train: Any, causes: Causes, merit: Merit, *, rest: list[int], widths: Reals, options: dict[str, Any]
) -> dict[str, Slope]:
    """Central differences over two steps, extrapolated to a step of zero; their difference gives the error."""
    steps = np.array([0.5, -0.5, 0.25, -0.25])
    rows = np.zeros((len(rest), 4, len(causes.names)))
    for place, k in enumerate(rest):
        rows[place, :, k] = steps * widths[k]
    values = prepared(train, causes, rows.reshape(-1, len(causes.names)), merit, options).values().reshape(-1, 4)
    found = {}
    for k, (a, b, c, d) in zip(rest, values, strict=True):
        if widths[k] == 0:
            found[causes.names[k]] = Slope(math.nan, math.nan, exact=False)
            continue
        wide, narrow = (a - b) / widths[k], 2 * (c - d) / widths[k]
        # What is left of a central difference falls with the square of the step.
        found[causes.names[k]] = Slope(float((4 * narrow - wide) / 3), float(abs(narrow - wide) / 3), exact=False)
    return found


def answers(train: Any, causes: Causes, merit: Merit, options: dict[str, Any]) -> tuple[float, tuple[Answer, ...]]:
    """The merit as declared, and what each independent error does over about its own standard deviation."""
    sigmas = np.array([error.sigma for error in causes.errors])
    moved = causes.directions * sigmas[:, None]
    rows = np.concatenate([np.zeros((1, len(causes.names))), moved, -moved])
    values = prepared(train, causes, rows, merit, options).values()
    start, above, below = values[0], *np.split(values[1:], 2)
    with np.errstate(invalid="ignore", divide="ignore"):
        first = np.where(sigmas > 0, (above - below) / (2 * sigmas), 0.0)
        second = np.where(sigmas > 0, (above - 2 * start + below) / sigmas**2, 0.0)
    return float(start), tuple(Answer(float(a), float(c)) for a, c in zip(first, second, strict=True))
