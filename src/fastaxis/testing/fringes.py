"""The visibility of fringes: of a pair of paths, or of the power at a port while a phase is stepped."""

from __future__ import annotations

from typing import Any

import numpy as np

from fastaxis.analysis.visibility import visibility as visibility_of
from fastaxis.camera.settings import as_setting, no_analyzer
from fastaxis.errors import ParameterError, WiringError
from fastaxis.testing.asked import at_least, positive
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train

__all__ = ["visibility"]

STEPS = 8  # over a turn of the phase; harmonics up to the sixth do not disturb the first


@about_a_train
def visibility(
    train: Any, target: str, expected: float, *, within: float = 0.01, behind: Any = None, knob: str | None = None
) -> None:
    """Fringes are as deep as expected.

    Parameters
    ----------
    train : the bench.
    target : camera, detector or port.
    expected : visibility, 0 to 1.
    within : deviation that is still good.
    behind : analyzer or state in front of it, if any.
    knob : parameter that is stepped through a turn, "shift.phase": then V = 2 |c1|/c0 of the power at the target,
        from the first two Fourier coefficients of eight readings. Without a knob it is the product of coherence,
        balance, polarization and spatial overlap of the two paths, as ``train.visibility`` tells it.

    Raises
    ------
    BenchError : they are deeper or shallower.
    WiringError : no knob, and not two paths.
    ParameterError : a visibility that is not between 0 and 1; a deviation that is not positive; a knob that has no
        number.
    """
    expected = at_least("visibility", "expected", expected, 0.0, fix="expected=0.9")
    within = positive("visibility", "within", within, fix="within=0.01")
    if expected > 1:
        raise ParameterError(
            "a visibility lies between 0 and 1", got=f"visibility: expected = {expected:g}", fix="expected=0.9"
        )
    if knob is not None:
        _check_knob(train, knob)

    def found(bench: Any) -> tuple[float, str]:
        return _of_paths(bench, target, behind) if knob is None else _stepped(bench, target, behind, knob)

    hold(
        train,
        Claim(
            target,
            f"visibility {expected:.4g} within {within:g}",
            lambda bench: found(bench)[1],
            lambda bench: abs(found(bench)[0] - expected) / within,
            "train",
        ),
    )


def _check_knob(train: Any, knob: str) -> None:
    part, _, parameter = str(knob).partition(".")
    element = train.elements.get(part)
    known = {} if element is None else element.parameters()
    value = known.get(parameter)
    if isinstance(value, bool) or not isinstance(value, int | float):
        phases = [f"{name}.phase" for name, one in train.elements.items() if "phase" in one.parameters()]
        raise ParameterError(
            "a knob is a parameter with a number that is stepped through a turn",
            got=f"visibility: knob = {knob!r}",
            fix=f'knob="{(*phases, "shift.phase")[0]}"',
        )


def _of_paths(train: Any, target: str, behind: Any) -> tuple[float, str]:
    pairs = visibility_of(train, target, behind).pairs
    if len(pairs) != 1:
        raise WiringError(
            "fringes of more than two paths are measured by stepping a phase",
            got=f"visibility: {len(pairs)} pairs of paths to {target}",
            fix='knob="shift.phase"',
        )
    return pairs[0].value, f"visibility {pairs[0]}"


def _stepped(train: Any, target: str, behind: Any, knob: str) -> tuple[float, str]:
    weights = (no_analyzer() if behind is None else as_setting(behind)).weights
    part, _, parameter = str(knob).partition(".")
    start = train.elements[part].parameters()[parameter]
    turned = [train.with_changes({knob: start + 2 * np.pi * k / STEPS}) for k in range(STEPS)]
    powers = np.array([weights @ sum(light.total_stokes for light in one.field(target)) for one in turned])
    c0, c1 = np.abs(np.fft.fft(powers))[:2]
    value = float(2 * c1 / c0) if c0 > 0 else 0.0
    return value, f"visibility {value:.4g}"
