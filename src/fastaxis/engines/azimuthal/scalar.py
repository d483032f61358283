"""Harmonics whose polarization is the same everywhere: a state, and the harmonics of one hand."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from fastaxis.engines.azimuthal.applying import TO_CIRCULAR
from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.engines.azimuthal.rendering import Orders, circular_field
from fastaxis.engines.azimuthal.table import Table

__all__ = ["ScalarHarmonics"]

SAME_STATE = 1e-13  # of the peak: what the harmonics themselves are settled to


@dataclass(frozen=True, eq=False)
class ScalarHarmonics:
    """state * exp(i k curvature r^2/2) * sum over l of f_l(r) exp(i l phi).

    Parameters
    ----------
    state : (Ex, Ey).
    hand : whose harmonics these are.
    orders : (hand, l) of each.
    table : f_l [sqrt(W)/m].
    curvature : 1/R [1/m] of the front that they are relative to.
    wavenumber : k [1/m].
    """

    state: Complexes
    hand: int
    orders: Orders
    table: Table
    curvature: float
    wavenumber: float

    @classmethod
    def of(cls, light: Harmonics, table: Table) -> ScalarHarmonics | None:
        """None if the polarization varies from place to place."""
        charges = list(dict.fromkeys(light.charges))
        both = np.zeros((2, len(charges), light.profile.values[0].size), dtype=complex)
        for row, (hand, l) in zip(light.profile.flat(), light.orders, strict=True):
            both[hand, charges.index(l)] = row
        hand = LEFT if np.linalg.norm(both[LEFT]) >= np.linalg.norm(both[RIGHT]) else RIGHT
        main, other = both[hand].ravel(), both[1 - hand].ravel()
        power = (abs(main) ** 2).sum()
        share = (main.conj() * other).sum() / power if power else 0.0
        if abs(other - share * main).max(initial=0.0) > SAME_STATE * light.profile.peak:
            return None
        state = TO_CIRCULAR.conj().T @ ([1, share] if hand == LEFT else [share, 1])
        rows = [i for i, order in enumerate(light.orders) if order[0] == hand]
        picked = np.eye(len(light.orders), dtype=complex)[rows]
        orders = tuple(light.orders[i] for i in rows)
        return cls(state, hand, orders, table.combined(picked), light.curvature, light.wavenumber)

    def on(self, x: Reals, y: Reals, curvature: float) -> Complexes:
        """Relative to a front of any curvature [1/m], at columns x and rows y, shape (ny, nx)."""
        field: Complexes = circular_field(self.table, self.orders, x, y)[self.hand]
        bend = self.wavenumber * (self.curvature - curvature) / 2
        if bend:
            field *= np.exp(1j * bend * x**2) * np.exp(1j * bend * y**2)[:, np.newaxis]
        return field
