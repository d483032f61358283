"""Settings, grids and formats as they are typed on a command line."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

from fastaxis.camera import SIX_STATES, four_frames, rotating_plate
from fastaxis.cli.quantities import quantity
from fastaxis.errors import ParameterError
from fastaxis.light import A, D, H, L, R, V, linear
from fastaxis.plan import Grid

__all__ = ["MOST", "STATES", "formats", "grid", "one_setting", "settings"]

MOST = 1000  # settings of one command: all of them go into one TIFF and one table
STATES = {state.label: state for state in (H, V, D, A, R, L)}


def _linear(count: int) -> tuple[Any, ...]:
    return tuple(linear(k * math.pi / count) for k in range(count))


_SERIES: dict[str, Callable[[int], tuple[Any, ...]]] = {"linear": _linear, "plate": rotating_plate}


def settings(text: str) -> tuple[Any, ...]:
    """A set of analyzer settings: six, four, linear:N (N angles over half a turn) or plate:N (a rotating plate).

    >>> len(settings("linear:8")), [state.label for state in settings("four")]
    (8, ['H', 'V', 'D', 'R'])

    Raises
    ------
    ParameterError : no such set.
    """
    if text in {"six", "four"}:
        return tuple(SIX_STATES) if text == "six" else four_frames()
    kind, _, count = text.partition(":")
    if kind in _SERIES and count.isdecimal() and int(count) > MOST:
        raise ParameterError(
            f"a command takes at most {MOST} settings; Python has no limit, and makes one frame at a time",
            got=f"settings '{text}'",
            fix=f"--settings {kind}:{MOST}",
        )
    if kind in _SERIES and count.isdecimal() and int(count) > 0:
        return _SERIES[kind](int(count))
    raise ParameterError(
        "settings are six, four, linear:N or plate:N", got=f"settings '{text}'", fix="--settings linear:8"
    )


def one_setting(text: str) -> Any:
    """One analyzer setting: H, V, D, A, R, L, an angle of a linear analyzer, or a letter for that angle.

    >>> one_setting("D").label
    'D'
    """
    if text in STATES:
        return STATES[text]
    if text.isidentifier():
        from sympy import Symbol  # noqa: PLC0415  # only formulas need letters

        return linear(Symbol(text, real=True))
    return linear(quantity(text))


def grid(text: str) -> Grid:
    """A grid of samples at the plane of the laser: "1024,8mm".

    Raises
    ------
    ParameterError : not a whole number and a length.
    """
    samples, _, window = text.partition(",")
    if not samples.strip().isdecimal() or not window:
        raise ParameterError("a grid is SAMPLES,WINDOW", got=f"grid '{text}'", fix="--grid 1024,8mm")
    return Grid(samples=int(samples), window=quantity(window))


def formats(text: str) -> tuple[str, ...]:
    """Picture formats, separated by commas: "png,pdf".

    Raises
    ------
    ParameterError : another format.
    """
    wanted = tuple(piece.strip() for piece in text.split(","))
    for piece in wanted:
        if piece not in {"png", "pdf"}:
            raise ParameterError("figures are written as png and pdf", got=f"format '{piece}'", fix="--format png,pdf")
    return wanted
