"""Sets of settings that measure the whole polarization."""

from __future__ import annotations

import math

from fastaxis import checks
from fastaxis.camera.settings import Setting, plate_then_polarizer
from fastaxis.errors import ParameterError
from fastaxis.light.states import A, D, H, L, R, State, V
from fastaxis.maths import Scalar

__all__ = ["SIX_STATES", "four_frames", "rotating_plate"]

SIX_STATES: tuple[State, ...] = (H, V, D, A, R, L)
"""The six cardinal states: each pair adds up to the whole power."""


def four_frames() -> tuple[State, ...]:
    """The least set of states that measures all four Stokes images: H, V, D and R.

    S0 = I_H + I_V, S1 = I_H - I_V, S2 = 2 I_D - S0, S3 = 2 I_R - S0.

    >>> [state.label for state in four_frames()]
    ['H', 'V', 'D', 'R']
    """
    return (H, V, D, R)


def rotating_plate(
    count: int,
    *,
    retardance: Scalar = math.pi / 2,
    axis: Scalar = 0.0,
    start: Scalar = 0.0,
    span: Scalar = math.pi,
    extinction: Scalar = math.inf,
) -> tuple[Setting, ...]:
    """A plate turned in equal steps in front of a fixed polarizer.

    The fast axis stands at start, start + span/count, ...; the end of the span is left out, because a plate turned by
    half a turn is the same plate.

    Parameters
    ----------
    count : number of frames, 1 or more. Over half a turn, 5 or more measure all four Stokes images; 4 do not.
    retardance : of the plate [rad].
    axis : of the polarizer [rad].
    start : first angle of the fast axis [rad].
    span : angle turned through [rad].
    extinction : of the polarizer, 1 or more.

    Raises
    ------
    ParameterError : a count that is not a whole number of 1 or more.

    Notes
    -----
    H. G. Berry, G. Gabrielse, A. E. Livingston, Appl. Opt. 16, 3200 (1977).

    Examples
    --------
    >>> [setting.label for setting in rotating_plate(2)]
    ['plate fast 0°, polarizer 0°', 'plate fast 90°, polarizer 0°']
    """
    if isinstance(count, bool) or not isinstance(count, int) or count < 1:
        raise ParameterError(
            "count is a whole number of frames", got=f"rotating_plate: count = {count!r}", fix="count=16"
        )
    start, span = checks.angle("rotating_plate", "start", start), checks.angle("rotating_plate", "span", span)
    return tuple(
        plate_then_polarizer(fast=start + span * k / count, retardance=retardance, axis=axis, extinction=extinction)
        for k in range(count)
    )
