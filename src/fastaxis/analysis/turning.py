"""How fast, and which way, the lobes turn when the analyzer turns."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import ArrayLike, NDArray

from fastaxis.analysis.lobes import lobes
from fastaxis.errors import ParameterError

__all__ = ["Turning", "turning", "turning_rate"]


@dataclass(frozen=True)
class Turning:
    """Turning of a pattern against a knob.

    Parameters
    ----------
    rate : angle of the lobes per angle of the knob; +1 turns with it, -1 against it, 0 stands still.
    lobes : bright lobes of the pattern.
    scatter : root mean square deviation from the straight line [rad].
    """

    rate: float
    lobes: int
    scatter: float


def turning(shots: Any, *, centre: tuple[float, float] = (0.0, 0.0)) -> Turning:
    """Rate of the lobes against the linear analyzers among the settings of an exposure.

    Parameters
    ----------
    shots : an Exposure with three or more linear settings (``[fa.linear(a) for a in ...]``); others are left out.
    centre : about which the lobes are counted [m].

    Raises
    ------
    ParameterError : fewer than three linear settings; frames without lobes, or with different numbers of them; steps
        too wide to tell the sense.
    """
    analyzers = _linear_angles(shots)
    if len(analyzers) < 3:
        raise ParameterError(
            "a turning rate needs three linear settings or more",
            got=f"turning: {len(analyzers)} linear settings among {len(shots.labels)}",
            fix='train.expose("cam", [fa.linear(a*deg) for a in (0, 20, 40, 60)])',
        )
    # In the beam's own frame, where analyzer angles are counted, whichever way the camera is mounted.
    shots = shots.upright
    order = sorted(analyzers, key=analyzers.__getitem__)
    found = [lobes(shots.frame(k), x=shots.x, y=shots.y, centre=centre) for k in order]
    counts = sorted({one.count for one in found})
    if len(counts) != 1 or counts[0] == 0:
        raise ParameterError(
            "all frames of a turning pattern have the same number of lobes, one or more",
            got=f"turning: frames with {' and '.join(map(str, counts))} lobes",
            fix="shots.table()",
        )
    return turning_rate([analyzers[k] for k in order], [one.angle for one in found], counts[0])


def _linear_angles(shots: Any) -> dict[int, float]:
    """Analyzer angle of each linear setting, by index."""
    angles = {}
    for k, (_, m1, m2, m3) in enumerate(shots.weights):
        # Roundings of a plate and a polarizer are 1e-16; the least ellipticity dialled on purpose is far above 1e-9.
        if abs(m3) <= 1e-9 * math.hypot(m1, m2):
            angles[k] = math.atan2(m2, m1) / 2
    return angles


def turning_rate(knob: ArrayLike, angles: ArrayLike, count: int) -> Turning:
    """Slope of lobe angles against the angles of any knob, by least squares.

    Parameters
    ----------
    knob : (n,) angles of the knob [rad], in order.
    angles : (n,) angle of a bright lobe at each [rad], each known up to a multiple of 2 pi / count.
    count : lobes of the pattern.

    Raises
    ------
    ParameterError : fewer than two different knob angles; a step of about half the spacing of the lobes, which can
        be read both ways.

    Examples
    --------
    >>> turning_rate([0, 0.5, 1.0], [0, -0.5 + math.pi, -1.0 + math.pi], 2).rate.__round__(12)
    -1.0
    """
    knob, turned = np.asarray(knob, float), np.asarray(angles, float)
    if knob.size < 2 or np.ptp(knob) == 0:
        raise ParameterError(
            "a rate needs two different angles of the knob", got=f"turning_rate: knob = {knob.tolist()}", fix="[0, 0.3]"
        )
    spacing = 2 * math.pi / count
    _refuse_wide_steps(turned, spacing)
    unwrapped = np.unwrap(turned, period=spacing)
    slope, offset = np.polyfit(knob, unwrapped, 1)
    scatter = float(np.sqrt(np.mean((unwrapped - slope * knob - offset) ** 2)))
    return Turning(float(slope), count, scatter)


def _refuse_wide_steps(turned: NDArray[np.float64], spacing: float) -> None:
    steps = np.diff(turned)
    widest = float(np.max(np.abs(steps - spacing * np.round(steps / spacing))))
    # Exactly half a spacing reads the same both ways; 5 % short of it a small error of an angle would decide.
    if widest > 0.45 * spacing:
        raise ParameterError(
            f"lobes {math.degrees(spacing):g} deg apart show their sense in steps well below half of that",
            got=f"turning_rate: a step of {math.degrees(widest):.3g} deg",
            fix="[fa.linear(a*deg) for a in range(0, 180, 10)]",
        )
