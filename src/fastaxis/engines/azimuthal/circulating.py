"""Light that goes round and round about the axis, summed trip by trip: one field circulates, one sum is kept."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace

import numpy as np

from fastaxis.engines.azimuthal.applying import apply
from fastaxis.engines.azimuthal.harmonics import Harmonics
from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Profile, Reals
from fastaxis.engines.azimuthal.resolving import Settings, resolved
from fastaxis.engines.azimuthal.starting import started
from fastaxis.engines.azimuthal.travelling import arrived
from fastaxis.plan import Branch
from fastaxis.plan.steps import Steps

__all__ = ["Circulation", "circulation"]

Order = tuple[int, int]
FLAT = 2 * ORDER
RIM = 1e-9  # of the peak: a jump that small makes fringes below what pictures hold
SAME = 1e-9  # of the radius: borders that differ by roundings only make no panel


@dataclass(frozen=True)
class _Plane:
    """Functions of the radius by (hand, l), all on the same panels and relative to the same front."""

    functions: dict[Order, Complexes]
    edges: Reals
    curvature: float

    @property
    def peak(self) -> float:
        return max((float(abs(values).max()) for values in self.functions.values()), default=0.0)

    def harmonics(self, like: Harmonics) -> Harmonics:
        return replace(
            like, orders=tuple(self.functions), profile=self._profile, curvature=self.curvature, estimates=()
        )

    @property
    def _profile(self) -> Profile:
        return Profile(self.edges, np.array([values.reshape(-1, ORDER) for values in self.functions.values()]))

    def on(self, edges: Reals) -> _Plane:
        """The same on other panels."""
        if edges is self.edges:
            return self
        profile = self._profile
        values = profile(Profile(edges, np.zeros((0, len(edges) - 1, ORDER), dtype=complex)).nodes)
        return replace(self, functions=dict(zip(self.functions, values, strict=True)), edges=edges)

    def plus(self, other: _Plane) -> _Plane:
        total = dict(self.functions)
        for order, values in other.functions.items():
            total[order] = total[order] + values if order in total else values
        return replace(self, functions=total)


@dataclass
class Circulation:
    """The field at the place that all trips pass, and the sum over trips so far.

    ``step`` follows the field once round. Memory is that of two fields, whatever the number of trips.
    """

    settings: Settings
    like: Harmonics
    field: _Plane
    total: _Plane

    @property
    def amplitudes(self) -> tuple[float, float]:
        """Square roots of the powers [sqrt(W)] of the light on its way round and of the sum."""
        one, whole = (float(sum(plane.harmonics(self.like).powers)) for plane in (self.field, self.total))
        return one**0.5, whole**0.5

    @property
    def sum(self) -> Harmonics:
        """All trips together."""
        return self.total.harmonics(self.like)

    def step(self, rounds: Sequence[tuple[Steps, complex]]) -> None:
        """Once round by each of the ways, with the factor of its carrier."""
        begin = self.field.harmonics(self.like)
        lights = [(_behind(begin, steps, self.settings), number) for steps, number in rounds]
        self.field = self.common(lights)
        self.total = self.total.plus(self.field)

    def common(self, lights: Sequence[tuple[Harmonics, complex]]) -> _Plane:
        """Fields on the panels of the sum, which are cut finer for all if need be."""
        orders = tuple(dict.fromkeys(order for light, _ in lights for order in light.orders))
        values = _values(lights, orders, self.total.curvature)
        edges = _reaching(self.total, max(light.profile.end for light, _ in lights), values, self.settings)
        edges = _with_rims(edges, [light for light, _ in lights])
        profile, _ = resolved(values, edges, self.settings, peak=self.total.peak)
        if len(profile.edges) != len(self.total.edges) or profile.end != self.total.edges[-1]:
            self.total = self.total.on(profile.edges)
        functions = dict(zip(orders, profile.flat(), strict=True))
        return _Plane(functions, self.total.edges, self.total.curvature)


def circulation(entries: Sequence[tuple[Branch, complex]], settings: Settings) -> Circulation:
    """Light that has just come in, by each of its ways, with the factor of its carrier."""
    lights = []
    for branch, number in entries:
        light, steps = started(branch, settings)
        lights.append((_behind(light, steps, settings), number))
    first = lights[0][0]
    like = replace(first, taper=None, beyond=(0.0, 0.0))
    empty = _Plane({}, first.profile.edges, first.curvature)
    made = Circulation(settings, like, empty, empty)
    made.field = made.common(lights)
    made.total = made.field
    return made


def _behind(light: Harmonics, steps: Steps, settings: Settings) -> Harmonics:
    for step in steps:
        light = apply(step.law, light, settings)
    return arrived(light, settings)


def _values(
    lights: Sequence[tuple[Harmonics, complex]], orders: Sequence[Order], curvature: float
) -> Callable[[Reals], Complexes]:
    def values(r: Reals) -> Complexes:
        out = np.zeros((len(orders), len(r)), dtype=complex)
        for light, number in lights:
            front = number * np.exp(0.5j * light.wavenumber * (light.curvature - curvature) * r**2)
            front = front * light.taper(r) if light.taper else front
            for order, found in zip(light.orders, light.profile(r), strict=True):
                out[orders.index(order)] += found * front
        return out

    return values


def _reaching(plane: _Plane, end: float, values: Callable[[Reals], Complexes], settings: Settings) -> Reals:
    """The panels of a plane, and more of them where light reaches further out."""
    edges = plane.edges
    if end <= edges[-1] * (1 + 1e-9):
        return edges
    width = edges[-1] - edges[-2]
    count = max(1, int(np.ceil((end - edges[-1]) / width)))
    more = np.linspace(edges[-1], end, count + 1)[1:]
    beyond = abs(values(np.linspace(edges[-1], end, FLAT))).max(axis=0)
    lit = beyond > settings.dark * max(plane.peak, float(beyond.max()) * settings.dark)
    return np.concatenate([edges, more]) if lit.any() else edges


def _with_rims(edges: Reals, lights: Sequence[Harmonics]) -> Reals:
    """Panels that end where light does, directly behind a hole."""
    rims = [rim for light in lights for rim in _rims(light)]
    new = [rim for rim in dict.fromkeys(rims) if abs(edges - rim).min() > SAME * edges[-1]]
    return np.union1d(edges, new) if new else edges


def _rims(light: Harmonics) -> list[float]:
    profile, values = light.profile, light.profile.values
    ends = ((profile.end, values[:, -1, -1]), (profile.start, values[:, 0, 0]))
    sharp = [rim for rim, found in ends if rim > 0 and abs(found).max() > RIM * profile.peak]
    return [] if light.taper else sharp
