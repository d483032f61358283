"""How wide and how fine the light of arms is where they meet."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import combinations

from fastaxis.plan import Branch
from fastaxis.plan.spread import SMOOTH_RADII, Spread, of_beam

__all__ = ["Extent", "arrival"]

# Light behind a singularity or an edge has tails beyond the band of its moments: with eight times that band the power
# of a tilted beam joined to one of charge 2 is settled to 1e-11.
TAILS = 8


def arrival(arm: Branch) -> Spread:
    """Second moments of the light of an arm at the target."""
    spread = of_beam(arm.beam, arm.wavelength)
    for step in arm.steps:
        spread = spread.past(step.law, arm.wavelength)
    return spread


@dataclass(frozen=True)
class Extent:
    """What holds several beams in one plane.

    Parameters
    ----------
    half_window : half side [m] of a square about the axis that holds each beam; 0 if one has no end.
    frequency : highest spatial frequency [1/m] of the irradiance of their sum inside a radius.
    """

    half_window: float
    wavelength: float
    spreads: tuple[Spread, ...]

    @classmethod
    def of(cls, arms: Sequence[Branch]) -> Extent:
        spreads = tuple(arrival(arm) for arm in arms)
        endless = any(spread.infinite for spread in spreads)
        half = 0.0 if endless else max(spread.half_window for spread in spreads)
        return cls(half, arms[0].wavelength, spreads)

    @property
    def rough(self) -> bool:
        """Whether any of the beams has tails that fall off slowly."""
        return any(spread.rough for spread in self.spreads)

    @property
    def shared_half(self) -> float:
        """Half side [m] of a square that holds the product of any two beams.

        Of fields exp(-r^2/a^2) and exp(-r^2/b^2) it is exp(-r^2 (1/a^2 + 1/b^2)).
        """
        if not self.half_window:
            return 0.0
        return max(_shared(a, b) for a, b in combinations(self.spreads, 2))

    def frequency(self, reach: float) -> float:
        """Highest spatial frequency [1/m] of the sum's irradiance out to a distance [m] along each axis.

        That of the product of any two fields: their bands about their phase fronts, and what the fronts and slopes
        differ by, which grows outwards.
        """
        pairs = ((a, b) for a in self.spreads for b in self.spreads)
        return max((self._of_pair(a, b, reach) for a, b in pairs), default=0.0)

    def finest(self, reach: float) -> float:
        """The same, the tails of light behind a singularity or an edge included."""
        return self.frequency(reach) * (TAILS if self.rough else 1)

    def _of_pair(self, a: Spread, b: Spread, reach: float) -> float:
        within = min(reach, self.half_window) if self.half_window else reach
        leaning = max(abs(s - t) for s, t in zip(_lean(a), _lean(b), strict=True))
        # The spectrum of a product is the convolution of both; of two Gaussians the squares of their widths add.
        widths = [s.radii * 2 * s.angle for s in (a, b)]
        bands = sum(widths) if a.rough or b.rough else math.hypot(*widths)
        return (leaning + bands + abs(a.curvature - b.curvature) * within) / self.wavelength


def _lean(spread: Spread) -> tuple[float, float]:
    """Slope [rad] of a beam's phase front on the axis."""
    (x, y), (tx, ty) = spread.offset, spread.slope
    c = spread.curvature
    lean = (tx - c * x, ty - c * y)
    return lean if all(map(math.isfinite, lean)) else (0.0, 0.0)


def _shared(a: Spread, b: Spread) -> float:
    radii = [SMOOTH_RADII * 2 * spread.size for spread in (a, b)]
    middle = max(max(map(abs, spread.offset)) for spread in (a, b))
    return middle + radii[0] * radii[1] / math.hypot(*radii)
