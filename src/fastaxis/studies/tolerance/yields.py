"""The share of good ones among draws, and how sure it is."""

from __future__ import annotations

import math
from dataclasses import dataclass

from scipy.special import ndtri

__all__ = ["Yield", "wilson"]


@dataclass(frozen=True)
class Yield:
    """Share of draws within limits.

    Parameters
    ----------
    good, draws : counts.
    low, high : Wilson interval of the share, 95 % sure.
    """

    good: int
    draws: int
    low: float
    high: float

    @property
    def share(self) -> float:
        """Good ones among all."""
        return self.good / self.draws

    def __str__(self) -> str:
        return f"{100 * self.share:.2f} % ({100 * self.low:.2f} to {100 * self.high:.2f} %)"


def wilson(good: int, draws: int, sure: float = 0.95) -> Yield:
    """The yield with its confidence interval. E. B. Wilson, J. Am. Stat. Assoc. 22, 209 (1927).

    >>> found = wilson(9, 10)
    >>> round(found.low, 4), round(found.high, 4)
    (0.5958, 0.9821)
    """
    z = float(ndtri((1 + sure) / 2))
    share, wide = good / draws, z**2 / draws
    middle = (share + wide / 2) / (1 + wide)
    half = z / (1 + wide) * math.sqrt(share * (1 - share) / draws + wide / (4 * draws))
    return Yield(good, draws, max(middle - half, 0.0), min(middle + half, 1.0))
