"""Patterns that are finer than the samples they are put on."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray
from scipy import fft

from fastaxis.engines.grid.filled import marginals
from fastaxis.engines.grid.light import GridLight, Samples, axis
from fastaxis.laws import AxisLaw, ScalarLaw
from fastaxis.maths import NUMBERS, Pattern

__all__ = ["MOST", "finer_wanted"]

Reals = NDArray[np.float64]

LINES = 6  # rows, and columns, of the light that are looked at
MOST = 8  # places over samples along them
BAND = 15 / 32  # cycles a sample: the end of the band, but for what counts as near it
ALIASED = 1e-4  # of the power of a line: a hundredth of the field, as fringes
# Steps leave 1/4 of what is aliased beyond the band of samples four times as fine, kinks 1/64: no samples are fine
# enough for either. Of a smooth pattern nothing is left; of one that is finer still, all.
SMOOTH, FLAT = 1 / 1000, 1 / 2
CELLS = 1e-2  # of the power: orders of cells smaller than the samples, which steps of a tenth of a wave do not reach


def finer_wanted(light: GridLight, law: AxisLaw | ScalarLaw) -> int:
    """How many times as fine samples must be to hold a pattern: 1 where they are fine enough.

    Some lines of the light are put through the pattern at places ``MOST`` times as dense: what is then beyond the band
    of the samples would come back as waves that are not there.
    """
    patterns = [value for value in law.values if isinstance(value, Pattern)]
    cell = min((pattern.pixel for pattern in patterns if pattern.pixel), default=light.pitch)
    functions = any(pattern.pixel is None for pattern in patterns)
    if cell >= light.pitch and not functions:
        return 1  # steps between samples are edges
    found = [_beyond(light, law, down=down) for down in (False, True)]
    before, behind = (sum(shares) / 2 for shares in zip(*found, strict=True))
    most, last = behind[0], behind[-1]
    if cell < light.pitch and most > CELLS:
        return math.ceil(light.pitch / cell)
    # Light with slow tails reaches beyond its band behind any pattern.
    if not functions or most <= ALIASED + before or SMOOTH * most < last < FLAT * most:
        return 1
    return MOST if last >= FLAT * most else int(2 ** np.argmax(behind <= max(SMOOTH * most, ALIASED / 10)))


def _beyond(light: GridLight, law: AxisLaw | ScalarLaw, *, down: bool) -> tuple[float, Reals]:
    """Of some lines: the share of the power in the upper half of the band, and behind a pattern that beyond the band.

    The second for samples 1, 2, 4 ... ``MOST``/2 times as fine.
    """
    samples = light.components().swapaxes(1, 2) if down else light.components()
    chosen = _bright(marginals(light.samples)[down])
    beside, along = light.x[chosen, None], axis(MOST * light.count, light.pitch / MOST)[None, :]
    x, y = (beside, along) if down else (along, beside)
    before = _denser(samples[:, chosen])
    behind = _past(law, before, *np.broadcast_arrays(x - law.centre[0], y - law.centre[1]))
    order = abs(fft.fftfreq(before.shape[-1], 1 / MOST))
    ends = [BAND * 2.0**k for k in range(MOST.bit_length() - 1)]
    return _shares(before, order, [0.25])[0], _shares(behind, order, ends)


def _bright(power: Reals) -> NDArray[np.intp]:
    """Lines that part the power evenly."""
    below = np.cumsum(power)
    return np.unique(np.searchsorted(below, (np.arange(LINES) + 0.5) / LINES * below[-1]))


def _denser(lines: Samples) -> Samples:
    """The curves through some lines of samples at places ``MOST`` times as dense, about the same middle."""
    count = lines.shape[-1]
    waves, orders = fft.fft(lines, axis=2), fft.fftfreq(count, 1 / count)
    # Of n places symmetric about the middle the first lies (n - 1)/2 of their pitches before it.
    waves *= np.exp(2j * np.pi * orders / count * ((count - 1) / 2 - (MOST * count - 1) / 2 / MOST))
    wide = np.zeros((*lines.shape[:2], MOST * count), dtype=complex)
    wide[:, :, orders.astype(int)] = waves
    return np.asarray(fft.ifft(wide, axis=2))


def _past(law: AxisLaw | ScalarLaw, lines: Samples, x: Reals, y: Reals) -> Samples:
    if isinstance(law, ScalarLaw):
        return np.asarray(law.transmission.value(NUMBERS, x, y) * lines)
    ex, ey = lines
    phi = np.arctan2(y, x) if law.order else 0.0
    return np.array([a * ex + b * ey for a, b in law.linear(NUMBERS, phi, x, y)])


def _shares(lines: Samples, order: Reals, ends: list[float]) -> Reals:
    """Shares of the power beyond some orders."""
    waves = np.sum(abs(fft.fft(lines, axis=2)) ** 2, axis=(0, 1))
    return np.array([waves[order > end].sum() for end in ends]) / (waves.sum() or 1.0)
