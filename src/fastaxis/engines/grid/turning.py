"""The picture turned about the axis: exact for quarter turns, by three shears in between."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
from scipy import fft

from fastaxis.engines.grid.light import GridLight, Samples
from fastaxis.engines.grid.workers import WORKERS
from fastaxis.laws import Turn

__all__ = ["turned"]

QUARTER = math.pi / 2
# A turn off a whole quarter by no more than the rounding of its own sum is one.
WHOLE = 1e-14


def turned(light: GridLight, law: Turn) -> GridLight:
    """Places turned counter-clockwise; the curvature kept apart is round and stays.

    R(-angle) is the product of three shears, x += a y, y += b x, x += a y with a = tan(angle/2) and b = -sin(angle).
    Each shifts whole rows or columns of the band-limited curve, so nothing is lost as long as the light keeps 8 % of
    dark room around it in the window and in the band. A. W. Paeth, Proc. Graphics Interface 77 (1986);
    M. Unser, P. Thevenaz and L. Yaroslavsky, IEEE Trans. Image Process. 4, 1371 (1995).
    """
    quarters = round(law.angle / QUARTER)
    rest = law.angle - quarters * QUARTER
    # Rows run along +y, so the turn from x towards y goes from the last axis to the one before.
    light = light.moved(
        lambda samples: np.rot90(samples, quarters, axes=(2, 1)), lambda place: place * 1j ** (quarters % 4)
    )
    samples = light.samples
    if abs(rest) > WHOLE * max(1.0, abs(law.angle)):
        across = math.tan(rest / 2)
        for axis, slope in ((2, across), (1, -math.sin(rest)), (2, across)):
            samples = _sheared(samples, slope, axis)
    steep = tuple(one._replace(turned=one.turned + rest) for one in light.steep)
    return replace(light, samples=samples, steep=steep)


def _sheared(samples: Samples, slope: float, axis: int) -> Samples:
    """f(x + slope y, y) along axis 2, or f(x, y + slope x) along axis 1, of the curve through the samples."""
    count = samples.shape[-1]
    places = np.arange(count) - (count - 1) / 2
    waves = fft.fftfreq(count)
    phases = np.exp(2j * np.pi * slope * np.outer(places, waves))
    # The highest wave is shared by both signs: its shift is a cosine.
    phases[:, count // 2] = phases[:, count // 2].real
    spectrum = fft.fft(samples, axis=axis, workers=WORKERS)
    spectrum *= (phases if axis == 2 else phases.T).astype(samples.dtype, copy=False)
    shifted: Samples = fft.ifft(spectrum, axis=axis, overwrite_x=True, workers=WORKERS)
    return shifted
