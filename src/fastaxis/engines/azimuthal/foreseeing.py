"""What is foreseen of the light behind a section: how wide it will be, and the panels that it will take."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from fastaxis.engines.azimuthal.harmonics import Harmonics
from fastaxis.engines.azimuthal.panels import Profile, Reals
from fastaxis.laws import TravelLaw

__all__ = ["INSIDE", "Waist", "foreseen", "waist_behind"]

INSIDE = 1 - math.exp(-2)  # share of the power inside of the 1/e^2 radius
CARRIED = 16.0  # phase [rad] of a panel of 32 nodes with an envelope of its own: 2.5 fringes, less what that takes
DARK = 1e-13  # of the peak, which is what panels settle to
RIM = 1e-12  # of the peak: where a field ends in the dark


@dataclass(frozen=True)
class Waist:
    """A Gaussian beam about as wide as the light, behind the section: where to look and on which front.

    Parameters
    ----------
    radius : that holds 86 % of the power [m].
    reach : where it gets dark as the light before the section does [m].
    curvature : of its front [1/m].
    """

    radius: float
    reach: float
    curvature: float


def waist_behind(field: Harmonics) -> Waist:
    """The beam that the light would be if it were a Gaussian one, spreading the more for each charge."""
    flat, k = TravelLaw.lens(-field.curvature).then(field.section), field.wavenumber
    inside = _radius(field.profile)
    spread = (1 + max(abs(l) for l in field.charges)) * 2 / (k * inside)
    radius = math.hypot(flat.a * inside, flat.b * spread)
    # Re 1/q behind the section, for a flat waist in front of it.
    curvature = (flat.a * flat.c * inside**2 + flat.b * flat.d * spread**2) / radius**2
    return Waist(radius, radius * _lit(field.profile) / inside, curvature)


def _radius(profile: Profile) -> float:
    """Radius [m] that holds 86 % of the power: the 1/e^2 radius of a Gaussian beam."""
    density = (abs(profile.flat()) ** 2).sum(axis=0) * profile.weights * profile.nodes
    share = np.cumsum(density) / density.sum()
    return float(profile.nodes[np.searchsorted(share, INSIDE)])


def _lit(profile: Profile) -> float:
    """Radius [m] up to which the light counts, whatever is followed beyond."""
    level = abs(profile.flat()).max(axis=0)
    return float(profile.nodes[np.flatnonzero(level >= DARK * profile.peak)[-1]])


def _rim(field: Harmonics) -> float:
    """Radius [m] of the outermost rim that is lit: of a hole, or of an obstacle; 0 if there is none."""
    profile, level = field.profile, RIM * field.profile.peak
    if field.taper is None and abs(profile.values[:, -1, -4:]).max() > level:
        return profile.end
    return profile.start if abs(profile.values[:, 0, :4]).max() > level else 0.0


def foreseen(field: Harmonics, waist: Waist, curvature: float, end: float, most: int) -> Reals:
    """Panels with about as many fringes each as they carry, so that few have to be halved.

    On a front of its own a beam takes some panels for each charge that widens it. With the wave from a singular axis it
    has fringes, whichever of both fronts it is on; and a lit rim sends out waves of k rim/b. Beyond the beam the tail
    is smooth in log r.
    """
    flat = TravelLaw.lens(-field.curvature).then(field.section)
    core = abs(field.profile(np.zeros(1))[np.array(field.charges) != 0]).max(initial=0.0)
    other = flat.d / flat.b if core > RIM * field.profile.peak else curvature
    rim = _rim(field)
    near = end if rim else min(end, waist.reach)
    bend = field.wavenumber * abs(other - waist.curvature) / 2
    slope = 1.7 * CARRIED * (1 + max(abs(l) for l in field.charges)) / waist.reach
    if rim:
        slope = max(slope, field.wavenumber * rim / abs(flat.b))
    whole = near * (slope + bend * near)
    phase = np.linspace(0, whole, min(max(2, math.ceil(whole / CARRIED)), most) + 1)
    inner = 2 * phase / (slope + np.sqrt(slope**2 + 4 * bend * phase))
    inner[-1] = near
    outer = near * (end / near) ** np.linspace(0, 1, max(1, math.ceil(math.log2(end / near))) + 1)
    outer[-1] = end
    return inner if near == end else np.concatenate([inner, outer[1:]])
