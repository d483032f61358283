"""Sums of fields that came by sections alike."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from functools import cached_property, reduce

import numpy as np

from fastaxis.engines.azimuthal.averaging import LONGEST
from fastaxis.engines.azimuthal.estimates import Known
from fastaxis.engines.azimuthal.harmonics import Harmonics
from fastaxis.engines.azimuthal.panels import Complexes, Profile, Reals
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.azimuthal.products import product, weighted
from fastaxis.engines.azimuthal.rendering import corner
from fastaxis.engines.azimuthal.resolving import Settings, resolved
from fastaxis.errors import ParameterError
from fastaxis.light import Raster

__all__ = ["combined", "combined_on", "same_way", "shared_edges"]

ROOM = 1e-9  # a corner may round to a hair beyond itself
SAME = 1e-12  # of a ray matrix: some thousand roundings of numbers multiplied in another order


def combined(fields: Sequence[AzimuthalField], coefficients: Complexes) -> AzimuthalField:
    """The sum of coefficient * field, of light at one target.

    Harmonics on the same panels are added number by number; others, which meet where a plate darkens a harmonic, are
    read onto panels that suit the sum. Light outside a cut is not followed, so of that the powers are added.

    Raises
    ------
    ParameterError : the fields have different sections still to travel.
    """
    lights = [field.harmonics for field in fields]
    _check_sections(lights)
    orders = tuple(dict.fromkeys(order for light in lights for order in light.orders))
    matrices = [_placed(light, orders) * number for light, number in zip(lights, coefficients, strict=True)]
    first = lights[0]
    beyond = [
        sum(abs(number) ** 2 * light.beyond[hand] for light, number in zip(lights, coefficients, strict=True))
        for hand in (0, 1)
    ]
    total = replace(first, orders=orders, beyond=(float(beyond[0]), float(beyond[1])))
    total = (
        _added(total, lights, matrices) if _alike(lights) else _resampled(total, lights, matrices, fields[0].settings)
    )
    estimates = (*total.estimates, _Weighed(tuple(lights), tuple(map(abs, coefficients)), total.profile.peak))
    total = replace(total, estimates=estimates)
    return replace(fields[0], harmonics=total.without_dark(), _arrivals={}, _tables={})


@dataclass(frozen=True, eq=False)
class _Weighed:
    """Errors of the fields in a sum with a peak of its own, each a share of that field's peak."""

    lights: tuple[Harmonics, ...]
    weights: tuple[float, ...]
    peak: float

    @cached_property
    def error(self) -> float:
        """As a share of the peak of the sum."""
        own = (light.error * light.profile.peak for light in self.lights)
        return float(sum(weight * error for weight, error in zip(self.weights, own, strict=True))) / max(
            self.peak, 1e-300
        )


def combined_on(fields: Sequence[AzimuthalField], coefficients: Complexes, raster: Raster) -> AzimuthalField:
    """The sum of coefficient * field in the plane of the target, as far as a raster needs it."""
    reach = corner(raster, LONGEST) * (1 + ROOM)
    there = [replace(field, harmonics=field.out_to(reach), _arrivals={}, _tables={}) for field in fields]
    return combined(there, coefficients)


def _placed(light: Harmonics, orders: tuple[tuple[int, int], ...]) -> Complexes:
    """Rows of all orders from the functions that a field has."""
    matrix = np.zeros((len(orders), len(light.orders)), dtype=complex)
    for column, order in enumerate(light.orders):
        matrix[orders.index(order), column] = 1
    return matrix


def _alike(lights: list[Harmonics]) -> bool:
    first = lights[0]
    return all(
        light.curvature == first.curvature
        and light.taper == first.taper
        and np.array_equal(light.profile.edges, first.profile.edges)
        for light in lights
    )


def _added(total: Harmonics, lights: list[Harmonics], matrices: list[Complexes]) -> Harmonics:
    parts = [weighted(matrix, light.profile.values) for light, matrix in zip(lights, matrices, strict=True)]
    return replace(total, profile=Profile(lights[0].profile.edges, sum(parts[1:], parts[0])), estimates=())


def _resampled(total: Harmonics, lights: list[Harmonics], matrices: list[Complexes], settings: Settings) -> Harmonics:
    """The sum relative to the front of the first field, soft ends worked in."""

    def values(r: Reals) -> Complexes:
        out = np.zeros((len(total.orders), len(r)), dtype=complex)
        for light, matrix in zip(lights, matrices, strict=True):
            bend = light.wavenumber * (light.curvature - total.curvature) / 2
            end = light.taper(r) if light.taper else 1.0
            out += product(matrix, light.profile(r) * (np.exp(1j * bend * r**2) * end))
        return out

    profile, rest = resolved(values, shared_edges(lights), settings)
    return replace(total, profile=profile, taper=None, estimates=(Known(rest),))


def shared_edges(lights: list[Harmonics]) -> Reals:
    """Borders of the panels of all; those that two share but for a rounding make no panel."""
    edges = reduce(np.union1d, (light.profile.edges for light in lights))
    return np.asarray(edges[np.concatenate([[True], np.diff(edges) > 1e-9 * edges[-1]])])


def same_way(lights: list[Harmonics]) -> bool:
    """Whether fields have the same section still to go."""
    sections = np.array([[s.a, s.b, s.c, s.d] for s in (light.section for light in lights)], dtype=float)
    return bool((abs(sections - sections[0]) <= SAME * abs(sections[0]) + 1e-300).all())


def _check_sections(lights: list[Harmonics]) -> None:
    if not same_way(lights):
        reaches = sorted({float(light.section.b) for light in lights})
        raise ParameterError(
            "fields add where they have the same way still to go",
            got="sections " + ", ".join(f"b = {b:.6g} m" for b in reaches),
            fix='train.expose("cam", [fa.H, fa.V])',
        )
