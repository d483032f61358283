"""The light of the azimuthal engine in the plane of a target."""

from __future__ import annotations

import math
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.applying import TO_CIRCULAR
from fastaxis.engines.azimuthal.averaging import LONGEST
from fastaxis.engines.azimuthal.bucket import square_stokes
from fastaxis.engines.azimuthal.cells import cell_images
from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.panels import Profile, Reals
from fastaxis.engines.azimuthal.products import weighted
from fastaxis.engines.azimuthal.quarter import centred_images
from fastaxis.engines.azimuthal.rendering import circular_field, corner, strips
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.engines.azimuthal.scalar import ScalarHarmonics
from fastaxis.engines.azimuthal.shapes import Shapes, remembered
from fastaxis.engines.azimuthal.smooth import smooth_images
from fastaxis.engines.azimuthal.table import Table, table_of
from fastaxis.engines.azimuthal.travelling import arrived
from fastaxis.engines.field import Guard
from fastaxis.light import Raster

__all__ = ["AzimuthalField"]


@dataclass(frozen=True, eq=False)
class AzimuthalField:
    """Coherent light as harmonics about the axis; the last section is travelled to just the radii asked for.

    Parameters
    ----------
    wavelength : [m].
    harmonics : the light before its last section.
    settings : how far the engine goes.
    """

    wavelength: float
    harmonics: Harmonics
    settings: Settings = field(default_factory=Settings)
    _arrivals: dict[float, Harmonics] = field(default_factory=dict, repr=False)
    _tables: dict[int, tuple[Harmonics, Shapes, Table]] = field(default_factory=dict, repr=False)

    @property
    def power(self) -> float:
        """Total power [W], by radial quadrature; travel conserves it."""
        return self.harmonics.power

    @property
    def total_stokes(self) -> NDArray[np.float64]:
        """S0 .. S3 of all the light [W], shape (4,); S1 and S2 from equal charges, other pairs cancel around."""
        (left, right), beyond = self.harmonics.powers, self.harmonics.beyond
        left, right = left + beyond[LEFT], right + beyond[RIGHT]
        cross = 2 * _same_charge(self.harmonics)
        return np.array([left + right, cross.real, cross.imag, right - left])

    @property
    def guard(self) -> Guard:
        """Nothing is sampled in the plane; light outside a cut field counts as discarded."""
        power = self.power
        return Guard(discarded=sum(self.harmonics.beyond) / power if power else 0.0)

    def out_to(self, reach: float) -> Harmonics:
        """The harmonics in the target's plane, out to a radius [m]; its ``error`` is the estimate."""
        known = [far for far in self._arrivals if reach <= far <= 2 * reach]
        if known:
            return self._arrivals[min(known)]
        return self._arrivals.setdefault(reach, arrived(self.harmonics, self.settings, end=reach))

    def _table(self, arrival: Harmonics) -> Table:
        return self._shapes(arrival)[1]

    def _shapes(self, arrival: Harmonics) -> tuple[Shapes, Table]:
        """One table an arrival: neighbouring places read the same polynomials, whoever asks.

        The arrival is held as well: were it freed, as when two threads asked at once, another one might get its id.
        """
        if id(arrival) not in self._tables:
            shapes = Shapes.of(arrival.profile, arrival.charges)
            table = remembered(("table",), shapes, lambda: table_of(shapes.profile, arrival.profile.end))
            self._tables[id(arrival)] = arrival, shapes, table.combined(shapes.numbers)
        return self._tables[id(arrival)][1:]

    def error(self, reach: float) -> float:
        """Expected error of the field out to a radius [m], as a share of its peak there."""
        return self.out_to(reach).error

    def stokes_on(self, raster: Raster) -> NDArray[np.float64]:
        """Watts per pixel of S0 .. S3, integrated over each pixel, shape (4, ny, nx)."""
        if raster.shape == (1, 1) and raster.centre == (0.0, 0.0):
            return self._on_square(raster.pitch)[:, np.newaxis, np.newaxis]
        arrival = self.out_to(corner(raster))
        shapes, table = self._shapes(arrival)
        images = centred_images(table, shapes, arrival.orders, raster) if raster.centre == (0.0, 0.0) else None
        if images is None:
            images = smooth_images(table, arrival.profile, arrival.orders, raster)
        if images is not None:
            return images
        arrival = self.out_to(corner(raster, LONGEST))
        return cell_images(self._table(arrival), arrival.orders, raster)

    def _on_square(self, side: float) -> NDArray[np.float64]:
        whole = self._arrivals.setdefault(math.inf, arrived(self.harmonics, self.settings))
        if whole.profile.end <= side / 2:
            return self.total_stokes
        return square_stokes(self.out_to(side / math.sqrt(2)), side)

    def _around(self, farthest: float) -> Harmonics:
        """The harmonics out to a place, itself included.

        The axis alone still needs panels, which have a width; and the farthest place may round to a hair beyond its
        own distance, where the table would read nothing.
        """
        return self.out_to(max(farthest, 1e-3 * self.wavelength) * (1 + 1e-9))

    def scalar(self, reach: float) -> ScalarHarmonics | None:
        """The field out to a radius [m] as one state times a scalar; None if its polarization varies."""
        arrival = self._around(reach)
        return ScalarHarmonics.of(arrival, self._table(arrival))

    def at(self, x: NDArray[np.float64], y: NDArray[np.float64]) -> NDArray[np.complex128]:
        """(Ex, Ey) [sqrt(W)/m] at columns x and rows y [m], shape (2, ny, nx)."""
        x, y = np.atleast_1d(np.asarray(x, dtype=float)), np.atleast_1d(np.asarray(y, dtype=float))
        arrival = self._around(math.hypot(abs(x).max(), abs(y).max()))
        table, bend = self._table(arrival), self.harmonics.wavenumber * arrival.curvature / 2
        across, down = (np.exp(1j * bend * side**2) for side in (x, y))
        out = np.empty((2, len(y), len(x)), dtype=complex)
        for rows in strips(len(y), len(x)):
            circular = circular_field(table, arrival.orders, x, y[rows])
            circular *= across * down[rows, np.newaxis]
            out[:, rows] = weighted(TO_CIRCULAR.conj().T, circular)
        return out


def _same_charge(harmonics: Harmonics) -> complex:
    """Integral of E_L* E_R over the plane."""
    profile: Profile = harmonics.profile
    weight: Reals = 2 * np.pi * profile.weights * profile.nodes
    values = dict(zip(harmonics.orders, profile.flat(), strict=True))
    pairs = [(values[LEFT, l], values[RIGHT, l]) for hand, l in values if hand == LEFT and (RIGHT, l) in values]
    return complex(sum((left.conj() * right * weight).sum() for left, right in pairs))
