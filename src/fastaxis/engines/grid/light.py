"""Sampled light: what the grid engine carries from step to step."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Any, NamedTuple, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.singular import Singular
from fastaxis.engines.grid.workers import strips
from fastaxis.laws import TravelLaw

__all__ = ["GridLight", "Rims", "Samples", "Steep", "axis", "curve", "inner", "multiply_separable", "stokes_sum"]

Samples: TypeAlias = NDArray[Any]
"""Complex numbers of double or single precision."""


@dataclass(frozen=True)
class Rims:
    """How close light came to the limits of its samples, as shares of its power.

    Parameters
    ----------
    edge, band : the largest share met near the edge of the window, and near that of the band.
    cut : removed by band limits.
    pattern : how many times as fine samples must be for the patterns put on them, which is no share.
    """

    edge: float = 0.0
    band: float = 0.0
    cut: float = 0.0
    pattern: int = 1


class Steep(NamedTuple):
    """Light that a singular point scatters beyond the band, as samples times pitch about it.

    Parameters
    ----------
    whole, kept : with that light and without it.
    place : x + iy of the point in its plane [m], as mirrors and turns have moved it since.
    pitch : of the samples there [m].
    turned : by how much less than the light these samples are turned [rad]: no quarter of a turn moves any to another.
    """

    whole: Samples
    kept: Samples
    place: complex
    pitch: float
    turned: float = 0.0

    @property
    def samples(self) -> tuple[Any, ...]:
        """What two of them have in common that are of the same samples."""
        place = round(self.place.real / self.pitch, 6), round(self.place.imag / self.pitch, 6)
        return self.whole.shape[1:], place, round(self.turned, 9), float(f"{self.pitch:.9g}")


@dataclass(frozen=True)
class GridLight:
    """Samples of a field whose mean phase curvature is kept apart.

    The field is ``samples * exp(i k curvature r^2/2)``, times ``jones`` while it is uniformly polarized. Samples lie
    at (i - (n - 1)/2) * pitch: symmetric about the axis, none on it, so that a reversal of x is exact.

    Parameters
    ----------
    samples : (1, n, n) times a Jones vector, or (2, n, n) as (Ex, Ey) [sqrt(W)/m].
    jones : (2,) of a uniformly polarized field, else None.
    pitch : [m].
    curvature : [1/m].
    wavelength : [m].
    periodic : whether a plane wave fills the window to its edge.
    rims : limits met on planes whose window and pitch grow with those at the source.
    turned_rims : on planes behind an odd number of single transforms: there the window grows as the source's pitch
        shrinks, and the pitch shrinks as the source's window grows.
    turned : whether the light is on such a plane.
    beyond : light that edges scatter beyond the band of the samples, as a share of what the samples hold.
    steep : light that singular points scatter beyond it.
    filled : waves along a side that hold the light, if known from the travel it comes from; None if not.
    room : samples along a side of its window, if those kept are the middle of it and all others dark; None if all are.
    ahead : a last travel that is left to whoever looks at the light; None if there is none.
    singular : the samples about a singular axis, if parts with one lie in this plane; None if not.
    """

    samples: Samples
    jones: NDArray[np.complex128] | None
    pitch: float
    curvature: float
    wavelength: float
    periodic: bool = False
    rims: Rims = Rims()
    turned_rims: Rims = Rims()
    turned: bool = False
    beyond: float = 0.0
    steep: tuple[Steep, ...] = ()
    filled: int | None = None
    room: int | None = None
    ahead: TravelLaw | None = None
    singular: Singular | None = None

    @property
    def edge_power(self) -> float:
        """Largest share of the power met near the edge of a window."""
        return max(self.rims.edge, self.turned_rims.edge)

    @property
    def band_power(self) -> float:
        """Largest share of the power met near the edge of a band."""
        return max(self.rims.band, self.turned_rims.band)

    @property
    def discarded(self) -> float:
        """Share of the power removed by band limits."""
        return self.rims.cut + self.turned_rims.cut

    def met(self, *, edge: float = 0.0, band: float = 0.0, cut: float = 0.0, pattern: int = 1) -> GridLight:
        """The same light with what it met on this plane noted."""
        before = self.turned_rims if self.turned else self.rims
        rims = Rims(max(before.edge, edge), max(before.band, band), before.cut + cut, max(before.pattern, pattern))
        return replace(self, turned_rims=rims) if self.turned else replace(self, rims=rims)

    @property
    def count(self) -> int:
        """Samples along a side."""
        return int(self.samples.shape[-1])

    @property
    def full(self) -> int:
        """Samples along a side of its window, dark ones included."""
        return self.room or self.count

    @property
    def window(self) -> float:
        """Side of the sampled square [m]."""
        return self.full * self.pitch

    def filled_up(self) -> GridLight:
        """The same light with the dark samples of its window."""
        if self.full == self.count:
            return self
        margin = (self.full - self.count) // 2
        samples = np.pad(self.samples, ((0, 0), (margin, margin), (margin, margin)))
        return replace(self, samples=samples, room=None)

    @property
    def x(self) -> NDArray[np.float64]:
        """Places of the samples along x, and along y [m]."""
        return axis(self.count, self.pitch)

    @property
    def power(self) -> float:
        """Power [W]: of the samples, and of what was scattered beyond their band."""
        total = inner(self.samples, self.samples).real * self.pitch**2 * (1 + self.beyond) + self.steep_power
        return total if self.jones is None else total * float(np.vdot(self.jones, self.jones).real)

    @property
    def steep_power(self) -> float:
        """Power [W] scattered by singular points, before the Jones vector."""
        return sum((inner(one.whole, one.whole) - inner(one.kept, one.kept)).real for one in self.steep)

    def steep_past(self, matrix: NDArray[np.complex128]) -> tuple[Steep, ...]:
        """What singular points scattered, behind a matrix of the components."""
        return tuple(
            one._replace(
                whole=np.einsum("ij,jyx->iyx", matrix, one.whole), kept=np.einsum("ij,jyx->iyx", matrix, one.kept)
            )
            for one in self.steep
        )

    def moved(self, move: Callable[[Samples], Samples], place: Callable[[complex], complex]) -> GridLight:
        """The light with its samples in another order, and what singular points scattered likewise.

        Parameters
        ----------
        move : the order of rows and columns.
        place : where a place x + iy goes.
        """
        steep = tuple(
            one._replace(
                whole=np.ascontiguousarray(move(one.whole)),
                kept=np.ascontiguousarray(move(one.kept)),
                place=place(one.place),
                turned=one.turned * (place(1j) / place(1)).imag,
            )
            for one in self.steep
        )
        return replace(self, samples=np.ascontiguousarray(move(self.samples)), steep=steep)

    def components(self) -> Samples:
        """(Ex, Ey) samples, curvature still apart."""
        if self.jones is None:
            return self.samples
        return self.jones.astype(self.samples.dtype)[:, None, None] * self.samples

    def referred(self, curvature: float) -> GridLight:
        """The same field with another curvature kept apart; changes the samples in place."""
        if curvature == self.curvature:
            return self
        chirp = curve(self.x, self.curvature - curvature, self.wavelength)
        multiply_separable(self.samples, chirp)
        return replace(self, curvature=curvature)


def axis(count: int, pitch: float) -> NDArray[np.float64]:
    """Half-pixel symmetric places."""
    return np.asarray((np.arange(count) - (count - 1) / 2) * pitch, dtype=float)


def curve(x: NDArray[np.float64], curvature: float, wavelength: float) -> NDArray[np.complex128]:
    """exp(i k curvature x^2/2) along one axis; the plane's factor is the outer product."""
    return np.asarray(np.exp(1j * np.pi * curvature / wavelength * x * x))


def inner(one: Samples, other: Samples) -> complex:
    """The sum of conj(one) other over all samples, added up in double precision."""

    # Not by the linear algebra library: its threads inside ours wait for each other, for seconds on a busy machine.
    def add(strip: slice) -> complex:
        if one is other:
            parts = one[:, strip].view(one.real.dtype)
            return complex(np.einsum("kij,kij->", parts, parts, dtype=float))
        return complex(np.einsum("kij,kij->", one[:, strip].conj(), other[:, strip], dtype=complex))

    return complex(sum(strips(add, *one.shape[-2:])))


def stokes_sum(samples: Samples) -> NDArray[np.float64]:
    """S0 .. S3 of (Ex, Ey) added up over all samples, (4,)."""
    ex, ey = samples[:1], samples[1:]
    px, py, cross = inner(ex, ex).real, inner(ey, ey).real, 2 * inner(ex, ey)
    return np.array([px + py, px - py, cross.real, -cross.imag])


def multiply_separable(samples: Samples, across: NDArray[Any], down: NDArray[Any] | None = None) -> None:
    """Samples times across(x) down(y), in place; ``down`` is ``across`` if left out. No plane of factors is made."""
    kind = samples.dtype if across.dtype.kind == "c" else samples.real.dtype
    columns = across.astype(kind, copy=False)
    rows = columns if down is None else down.astype(kind, copy=False)

    def multiply(strip: slice) -> None:
        samples[:, strip] *= columns * rows[strip, None]

    strips(multiply, *samples.shape[-2:])
