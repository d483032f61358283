"""Overlap integrals over a disc, for modes without a closed form."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING, Any

import numpy as np

from fastaxis.errors import SamplingError

if TYPE_CHECKING:
    from fastaxis.light.modes.base import Mode

__all__ = ["over_disc"]

NODES = (32, 64, 128, 256, 512, 1024)
SETTLED = 1e-12  # of unit power: some hundred roundings of the sum


def over_disc(pair: tuple[Mode, Mode], wavelength: float, *, centre: tuple[Any, Any], radius: float) -> complex:
    """<one|other> over a disc: Gauss-Legendre along the radius, equal steps around, doubled until it settles.

    Both rules converge geometrically for amplitudes that are smooth inside the disc.
    """
    last = complex(math.inf)
    for count in NODES:
        this = _polar_sum(pair, wavelength, count, centre=centre, radius=radius)
        if abs(this - last) < SETTLED:
            return this
        last = this
    raise SamplingError(
        f"the overlap of two modes must settle within {NODES[-1]} nodes: their phases differ by too many fringes",
        got=f"{type(pair[0]).__name__} beside {type(pair[1]).__name__}: off by {abs(this - last) or SETTLED:.1e} still",
        fix="waist_at=0*mm",
    )


def _polar_sum(
    pair: tuple[Mode, Mode], wavelength: float, count: int, *, centre: tuple[Any, Any], radius: float
) -> complex:
    nodes, weights = np.polynomial.legendre.leggauss(count)
    r = radius * (nodes + 1) / 2
    angle = np.arange(count) * (2 * math.pi / count)
    x, y = centre[0] + np.outer(r, np.cos(angle)), centre[1] + np.outer(r, np.sin(angle))
    bra, ket = (mode.amplitude(x, y, wavelength) for mode in pair)
    return complex(np.sum((weights * r) @ (bra.conj() * ket)) * (radius / 2) * (2 * math.pi / count))
