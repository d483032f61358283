"""The visibility of the power at a port while a phase is stepped."""

from __future__ import annotations

from typing import Any

import numpy as np

from fastaxis.camera.settings import as_setting, no_analyzer
from fastaxis.testing.failing import Claim, hold

__all__ = ["visibility"]

STEPS = 8  # over a turn of the phase; harmonics up to the third do not disturb the first


def visibility(train: Any, port: str, expected: float, *, knob: str, within: float = 0.01, behind: Any = None) -> None:
    """The power at a port goes as 1 + V cos(phase) while a phase is stepped through a turn; V is as expected.

    V = 2 |c1| / c0 with the first two Fourier coefficients of eight readings.

    Parameters
    ----------
    train : the bench.
    port : port or detector.
    expected : visibility, 0 to 1.
    knob : parameter that is stepped, "shift.phase".
    within : deviation that is still good.
    behind : analyzer or state in front of it, if any.

    Raises
    ------
    BenchError : it is another.
    """
    weights = (no_analyzer() if behind is None else as_setting(behind)).weights
    part, _, parameter = knob.partition(".")

    def found(bench: Any) -> float:
        start = bench.elements[part].parameters()[parameter]
        turned = [bench.with_changes({knob: start + 2 * np.pi * k / STEPS}) for k in range(STEPS)]
        powers = np.array([weights @ _stokes(one, port) for one in turned])
        c0, c1 = np.abs(np.fft.fft(powers))[:2]
        return float(2 * c1 / c0) if c0 > 0 else 0.0

    hold(
        train,
        Claim(
            port,
            f"visibility {expected:.4g} within {within:g}",
            lambda bench: f"visibility {found(bench):.4g}",
            lambda bench: abs(found(bench) - expected) / within,
            "train",
        ),
    )


def _stokes(train: Any, port: str) -> Any:
    return sum(part.total_stokes for part in train.field(port))
