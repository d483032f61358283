"""The state of the engine: a few azimuthal harmonics in the circular basis, and a section still to be travelled."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from fastaxis.engines.azimuthal.estimates import Estimate, total
from fastaxis.engines.azimuthal.panels import Complexes, Profile
from fastaxis.engines.azimuthal.taper import Taper
from fastaxis.laws import TravelLaw
from fastaxis.maths import NUMBERS

__all__ = ["LEFT", "RIGHT", "Harmonics", "Link"]

LEFT, RIGHT = 0, 1

Link = tuple[int, int, int, complex]
"""(hand before, hand behind, shift of l, amplitude): one entry of a covariant Jones matrix."""

STRAIGHT = TravelLaw()


@dataclass(frozen=True, kw_only=True, eq=False)
class Harmonics:
    """E_hand = exp(i k curvature r^2/2) sum over l of f_l(r) exp(i l phi), then travelled through ``section``.

    The section is kept apart until something needs the light in its plane, so that lenses, spaces and uniform plates
    in a row cost one integral.

    Parameters
    ----------
    orders : (hand, l) of each function; hand 0 is L, 1 is R.
    profile : the functions f_l [sqrt(W)/m].
    curvature : 1/R [1/m] of the front that they are relative to.
    wavenumber : k [1/m].
    section : ray matrix to be travelled still.
    taper : soft end, where the profile had to be cut.
    beyond : power [W] of L and R outside the cut: counted, but not followed further.
    estimates : of the errors of the functions, step by step.
    """

    orders: tuple[tuple[int, int], ...]
    profile: Profile
    curvature: float
    wavenumber: float
    section: TravelLaw = STRAIGHT
    taper: Taper | None = None
    beyond: tuple[float, float] = (0.0, 0.0)
    estimates: tuple[Estimate, ...] = ()

    @property
    def error(self) -> float:
        """Error of the functions to be expected, as a share of their peak."""
        return total(self.estimates)

    @property
    def charges(self) -> tuple[int, ...]:
        return tuple(l for _, l in self.orders)

    @cached_property
    def powers(self) -> tuple[float, float]:
        """Power [W] of L and R that is followed. Travel conserves it, so it holds before and behind the section."""
        each = self.profile.powers()
        left = sum(p for p, (hand, _) in zip(each, self.orders, strict=True) if hand == LEFT)
        return float(left), float(each.sum() - left)

    @property
    def power(self) -> float:
        """All power [W], the part outside a cut included."""
        return sum(self.powers) + sum(self.beyond)

    def linked(self, links: Iterable[Link]) -> Harmonics:
        """Every harmonic sent along the links of a Jones matrix; equal ones add up."""
        rows: dict[tuple[int, int], Complexes] = {}
        links = [link for link in links if link[3] != 0]
        for column, (hand, l) in enumerate(self.orders):
            for before, behind, shift, amplitude in links:
                if before == hand:
                    row = rows.setdefault((behind, l + shift), np.zeros(len(self.orders), dtype=complex))
                    row[column] += amplitude
        if not rows:
            rows = {(LEFT, 0): np.zeros(len(self.orders), dtype=complex)}
        beyond = [0.0, 0.0]
        for before, behind, _, amplitude in links:
            beyond[behind] += self.beyond[before] * abs(amplitude) ** 2
        profile = self.profile.combined(np.array(list(rows.values())))
        return replace(self, orders=tuple(rows), profile=profile, beyond=(beyond[0], beyond[1])).without_dark()

    def without_dark(self) -> Harmonics:
        """Without harmonics that are zero to rounding, as when two plates undo each other."""
        sizes = abs(self.profile.values).max(axis=(1, 2))
        kept = np.flatnonzero(sizes > 4 * np.finfo(float).eps * sizes.max())
        if not len(kept) or len(kept) == len(sizes):
            return self
        orders = tuple(self.orders[i] for i in kept)
        return replace(self, orders=orders, profile=Profile(self.profile.edges, self.profile.values[kept]))

    def through(self, section: TravelLaw) -> Harmonics:
        """With one more section to be travelled."""
        return replace(self, section=self.section.then(section))

    def flipped(self, axis: str) -> Harmonics:
        """Seen with x (or y) reversed: exp(i l phi) becomes exp(i l pi) exp(-i l phi), or exp(-i l phi)."""
        signs = np.array([(-1) ** (l % 2) if axis == "x" else 1 for l in self.charges])
        profile = Profile(self.profile.edges, self.profile.values * signs[:, np.newaxis, np.newaxis])
        return replace(self, orders=tuple((hand, -l) for hand, l in self.orders), profile=profile)

    def turned(self, angle: float) -> Harmonics:
        """The picture turned counter-clockwise: exp(i l phi) becomes exp(i l (phi - angle))."""
        phases = np.array([NUMBERS.phasor(-l * angle) for l in self.charges])
        profile = Profile(self.profile.edges, self.profile.values * phases[:, np.newaxis, np.newaxis])
        return replace(self, profile=profile)
