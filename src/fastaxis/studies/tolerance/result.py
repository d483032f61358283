"""What a tolerance study found."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from os import PathLike
from pathlib import Path
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import FileFormatError, ParameterError
from fastaxis.files import write_whole
from fastaxis.loader import late
from fastaxis.studies.tolerance.causes import Causes
from fastaxis.studies.tolerance.slopes import Slope
from fastaxis.studies.tolerance.surface import Surface
from fastaxis.studies.tolerance.telling import told
from fastaxis.studies.tolerance.yields import Yield, wilson

__all__ = ["Contribution", "Range", "Tolerance"]

Reals: TypeAlias = NDArray[np.float64]
Limits: TypeAlias = tuple[float | None, float | None]


@dataclass(frozen=True)
class Contribution:
    """What one cause adds to the variance of a figure of merit, by itself and to second order.

    Parameters
    ----------
    cause : its parameters.
    sigma : standard deviation it causes [unit of the merit].
    share : of the sum over all causes.
    """

    cause: str
    sigma: float
    share: float


@dataclass(frozen=True)
class Range:
    """Lowest and highest value of a figure of merit at corners of the errors: all at a limit or at zero.

    The corners are those that slopes and curvatures point to; an answer that bends otherwise may go further.
    """

    low: float
    high: float


@dataclass(frozen=True, kw_only=True, eq=False)
class Tolerance:
    """Sensitivities, ranking, worst case and draws of a tolerance study. ``print(found)`` tells them.

    Parameters
    ----------
    train : as declared.
    causes : of error.
    merits : name -> what was read.
    limits : name -> (lowest, highest) that is still good, None for no limit.
    nominal : name -> value without errors.
    sensitivities : name -> {parameter: slope}.
    rankings : name -> contributions, the largest first.
    worst : name -> range at the corners.
    offsets : (draws, parameters), the errors drawn.
    values : (draws, merits).
    seed : of the draws.
    surfaces : name -> the response surface it was read off, or that was tried and not good enough; those without one
        were read exactly at every draw.
    """

    train: Any = field(repr=False)
    causes: Causes = field(repr=False)
    merits: Mapping[str, Any] = field(repr=False)
    limits: Mapping[str, Limits]
    nominal: Mapping[str, float]
    sensitivities: Mapping[str, Mapping[str, Slope]]
    rankings: Mapping[str, tuple[Contribution, ...]]
    worst: Mapping[str, Range]
    offsets: Reals = field(repr=False)
    values: Reals = field(repr=False)
    seed: int
    surfaces: Mapping[str, Surface] = field(default_factory=dict)

    @property
    def samples(self) -> dict[str, Reals]:
        """The value of each figure of merit at each draw."""
        return {name: self.values[:, k] for k, name in enumerate(self.merits)}

    @property
    def ranking(self) -> tuple[Contribution, ...]:
        """The contributions to the first figure of merit, the largest first."""
        return self.rankings[next(iter(self.merits))]

    def _named(self, merit: str | None) -> str:
        name = next(iter(self.merits)) if merit is None else merit
        if name not in self.merits:
            raise ParameterError(
                f"the figures of merit are {', '.join(self.merits)}",
                got=f"tolerance: {name!r}",
                fix=repr(next(iter(self.merits))),
            )
        return name

    def good(self, merit: str | None = None) -> NDArray[np.bool_]:
        """Whether each draw is within the limits: of one figure of merit, or of all."""
        if merit is None:
            return np.asarray(np.logical_and.reduce([self.good(name) for name in self.merits]))
        low, high = self.limits.get(self._named(merit), (None, None))
        values = self.samples[merit]
        # A value that could not be read (nan) is not good where a limit is set.
        above = np.ones(len(values), bool) if low is None else values >= low
        return above & (np.ones(len(values), bool) if high is None else values <= high)

    @property
    def yield_(self) -> Yield:
        """Share of draws within all limits, with its confidence interval."""
        return wilson(int(self.good().sum()), len(self.values))

    def yield_of(self, merit: str) -> Yield:
        """Share of draws within the limits of one figure of merit."""
        return wilson(int(self.good(merit).sum()), len(self.values))

    def percentile(self, share: float, merit: str | None = None) -> float:
        """The value below which this share [%] of the draws lie; draws that could not be read are left out."""
        values = self.samples[self._named(merit)]
        read = values[~np.isnan(values)]
        return float(np.percentile(read, share)) if read.size else float("nan")

    def at_percentile(self, share: float, merit: str | None = None) -> Any:
        """The train as it stands at the draw nearest to a percentile.

        Raises
        ------
        ParameterError : no draw could be read.
        """
        apart = np.abs(self.samples[self._named(merit)] - self.percentile(share, merit))
        if np.isnan(apart).all():
            raise ParameterError(
                "a percentile needs a draw that could be read",
                got=f"tolerance: {self._named(merit)} is nan in all draws",
                fix="print(found)",
            )
        row = int(np.nanargmin(apart))
        return self.train.with_changes(self.causes.changes(self.offsets[row]))

    def text(self) -> str:
        """Everything in words and tables, in the units of the lab."""
        return told(self)

    __str__ = text

    def figures(self) -> Any:
        """Contributions, histograms and frames as matplotlib figures of A4 size."""
        return late("report.tolerance", "draw_tolerance")(self)

    def save(self, path: str | PathLike[str]) -> tuple[Path, ...]:
        """Write the report as .pdf (all pages), .png (a file a page) or .txt.

        Raises
        ------
        FileFormatError : another ending.
        """
        path = Path(path)
        if path.suffix == ".txt":
            text = f"{self.text()}\n".encode()
            return (write_whole(path, lambda file: file.write(text)),)
        if path.suffix in (".pdf", ".png"):
            pages: tuple[Path, ...] = late("report.paper", "save_pages")(self.figures(), path)
            return pages
        raise FileFormatError("a tolerance report is written as pdf, png or txt", got=str(path), fix='"tolerance.pdf"')
