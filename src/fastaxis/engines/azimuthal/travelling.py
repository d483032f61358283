"""Arriving in a plane: the section travelled, on panels, a radius and a reference front chosen for the field there."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from fastaxis.engines.azimuthal.collins import Collins
from fastaxis.engines.azimuthal.harmonics import LEFT, STRAIGHT, Harmonics
from fastaxis.engines.azimuthal.nearby import Nearby, suits
from fastaxis.engines.azimuthal.panels import Profile, Reals
from fastaxis.engines.azimuthal.resolving import Settings, extended, resolved
from fastaxis.engines.azimuthal.shapes import Shapes, remembered
from fastaxis.engines.azimuthal.taper import Taper
from fastaxis.laws import TravelLaw

__all__ = ["arrived", "images", "section_for", "share_of_error"]

SAFETY = 10.0  # a dozen places seldom meet the worst one
ROUNDING = 4 * np.finfo(float).eps

MOST_LOOKED_AT = 256
LOOKED_AT = (np.arange(6) + 0.5) / 6  # shares of a length
INSIDE = 1 - math.exp(-2)  # share of the power inside of the 1/e^2 radius

CARRIED = 16.0  # phase [rad] of a panel of 32 nodes with an envelope of its own: 2.5 fringes, less what that takes
RIM = 1e-12  # of the peak: where a field ends in the dark

TAPER = 0.7
NEGLIGIBLE = 1e-12
"""Phase [rad] of diffraction that changes nothing, at the highest frequency, which has 1e-12 of the amplitude or less.

A relay closes to 1e-16 m, not to zero.
"""


def images(field: Harmonics) -> bool:
    """Whether the section maps points to points, so that nothing diffracts."""
    flat = TravelLaw.lens(-field.curvature).then(field.section)
    if flat.b == 0:
        return True
    reach = abs(flat.b / flat.a) if flat.a else math.inf
    return bool(reach * field.profile.highest_frequency**2 / (2 * field.wavenumber) < NEGLIGIBLE)


@dataclass(frozen=True, eq=False)
class _Arrival:
    """Shapes behind a section, relative to a front there; their soft end if cut; what they left unsettled."""

    profile: Profile
    curvature: float
    taper: Taper | None
    rest: float
    section: Collins | Nearby

    @property
    def nbytes(self) -> int:
        return self.profile.values.nbytes

    @cached_property
    def error(self) -> float:
        """What arriving added."""
        return self.rest + share_of_error(self.section, self.profile)


@dataclass(frozen=True)
class _Waist:
    """A Gaussian beam about as wide as the light, behind the section: where to look and on which front.

    Parameters
    ----------
    radius : that holds 86 % of the power [m].
    reach : where it gets as dark as the light before the section is at its end [m].
    curvature : of its front [1/m].
    """

    radius: float
    reach: float
    curvature: float


def _waist_behind(field: Harmonics) -> _Waist:
    flat, k = TravelLaw.lens(-field.curvature).then(field.section), field.wavenumber
    inside = _radius(field.profile)
    spread = (1 + max(abs(l) for l in field.charges)) * 2 / (k * inside)
    radius = math.hypot(flat.a * inside, flat.b * spread)
    # Re 1/q behind the section, for a flat waist in front of it.
    curvature = (flat.a * flat.c * inside**2 + flat.b * flat.d * spread**2) / radius**2
    return _Waist(radius, radius * field.profile.end / inside, curvature)


def _section(field: Harmonics, waist: _Waist, settings: Settings, end: float | None) -> Collins | Nearby:
    """The integral, relative to the front on which the light out to a radius [m] has the fewest fringes.

    The beam has its own. A singular axis and rims send out a tail whose front is that of a wave from the axis, d/b;
    far out only the tail is left, and on the front of the beam it would have k |difference| r^2/2 of fringes.
    """
    if end is not None and end > waist.reach:
        flat = TravelLaw.lens(-field.curvature).then(field.section)
        section = section_for(field, flat.d / flat.b, settings)
        # The peak of a beam of this power and radius: a factor of a few changes no answer.
        peak = math.sqrt(INSIDE * field.profile.powers().sum() / math.pi) / waist.radius
        if abs(section((1 - 0.03 * LOOKED_AT) * end)).max() > settings.settled * peak:
            return section
    return section_for(field, waist.curvature, settings)


def _radius(profile: Profile) -> float:
    """Radius [m] that holds 86 % of the power: the 1/e^2 radius of a Gaussian beam."""
    density = (abs(profile.flat()) ** 2).sum(axis=0) * profile.weights * profile.nodes
    share = np.cumsum(density) / density.sum()
    return float(profile.nodes[np.searchsorted(share, INSIDE)])


def section_for(field: Harmonics, curvature: float, settings: Settings) -> Collins | Nearby:
    """The integral to be asked for the field behind the section, relative to a front there."""
    section = Collins(
        field.profile,
        field.charges,
        field.wavenumber,
        field.section,
        before=field.curvature,
        behind=curvature,
        taper=field.taper,
        phase=settings.phase,
    )
    return Nearby(section) if suits(section) else section


def share_of_error(section: Collins | Nearby, profile: Profile) -> float:
    """Difference to a finer integral at some places, as a share of the peak, and what rounding may do unseen.

    The places lie between the nodes, so the polynomials of the panels are tried as well.
    """
    nodes = profile.nodes
    # Golden steps through the nodes, weighted to the inside where the light is: no regularity to fall in with.
    after = ((len(nodes) - 1) * ((0.618034 * np.arange(1, 14)) % 1) ** 2).astype(int)
    spread = np.linspace(0, len(nodes) - 2, MOST_LOOKED_AT).astype(int)
    after = np.unique([*after, *spread[section.hardest(nodes[spread])]])
    places = (nodes[after] + nodes[after + 1]) / 2
    seen = abs(section.finer()(places) - profile(places)).max() / max(profile.peak, 1e-300)
    return SAFETY * float(seen) + ROUNDING * section.phases(profile.end)


def arrived(field: Harmonics, settings: Settings, *, start: float = 0.0, end: float | None = None) -> Harmonics:
    """The field in the plane behind its section, between two radii [m]; ``end=None`` follows it until it is dark."""
    if images(field):
        return _imaged(field, start, end)
    shapes = Shapes.of(field.profile, field.charges)
    bare = replace(field, orders=tuple((LEFT, l) for l in shapes.charges), profile=shapes.profile)
    section = (field.section.a, field.section.b, field.section.c, field.section.d)
    key = (section, field.curvature, field.wavenumber, field.taper, settings, start, end)
    there = remembered(key, shapes, lambda: _travelled(bare, settings, start, end))
    behind = replace(
        field,
        profile=there.profile.combined(shapes.numbers),
        curvature=there.curvature,
        section=STRAIGHT,
        taper=there.taper,
        estimates=(*field.estimates, there),
    )
    return _balanced(field, behind) if end is None and start == 0 else replace(behind, beyond=(0.0, 0.0))


def _travelled(field: Harmonics, settings: Settings, start: float, end: float | None) -> _Arrival:
    waist = _waist_behind(field)
    section = _section(field, waist, settings, end)
    if end is None:
        edges = _first_edges(start, max(4 * waist.radius, 2 * start))
        profile, rest, cut = extended(section, edges, settings)
    else:
        edges = _first_edges(start, end) if start else _foreseen(field, waist, section.behind, end, settings.most)
        profile, rest = resolved(section, edges, settings)
        cut = False
    taper = Taper(TAPER * profile.end, profile.end) if cut else None
    return _Arrival(profile, section.behind, taper, max(rest, settings.settled), section)


def _balanced(before: Harmonics, behind: Harmonics) -> Harmonics:
    """The power that arrives outside the panels counted as such, if there is any."""
    if behind.taper is None:
        return behind
    missing = [max(b - a, 0.0) + c for b, a, c in zip(before.powers, behind.powers, before.beyond, strict=True)]
    return replace(behind, beyond=(missing[0], missing[1]))


def _foreseen(field: Harmonics, waist: _Waist, curvature: float, end: float, most: int) -> Reals:
    """Panels with about as many fringes each as they carry, so that few have to be halved.

    On a front of its own a beam takes some panels for each charge that widens it. With the wave from a singular axis it
    has fringes, whichever of both fronts it is on; and a lit rim sends out waves of k rim/b. Beyond the beam the tail
    is smooth in log r.
    """
    flat = TravelLaw.lens(-field.curvature).then(field.section)
    core = abs(field.profile(np.zeros(1))[np.array(field.charges) != 0]).max(initial=0.0)
    other = flat.d / flat.b if core > RIM * field.profile.peak else curvature
    rim = abs(field.profile.values[:, -1, -4:]).max() > RIM * field.profile.peak
    near = end if rim else min(end, waist.reach)
    bend = field.wavenumber * abs(other - waist.curvature) / 2
    slope = 1.7 * CARRIED * (1 + max(abs(l) for l in field.charges)) / waist.reach
    if rim:
        slope = max(slope, field.wavenumber * field.profile.end / abs(flat.b))
    whole = near * (slope + bend * near)
    phase = np.linspace(0, whole, min(max(2, math.ceil(whole / CARRIED)), most) + 1)
    inner = 2 * phase / (slope + np.sqrt(slope**2 + 4 * bend * phase))
    inner[-1] = near
    outer = near * (end / near) ** np.linspace(0, 1, max(1, math.ceil(math.log2(end / near))) + 1)
    outer[-1] = end
    return inner if near == end else np.concatenate([inner, outer[1:]])


def _first_edges(start: float, end: float) -> Reals:
    return np.linspace(start, end, 5)


def _imaged(field: Harmonics, start: float, end: float | None) -> Harmonics:
    """Magnified by a: f(r/a)/a, turned by half a turn if a is negative."""
    flat = TravelLaw.lens(-field.curvature).then(field.section)
    signs = np.array([(-1) ** (l % 2) if flat.a < 0 else 1 for l in field.charges]) / flat.a
    profile = field.profile.stretched(abs(flat.a)).combined(np.diag(signs).astype(complex))
    taper = field.taper and Taper(abs(flat.a) * field.taper.start, abs(flat.a) * field.taper.end)
    if start > 0 or end is not None:
        reach = profile.end if end is None else end
        if reach < profile.end:
            field, taper = replace(field, beyond=(0.0, 0.0)), None
        profile = profile.clipped(start, reach)
    return replace(field, profile=profile, curvature=flat.c / flat.a, section=STRAIGHT, taper=taper)
