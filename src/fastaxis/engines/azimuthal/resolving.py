"""Panels found from the function itself: split where its polynomials have not converged, extended until it is dark."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Profile, Reals, nodes_on, sampled

__all__ = ["Settings", "extended", "resolved"]


@dataclass(frozen=True, kw_only=True)
class Settings:
    """How far the engine goes.

    Parameters
    ----------
    settled : the last Legendre coefficients of a panel are below this share of the peak. 1e-13 is the rounding
        of a Collins sum of some thousand terms, so smaller values would chase noise.
    dark : a field is at its end where it stays below this share of its peak.
    most : panels a plane; a field that would need more is cut softly, and says so.
    tail : panels spent on a field that has fallen to its tail.
    furthest : a field is followed out to so many times its expected radius.
    phase : radians of kernel phase that one part of a panel of 32 nodes may carry.
    """

    settled: float = 1e-13
    dark: float = 1e-13
    most: int = 640
    tail: int = 200
    furthest: float = 6.0
    phase: float = 40.0


GROWTH = 1.4
FAR = 2.5

TAIL = 4
"""So many last coefficients must be small: one alone may vanish by parity."""


def _unsettled(profile: Profile, peak: float, settled: float) -> Reals:
    """For each panel, the largest of its last coefficients as a share of the peak, if that is too much; else 0."""
    rest = abs(profile.coefficients[:, :, -TAIL:]).max(axis=(0, 2))
    return np.asarray(np.where(rest > settled * peak, rest / max(peak, 1e-300), 0.0))


def resolved(
    function: Callable[[Reals], Complexes], edges: Reals, settings: Settings, *, peak: float = 0.0
) -> tuple[Profile, float]:
    """A profile on these edges, cut in halves until it has settled; and the share of the peak left unsettled."""
    profile = sampled(function, np.asarray(edges, dtype=float))
    while True:
        peak = max(peak, profile.peak)
        rest = _unsettled(profile, peak, settings.settled)
        # Below 1e-6 of the range there is an edge or noise, and halving would never end.
        wide = np.diff(profile.edges) > 1e-6 * profile.end
        bad = np.flatnonzero((rest > 0) & wide)
        if not len(bad) or len(rest) + len(bad) > settings.most:
            return profile, float(rest.max(initial=0.0))
        profile = _halved(profile, bad, function)


def _halved(profile: Profile, bad: NDArray[np.intp], function: Callable[[Reals], Complexes]) -> Profile:
    """The same profile with some panels cut in two and sampled anew, all in one call."""
    middles = (profile.edges[bad] + profile.edges[bad + 1]) / 2
    pairs = np.stack([profile.edges[bad], middles, profile.edges[bad + 1]], axis=1)
    nodes = np.concatenate([nodes_on(pair) for pair in pairs])
    fresh = function(nodes).reshape(len(profile.values), len(bad), 2, ORDER)
    values = np.insert(profile.values, bad + 1, fresh[:, :, 1], axis=1)
    values[:, bad + np.arange(len(bad))] = fresh[:, :, 0]
    return Profile(np.insert(profile.edges, bad + 1, middles), values)


def extended(function: Callable[[Reals], Complexes], edges: Reals, settings: Settings) -> tuple[Profile, float, bool]:
    """A profile that reaches out until it is dark; its unsettled share, and whether it had to be cut before."""
    profile, rest = resolved(function, edges, settings)
    limit = settings.furthest * profile.end
    while True:
        if _rim(profile) <= settings.dark * profile.peak:
            return profile, rest, False
        outer = min(GROWTH * profile.end, limit)
        # Fringes of a tail narrow outwards, so new panels start no wider than the last one is per radius.
        count = int(np.ceil((outer - profile.end) / (profile.edges[-1] - profile.edges[-2])))
        # Far out there is only a tail, and it may be cut: its light leaves at an angle and stays away from the middle.
        most = settings.tail if outer > FAR * edges[-1] else settings.most
        if outer <= profile.end or len(profile.edges) + count > most:
            return profile, rest, True
        more, its_rest = resolved(function, np.linspace(profile.end, outer, count + 1), settings, peak=profile.peak)
        profile = _joined(profile, more)
        rest = max(rest, its_rest)


def _rim(profile: Profile) -> float:
    """The largest modulus on the last panel."""
    return float(abs(profile.values[:, -1]).max())


def _joined(inner: Profile, outer: Profile) -> Profile:
    edges = np.concatenate([inner.edges, outer.edges[1:]])
    return Profile(edges, np.concatenate([inner.values, outer.values], axis=1))
