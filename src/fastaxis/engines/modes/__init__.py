"""The modes engine: sums of Gaussian modes, tilted and displaced or not, each in closed form behind any ray matrix."""

from fastaxis.engines.modes.running import run
from fastaxis.engines.modes.summing import ModeSum, combined

__all__ = ["ModeSum", "combined", "run"]
