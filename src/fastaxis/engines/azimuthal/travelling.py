"""Arriving in a plane: the section travelled, on panels, a radius and a reference front chosen for the field there."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from fastaxis.engines.azimuthal.collins import Collins
from fastaxis.engines.azimuthal.foreseeing import INSIDE, Waist, foreseen, waist_behind
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


def _section(field: Harmonics, waist: Waist, settings: Settings, end: float | None) -> Collins | Nearby:
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
    waist = waist_behind(field)
    section = _section(field, waist, settings, end)
    if end is None:
        first = max(4 * waist.radius, 2 * start)
        edges = _first_edges(start, first) if start else foreseen(field, waist, section.behind, first, settings.most)
        profile, rest, cut = extended(section, edges, settings)
    else:
        edges = _first_edges(start, end) if start else foreseen(field, waist, section.behind, end, settings.most)
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
