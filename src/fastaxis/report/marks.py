"""A small mark in the corner of a frame: the state that its analyzer lets pass."""

from __future__ import annotations

from typing import Any

import numpy as np
from matplotlib.axes import Axes
from matplotlib.patches import Polygon
from numpy.typing import NDArray

from fastaxis.report.glyphs import FLAT, TURN, Glyphs
from fastaxis.report.style import PAPER

__all__ = ["mark_analyzer"]

SIZE = 0.07  # of the shorter side of the picture: half the long axis of the mark
LEAST = 0.02  # of the power; an analyzer that passes all states nearly alike gets no mark


def mark_analyzer(axes: Axes, weights: NDArray[Any]) -> bool:
    """Draw the ellipse that passes best into the lower left corner, with an arrow for its sense; False if none does.

    ``weights`` are those of S0 to S3 in the frame, R named in the receiver's view, as seen in the picture.
    """
    m0, m1, m2, m3 = (float(weight) for weight in weights)
    if np.sqrt(m1**2 + m2**2 + m3**2) < LEAST * m0:
        return False
    (left, right), (bottom, top) = axes.get_xlim(), axes.get_ylim()
    size = SIZE * min(right - left, top - bottom)
    place = (np.array([left + 1.6 * size]), np.array([bottom + 1.6 * size]))
    state = (np.array([np.arctan2(m2, m1) / 2]), np.array([np.arctan2(m3, np.hypot(m1, m2)) / 2]))
    glyph = Glyphs(*place, *state, np.array([size]))
    axes.plot(*glyph.curve(TURN)[0].T, color=PAPER, lw=0.9, scalex=False, scaley=False)
    if abs(np.degrees(state[1][0])) > FLAT:
        axes.add_patch(Polygon(glyph.arrow_heads(0.8 * size)[0], fc=PAPER, lw=0))
    return True
