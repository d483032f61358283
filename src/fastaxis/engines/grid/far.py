"""Light one transform before its target: the far plane is worked out where it is looked at."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from functools import cached_property
from typing import cast

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.collecting import Collected, stokes_from
from fastaxis.engines.grid.edges import watch_frame
from fastaxis.engines.grid.filled import beat, lit, marginals
from fastaxis.engines.grid.guard import LINES, check, rim_of, steps_of
from fastaxis.engines.grid.landing import Line, landing_length, lines
from fastaxis.engines.grid.light import GridLight, curve
from fastaxis.engines.grid.reading import GridField
from fastaxis.engines.grid.single import far_pitch, near_chirp, scale, travel_single
from fastaxis.engines.grid.waves import Waves
from fastaxis.laws import TravelLaw
from fastaxis.light import Raster
from fastaxis.plan import Grid
from fastaxis.plan.sampling import Sampling

__all__ = ["FarField", "arriving"]

Reals = NDArray[np.float64]
Complexes = NDArray[np.complex128]

# Places looked at over the samples of the window, at most: beyond, a plane at a time holds less. A window of fewer
# samples than SMALL along a side counts as one of so many: what it takes is no burden.
MOST, SMALL = 2, 1024


@dataclass(frozen=True, eq=False)
class FarField:
    """Light before a last travel by a single transform, in the plane of a target.

    Near and far plane are each other's spectrum: each sample here is a wave across the window there, and how far the
    light reaches out here tells how fine its irradiance is there. Beyond the window it is dark.

    Parameters
    ----------
    near : the light before, with its travel ahead.
    guard : how close it came to the limits of its samples.
    grid : the samples at the source.
    """

    near: GridLight
    guard: Guard
    grid: Grid | None = field(default=None, repr=False)
    _read: dict[tuple[Raster, tuple[int, int]], Collected] = field(default_factory=dict, repr=False)

    @property
    def _ahead(self) -> TravelLaw:
        return cast("TravelLaw", self.near.ahead)

    @property
    def wavelength(self) -> float:
        """Vacuum wavelength [m]."""
        return self.near.wavelength

    @property
    def power(self) -> float:
        """Power [W]: in the window, and scattered by edges beyond the band of the samples; no travel changes it."""
        near, (down, _) = self.near, self.marginals
        total = float(down.sum()) * near.pitch**2 * (1 + near.beyond) + near.steep_power
        return total if near.jones is None else total * float(np.vdot(near.jones, near.jones).real)

    @property
    def total_stokes(self) -> Reals:
        """S0 .. S3 of all the light [W], shape (4,); no travel changes them."""
        return GridField(self.near, self.guard).total_stokes

    @property
    def carried(self) -> GridLight:
        """The light as it is kept."""
        return self.near

    @property
    def places(self) -> tuple[int, float, float]:
        """Samples along a side of the window, their pitch [m], the curvature kept apart [1/m]."""
        return self.near.full, far_pitch(self.near, self._ahead), self._ahead.d / self._ahead.b

    @cached_property
    def light(self) -> GridLight:
        """The light on the samples of the far window."""
        near = self.near.filled_up()
        if near is self.near:
            near = replace(near, samples=near.samples.copy())
        near = replace(near, ahead=None)
        return travel_single(near, self._ahead, measured=True)

    @cached_property
    def marginals(self) -> tuple[Reals, Reals]:
        """Power of each row and of each column of the near plane."""
        return marginals(self.near.samples)

    @cached_property
    def waves(self) -> Waves:
        """What is lit of the near plane, as waves across the far one."""
        return self._waves(*(lit(line, self.near.samples.dtype) for line in self.marginals))

    def _waves(self, rows: slice, columns: slice) -> Waves:
        near, travel = self.near, self._ahead
        chirp = near_chirp(near, travel)
        factors = scale(near, travel) * chirp[rows], chirp[columns]
        first = rows.start or 0, columns.start or 0
        return Waves(near.samples[:, rows, columns], factors, first, near.count, mirrored=travel.b < 0)

    @cached_property
    def orders(self) -> tuple[int, int]:
        """Highest orders of irradiance down and across, in cycles a window."""
        kind = self.near.samples.dtype
        down, across = (beat(line, kind) for line in self.marginals)
        return down, across

    def at(self, x: Reals, y: Reals) -> Complexes:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx)."""
        count, pitch, curvature = self.places
        columns, rows = (np.atleast_1d(np.asarray(places, dtype=float)) for places in (x, y))
        whole = slice(None)  # a field is asked for to more digits than what is lit holds
        values = self._waves(whole, whole).anywhere(rows / (count * pitch), columns / (count * pitch))
        across, down = (
            curve(line, curvature, self.wavelength) * (abs(line) <= count * pitch / 2) for line in (columns, rows)
        )
        values = values * (down[:, None] * across)
        return values if self.near.jones is None else self.near.jones[:, None, None] * values[0]

    def stokes_on(self, raster: Raster) -> Reals:
        """Watts per pixel of S0 .. S3, shape (4, ny, nx): the integral of the band-limited curve over each pixel.

        Irradiance holds the beats of all waves; so many places hold it exactly, and what a pixel of any size collects
        is a fixed sum of them. Light that edges scattered to steeper angles is in ``power`` and in
        ``guard.discarded``, not here.

        Warns
        -----
        SamplingWarning : that light is more than 1 % of the power.
        """
        if raster.shape != (1, 1):
            watch_frame(self.near, self.grid)
        rows, columns = self._lines(raster, self.orders)
        if self._too_many(rows, columns):
            return GridField(self.light, self.guard).stokes_on(raster)
        samples = self.waves.rows_at(rows.places, columns.places)
        return stokes_from(samples, self.near.jones, rows.blocks, columns.blocks)

    def collected_by(self, raster: Raster, orders: tuple[int, int]) -> Collected:
        """The light as pixels collect it; kept for the last raster, since sums of this field are read alike.

        Parameters
        ----------
        raster : the pixels.
        orders : highest of irradiance to be held: those of a sum are those of its finest field.
        """
        found = self._read.get((raster, orders))
        if found is None:
            found = self._collected_by(raster, orders)
            self._read.clear()
            self._read[raster, orders] = found
        return found

    def _lines(self, raster: Raster, orders: tuple[int, int]) -> tuple[Line, Line]:
        count, pitch, _ = self.places
        down, across = map(landing_length, orders, self.waves.samples.shape[1:])
        return lines(raster, count * pitch, (down, across), orders)

    def _too_many(self, rows: Line, columns: Line) -> bool:
        return rows.places.count * columns.places.count > MOST * max(self.near.full, SMALL) ** 2

    def _collected_by(self, raster: Raster, orders: tuple[int, int]) -> Collected:
        rows, columns = self._lines(raster, orders)
        if self._too_many(rows, columns):
            return GridField(self.light, self.guard).collected_by(raster)
        samples = self.waves.at(rows.places, columns.places)
        return Collected(samples, self.near.jones, 1, rows.blocks, columns.blocks)


def arriving(near: GridLight, names: tuple[str, ...], sampling: Sampling) -> FarField:
    """Light that has a single transform ahead, looked over at its target.

    Warns
    -----
    SamplingWarning, and raises SamplingError, where the light comes close to the limits of its samples.
    """
    unseen = FarField(near, Guard(0.0, 0.0, 0.0), sampling.grid)
    here = unseen.marginals if near.full == near.count else ()  # else there are dark samples all round
    seen = near
    if not near.periodic:
        seen = seen.met(edge=rim_of(*here)) if here else seen
        there = replace(seen, turned=not near.turned).met(edge=rim_of(*unseen.waves.profiles(LINES)))
        seen = replace(there, turned=near.turned)
    guard = check(seen, steps_of(*unseen.marginals, near.full), names, sampling)
    done = FarField(seen, guard, sampling.grid)
    # What looking it over has found is not worked out again.
    vars(done).update({name: vars(unseen)[name] for name in ("marginals", "waves")})
    return done
