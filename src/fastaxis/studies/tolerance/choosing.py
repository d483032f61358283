"""How each figure of merit is read: off sums, off a response surface that was found good enough, or draw by draw."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import FastaxisError
from fastaxis.studies.tolerance.causes import Causes
from fastaxis.studies.tolerance.preparing import anew, prepared
from fastaxis.studies.tolerance.reading import Reading
from fastaxis.studies.tolerance.responding import Responding, stiff_names
from fastaxis.studies.tolerance.surface import Surface
from fastaxis.studies.tolerance.working import Anew, Summed, Work

__all__ = ["Chosen", "Wish", "chosen"]

Reals: TypeAlias = NDArray[np.float64]

RANDOM, FARTHEST = 12, 4
SPREAD = 200  # draws that the spread is judged from; that knows it to 5 %
MORE = 8  # times as many points as a polynomial begins with, at most
# A surface is given up when so many times as many points as it began with have not taken a tenth off its error: even
# then they are few beside the draws.
PATIENCE, BETTER = 2, 0.9
# Samples off the axis are good to 1e-3 or so: a millionth of what is read, or of a radian, is nothing to improve on.
NOTHING = 1e-6


@dataclass(frozen=True)
class Wish:
    """How good a surface must be, and which rows of errors are draws.

    Parameters
    ----------
    accuracy : largest root mean square error, as a share of the standard deviation of a figure of merit; 0 for none.
    first : row of the first draw.
    seed : of the choice of fresh draws.
    """

    accuracy: float
    first: int
    seed: int


@dataclass(frozen=True, eq=False)
class Chosen:
    """Work, and for each of its figures of merit the surface it is or was tried with; None where none was tried."""

    work: Work
    surfaces: tuple[Surface | None, ...]


def chosen(
    train: Any, causes: Causes, offsets: Reals, reading: Reading, *, options: dict[str, Any], wish: Wish
) -> list[Chosen]:
    """The works of figures of merit of one light.

    Parameters
    ----------
    offsets : (rows, parameters), the draws and what else is asked.
    """
    exact = anew(train, causes, offsets, reading, options)
    alone = [Chosen(exact, (None,) * len(reading.merits))]
    if reading.kind == "train":
        return alone
    stiff = stiff_names(train, causes, offsets, reading.target)
    if not stiff:
        return [Chosen(prepared(train, causes, offsets, reading, options), (None,) * len(reading.merits))]
    if not wish.accuracy or reading.knob in stiff:
        return alone
    try:
        made = Responding(train, causes, offsets, reading, stiff=stiff, options=options)
        return _tried(made, exact, stiff, wish) or alone
    except FastaxisError:
        return alone  # all errors at their ends together may be no bench, where each draw is one


def _tried(made: Responding, exact: Anew, stiff: tuple[str, ...], wish: Wish) -> list[Chosen] | None:
    """Points are added until the surface is good enough, or no better for it; None if draws alone are cheaper."""
    start, draws = made.polynomials.start, len(exact.changes) - wish.first
    looks = RANDOM + FARTHEST
    most = min(MORE * len(start), (draws // 2 - looks) // made.cost)
    if len(start) > most or not all(map(made.take, start)):
        return None
    check = _Check(made, exact, wish)
    best, since = check.worst, len(start)
    while not check.good.all() and len(made.polynomials) < min(most, since + PATIENCE * len(start)):
        further = made.polynomials.next()
        if not further:
            break
        if not all(map(made.take, further)):
            return None
        check.look()
        if check.worst < BETTER * best:
            best, since = check.worst, len(made.polynomials)
    return check.result(exact, stiff)


class _Check:
    """Fresh draws read both ways."""

    def __init__(self, made: Responding, exact: Anew, wish: Wish) -> None:
        self._made, self._draws = made, len(exact.changes) - wish.first
        some = np.random.default_rng([wish.seed, 1]).choice(self._draws, min(RANDOM, self._draws), replace=False)
        far = np.argsort(-made.distances[wish.first :], kind="stable")[:FARTHEST]
        self._rows = wish.first + np.concatenate([some, far])
        self._random = len(some)
        self._exact = exact.rows(self._rows).values()
        work = made.summed()
        sample = work.rows(slice(wish.first, wish.first + SPREAD)).values()
        with np.errstate(invalid="ignore"):
            self._spread = np.array([float(np.nanstd(one)) if np.isfinite(one).any() else 0.0 for one in sample.T])
        size = [1.0 if getattr(m, "unit", "") in ("rad", "") else float(np.nanmax(np.abs(one), initial=0.0))
                for m, one in zip(exact.reading.merits, self._exact.T, strict=True)]  # fmt: skip
        self._enough = np.maximum(wish.accuracy * self._spread, NOTHING * np.array(size))
        self.look()

    def look(self) -> None:
        """Compare again."""
        self.work: Summed = self._made.summed()
        found = self.work.rows(self._rows).values()
        apart = np.stack(
            [m.apart(a, b) for m, a, b in zip(self.work.reading.merits, found.T, self._exact.T, strict=True)]
        )
        self.errors = np.sqrt((apart[:, : self._random] ** 2).mean(axis=1))
        self.largest = apart.max(axis=1)

    @property
    def good(self) -> NDArray[np.bool_]:
        """Of each figure of merit."""
        return np.asarray(self.errors <= self._enough)

    @property
    def worst(self) -> float:
        """Largest error as a multiple of what is good enough."""
        return float((self.errors / np.maximum(self._enough, 1e-300)).max())

    def result(self, exact: Anew, stiff: tuple[str, ...]) -> list[Chosen]:
        good = self.good.tolist()
        count = len(self._made.polynomials)
        with np.errstate(divide="ignore", invalid="ignore"):
            shares = np.where(self.errors > 0, self.errors / self._spread, 0.0)
        told = [
            Surface(
                parameters=stiff, points=count, propagations=count * self._made.cost + len(self._rows),
                fresh=len(self._rows), error=float(error), largest=float(most), share=float(share), used=used,
            )
            for error, most, share, used in zip(self.errors, self.largest, shares, good, strict=True)
        ]  # fmt: skip
        sides: list[tuple[Work, bool]] = [(self.work, True), (exact, False)]
        return [
            Chosen(work.only([one == side for one in good]), tuple(t for t in told if t.used == side))
            for work, side in sides if side in good
        ]  # fmt: skip
