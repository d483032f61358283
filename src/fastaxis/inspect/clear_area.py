"""The share of a beam of given second moments that passes a clear area."""

from __future__ import annotations

import math
from typing import Any

from scipy.special import chndtr, ndtr

from fastaxis.laws import Annulus, Disc, HalfPlane, Rectangle, Strip
from fastaxis.plan.spread import Spread

__all__ = ["passed"]


def passed(stop: Any, centre: tuple[Any, Any], spread: Spread) -> float:
    """Share of the power of a Gaussian of these second moments inside a stop.

    Exact for a Gaussian beam, also off centre: r^2/size^2 about a displaced centre follows the non-central
    chi-squared law of two degrees of freedom. Other beams of the same moments differ, most at hard edges. A plane
    wave, whose power is counted on an area of its own, counts as passed.

    >>> from fastaxis.laws import Disc
    >>> round(passed(Disc(1e-3), (0.0, 0.0), Spread(0.5e-3, 0.0, 1e-4)), 6)  # 1 - exp(-2)
    0.864665
    """
    if spread.infinite:
        return 1.0
    x, y = (float(place) - float(middle) for place, middle in zip(spread.offset, centre, strict=True))
    round_stop = isinstance(stop, Disc | Annulus)
    return _round(stop, math.hypot(x, y), spread.size) if round_stop else _straight(stop, x, y, spread.size)


def _round(stop: Disc | Annulus, apart: float, size: float) -> float:
    if isinstance(stop, Annulus):
        return _within(float(stop.outer), apart, size) - _within(float(stop.inner), apart, size)
    inside = _within(float(stop.radius), apart, size)
    return 1 - inside if stop.opaque else inside


def _straight(stop: Any, x: float, y: float, size: float) -> float:
    if isinstance(stop, Rectangle):
        return _between(x, float(stop.width), size) * _between(y, float(stop.height), size)
    if isinstance(stop, Strip):
        return _between(y * stop.cosine - x * stop.sine, float(stop.width), size)
    if isinstance(stop, HalfPlane):
        return float(ndtr((x * stop.cosine + y * stop.sine) / size))
    return 1.0


def _within(radius: float, apart: float, size: float) -> float:
    return float(chndtr((radius / size) ** 2, 2, (apart / size) ** 2))


def _between(middle: float, width: float, size: float) -> float:
    return float(ndtr((width / 2 - middle) / size) - ndtr((-width / 2 - middle) / size))
