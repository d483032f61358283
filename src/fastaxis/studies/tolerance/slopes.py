"""How a figure of merit answers to small errors: exact where powers are trigonometric sums, else by differences."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements.base import ANGLES
from fastaxis.studies.tolerance.causes import Causes
from fastaxis.studies.tolerance.preparing import summed
from fastaxis.studies.tolerance.reading import Reading

__all__ = ["Answer", "Slope", "answer_rows", "answers", "difference", "difference_rows", "exact_slopes"]

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


def exact_slopes(train: Any, causes: Causes, reading: Reading, options: dict[str, Any]) -> tuple[dict[str, Slope], ...]:
    """For each figure of merit, derivatives by angles of powers that are trigonometric sums of them.

    Angles that refuse a full turn, or whose powers are found to be other than such sums, are left out.
    """
    angles = [k for k, name in enumerate(causes.names) if name.partition(".")[2] in ANGLES]
    found: tuple[dict[str, Slope], ...] = tuple({} for _ in reading.merits)
    if not angles or reading.kind != "powers":
        return found
    tried = np.concatenate([ANGLES_TRIED, BETWEEN])
    # Only angles are turned: what else is in error stays as declared.
    turned = Causes((), {causes.names[k]: causes.nominal[causes.names[k]] for k in angles})
    rows = np.zeros((len(angles), len(tried), len(angles)))
    for place in range(len(angles)):
        rows[place, :, place] = tried
    try:
        work = summed(train, turned, rows.reshape(-1, len(angles)), reading, options)
    except ValueError:
        return found  # some part refuses a full turn
    if work is None:
        return found
    stokes = work.stokes().reshape(len(angles), len(tried), -1, 4)
    for place, name in enumerate(turned.names):
        here, between = stokes[place, :COUNT], stokes[place, COUNT:]
        guess = np.tensordot(_kernel(BETWEEN), here, axes=1)
        if np.abs(guess - between).max() <= EXACT * max(np.abs(here).max(), 1e-300):
            moved = np.tensordot(_derivative(), here, axes=1)
            for slopes, merit in zip(found, work.reading.merits, strict=True):
                value = merit.slope(here[COUNT // 2], moved)
                slopes[name] = Slope(value, 0.0 if math.isfinite(value) else math.nan, exact=True)
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


STEPS = np.array([0.5, -0.5, 0.25, -0.25])  # standard deviations


def difference_rows(widths: Reals) -> Reals:
    """Offsets that derivatives are told from by differences, four rows for each parameter."""
    return np.concatenate([np.outer(STEPS, row) for row in np.diag(widths)])


def difference(values: Reals, width: float) -> Slope:
    """Central differences over two steps, extrapolated to a step of zero; their difference gives the error.

    Parameters
    ----------
    values : of the figure of merit at its four rows.
    width : standard deviation of the parameter.
    """
    if width == 0:
        return Slope(math.nan, math.nan, exact=False)
    a, b, c, d = values.tolist()
    wide, narrow = (a - b) / width, 2 * (c - d) / width
    # What is left of a central difference falls with the square of the step.
    return Slope((4 * narrow - wide) / 3, abs(narrow - wide) / 3, exact=False)


def answer_rows(causes: Causes) -> Reals:
    """Offsets that say what each independent error does: none, then each one up, then each one down."""
    moved = causes.directions * np.array([error.sigma for error in causes.errors])[:, None]
    return np.concatenate([np.zeros((1, len(causes.names))), moved, -moved])


def answers(causes: Causes, values: Reals) -> tuple[Answer, ...]:
    """What each independent error does over about its own standard deviation, from the values at those rows."""
    sigmas = np.array([error.sigma for error in causes.errors])
    start, above, below = values[0], *np.split(values[1:], 2)
    with np.errstate(invalid="ignore", divide="ignore"):
        first = np.where(sigmas > 0, (above - below) / (2 * sigmas), 0.0)
        second = np.where(sigmas > 0, (above - 2 * start + below) / sigmas**2, 0.0)
    return tuple(Answer(float(a), float(c)) for a, c in zip(first, second, strict=True))
