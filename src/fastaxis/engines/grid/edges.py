"""Light that edges scatter to steeper angles than the samples hold."""

from __future__ import annotations

import math

from fastaxis.engines.grid.light import GridLight, inner
from fastaxis.errors import SamplingWarning, caution
from fastaxis.plan import Grid

__all__ = ["beyond_share", "watch_frame"]

WARN = 0.01  # of the power: about what a power meter beside the camera would show
ROWS = 8


def beyond_share(light: GridLight) -> float:
    """Share of all the power that edges scattered beyond the band."""
    beyond = light.beyond
    if light.steep:
        # Every eighth row tells the size of a share, in an eighth of the time.
        rows = light.samples[:, ROWS // 2 :: ROWS]
        kept = inner(rows, rows).real * ROWS * light.pitch**2
        beyond += light.steep_power / kept if kept else 0.0
    # Below 0, where a part took a singularity away: its samples then hold a little more than the light.
    return max(beyond / (1 + beyond), 0.0)


def watch_frame(light: GridLight, grid: Grid | None) -> None:
    """Warn where a picture misses much of the power behind an edge; the share missed goes as the pitch.

    Warns
    -----
    SamplingWarning : more than 1 %.
    """
    missed = beyond_share(light)
    if grid is None or missed <= WARN:
        return
    samples = 2 * math.ceil(grid.samples * missed / WARN / 2)
    caution(
        SamplingWarning(
            "light that edges scatter beyond the band of the samples is in powers, but in no picture",
            got=f"edges, singularities on {grid.samples} samples: {missed:.1%} of the power missing from the picture",
            fix=f"grid=fa.Grid(samples={samples}, window={grid.window:.4g})",
        )
    )
