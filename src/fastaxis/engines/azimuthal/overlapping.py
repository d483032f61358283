"""What two fields of harmonics have in common, summed along the radius."""

from __future__ import annotations

import numpy as np

from fastaxis.engines.azimuthal.applying import TO_CIRCULAR
from fastaxis.engines.azimuthal.combining import same_way, shared_edges
from fastaxis.engines.azimuthal.harmonics import Harmonics
from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.azimuthal.resolving import Settings, resolved

__all__ = ["overlap"]


def overlap(one: AzimuthalField, other: AzimuthalField, reach: float) -> Complexes:
    """Integrals over the plane of conj(E_i) E_j, i of one and j of the other in (x, y), shape (2, 2) [W].

    Around the axis only harmonics of equal l are left. Fields with the same way still to go, which changes no
    overlap, are compared in front of it; others in the plane of the target, out to ``reach`` [m].
    """
    pairs = [
        (i, j)
        for i, (_, l) in enumerate(one.harmonics.orders)
        for j, (_, m) in enumerate(other.harmonics.orders)
        if l == m
    ]
    circular = np.zeros((2, 2), dtype=complex)
    if pairs:
        lights = [one.harmonics, other.harmonics]
        if not same_way(lights):
            lights = [one.out_to(reach), other.out_to(reach)]
        # What has arrived has the orders that it had.
        for (i, j), value in zip(pairs, _integrals(lights, pairs, one.settings), strict=True):
            circular[lights[0].orders[i][0], lights[1].orders[j][0]] += value
    return np.asarray(TO_CIRCULAR.T @ circular @ TO_CIRCULAR.conj())


def _integrals(lights: list[Harmonics], pairs: list[tuple[int, int]], settings: Settings) -> Complexes:
    """2 pi times the integrals of conj(f_i) f_j r dr, the fronts and soft ends included."""
    one, other = lights
    bend = one.wavenumber * (other.curvature - one.curvature) / 2
    left, right = ([pair[k] for pair in pairs] for k in (0, 1))

    def products(r: Reals) -> Complexes:
        ends = [light.taper(r) if light.taper else 1.0 for light in lights]
        return np.asarray(
            one.profile(r)[left].conj() * other.profile(r)[right] * (np.exp(1j * bend * r**2) * ends[0] * ends[1])
        )

    profile, _ = resolved(products, shared_edges(lights), settings, peak=one.profile.peak * other.profile.peak)
    return np.asarray((profile.flat() * (2 * np.pi * profile.weights * profile.nodes)).sum(axis=1))
