"""The grid a user may set by hand."""

from __future__ import annotations

from dataclasses import dataclass

from fastaxis.errors import ParameterError

__all__ = ["Grid"]

MOST = 32768  # along a side
BYTES = 48  # a sample at the peak: three planes of complex numbers


@dataclass(frozen=True)
class Grid:
    """Square samples at the plane of the source, in place of the automatic choice.

    Parameters
    ----------
    samples : number along a side, even, 16 to 32768.
    window : side of the sampled square [m].

    Raises
    ------
    ParameterError : an odd, tiny or huge number of samples; a window that is not a positive length.

    Examples
    --------
    >>> Grid(samples=512, window=8e-3).pitch
    1.5625e-05
    """

    samples: int
    window: float

    def __post_init__(self) -> None:
        if self.samples != int(self.samples) or self.samples < 16 or self.samples % 2:
            raise ParameterError(
                "samples is an even number along a side, 16 or more",
                got=f"Grid: samples = {self.samples}",
                fix="fa.Grid(samples=1024, window=10*mm)",
            )
        if self.samples > MOST:
            raise ParameterError(
                f"samples is at most {MOST} along a side",
                got=f"Grid: samples = {self.samples} takes {BYTES * self.samples**2 / 1e9:.3g} GB",
                fix="fa.Grid(samples=4096, window=10*mm)",
            )
        if not 0 < self.window < 100:
            raise ParameterError(
                "window is the side of the sampled square in metres",
                got=f"Grid: window = {self.window}",
                fix="fa.Grid(samples=1024, window=10*mm)",
            )

    @property
    def pitch(self) -> float:
        """Distance of neighbouring samples [m]."""
        return self.window / self.samples
