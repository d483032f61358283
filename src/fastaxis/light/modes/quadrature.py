"""Overlap integrals over a disc, for modes without a closed form."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING, Any

import numpy as np

from fastaxis.errors import SamplingError
from fastaxis.light.gauss import gauss_legendre

if TYPE_CHECKING:
    from fastaxis.light.modes.base import Mode

__all__ = ["over_disc"]

NODES = (32, 64, 128, 256, 512, 1024)
SETTLED = 1e-12  # of unit power: some hundred roundings of the sum


def over_disc(pair: tuple[Mode, Mode], wavelength: float, *, centre: tuple[Any, Any], radius: float) -> complex:
    """<one|other> over a disc: Gauss-Legendre along the radius, equal steps around, doubled until it settles.

    Both rules converge geometrically for amplitudes that are smooth inside the disc. The first rule already sees
    the finest detail, or two blind sums would agree on nothing.
    """
    last = complex(math.inf)
    # A hard edge is the border of the disc and has no detail inside.
    least = 4 * radius / min(_finest(mode, wavelength) for mode in pair if not mode.hard)
    for count in (nodes for nodes in NODES if nodes >= least):
        this = _polar_sum(pair, wavelength, count, centre=centre, radius=radius)
        if abs(this - last) < SETTLED:
            return this
        last = this
    raise SamplingError(
        f"the overlap of two modes must settle within {NODES[-1]} nodes: one is too fine, or has too many fringes, for "
        "the other; light without a fixed phase needs no overlap",
        got=" beside ".join(type(mode).__name__ for mode in pair),
        fix="fa.make_source(((0.5, fa.FlatTop(radius=1*mm)), (0.5, fa.Gaussian(waist=0.8*mm))), fa.H, power=5*mW)",
    )


def _finest(mode: Mode, wavelength: float) -> float:
    """Finest detail [m] of an amplitude: wavelength over 2 pi times its spread of angles."""
    return wavelength / (2 * math.pi * math.sqrt(mode.moments(wavelength).t2))


def _polar_sum(
    pair: tuple[Mode, Mode], wavelength: float, count: int, *, centre: tuple[Any, Any], radius: float
) -> complex:
    nodes, weights = gauss_legendre(count)
    r = radius * (nodes + 1) / 2
    angle = np.arange(count) * (2 * math.pi / count)
    x, y = centre[0] + np.outer(r, np.cos(angle)), centre[1] + np.outer(r, np.sin(angle))
    bra, ket = (mode.amplitude(x, y, wavelength) for mode in pair)
    return complex(np.sum((weights * r) @ (bra.conj() * ket)) * (radius / 2) * (2 * math.pi / count))
