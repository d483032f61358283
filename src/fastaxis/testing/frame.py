"""A frame against a recorded one."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import sensor_at
from fastaxis.errors import ParameterError
from fastaxis.testing.asked import positive
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train, an_array

__all__ = ["frame_matches", "likeness"]

Reals = NDArray[np.float64]


@about_a_train
def frame_matches(
    train: Any,
    camera: str,
    recorded: Any,
    *,
    behind: Any,
    within: float = 0.02,
    scale: bool = True,
    shift: bool = False,
    flip: bool = False,
) -> None:
    """A frame looks like a recorded one: what is left over is at most ``within`` of it, root mean square.

    Parameters
    ----------
    train : the bench.
    camera : that looks.
    recorded : (ny, nx), rows along +y.
    behind : analyzer or state in front of the camera.
    within : relative difference that is still good.
    scale : let a common factor be free; else both are in watts per pixel.
    shift : let the recorded frame be moved by whole pixels.
    flip : let it be mirrored left to right.

    Raises
    ------
    BenchError : it looks otherwise.
    ParameterError : it has another shape, or numbers that are not finite; a deviation that is not positive; no
        camera or detector of that name.
    """
    within = positive("frame_matches", "within", within, fix="within=0.02")
    wanted = an_array("frame_matches", "recorded", recorded, float, fix='shots.frame("H")')
    shape = getattr(sensor_at(train, camera), "shape", (1, 1))
    if wanted.shape != tuple(shape):
        raise ParameterError(
            f"the recorded frame has the shape of the camera's: {tuple(shape)}",
            got=f"frame_matches: {wanted.shape}",
            fix='shots.frame("H")',
        )
    if not np.isfinite(wanted).all():
        raise ParameterError(
            "a recorded frame holds finite numbers only",
            got=f"frame_matches: {np.count_nonzero(~np.isfinite(wanted))} that are not",
            fix="np.nan_to_num(frame)",
        )
    free = [word for word, is_free in (("scale", scale), ("shift", shift), ("flip", flip)) if is_free]

    def left(shots: Any) -> float:
        return likeness(shots.frame(0), wanted, scale=scale, shift=shift, flip=flip)

    hold(
        train,
        Claim(
            camera,
            f"the recorded frame within {100 * within:g} %{', free ' + ', '.join(free) if free else ''}",
            lambda shots: f"a frame that differs by {100 * left(shots):.3g} %",
            lambda shots: left(shots) / within,
            "shots",
            (behind,),
            {"recorded": wanted},
        ),
    )


def likeness(frame: Reals, recorded: Reals, *, scale: bool, shift: bool, flip: bool) -> float:
    """The least of |recorded - s frame| / |recorded| over what is free, root mean square; 0 for the same picture."""
    whole, own = float((recorded**2).sum()), float((frame**2).sum())
    if not whole or not own:
        return 0.0 if whole == own else 1.0
    products = [_products(frame, one, shift=shift) for one in ((recorded, recorded[:, ::-1]) if flip else (recorded,))]
    common = max(products)
    factor = common / own if scale else 1.0
    return float(np.sqrt(max(whole - 2 * factor * common + factor**2 * own, 0.0) / whole))


def _products(frame: Reals, recorded: Reals, *, shift: bool) -> float:
    """Greatest sum of products of both pictures."""
    if not shift:
        return float((frame * recorded).sum())
    size = [2 * length for length in frame.shape]  # room, so that nothing comes in again at the other side
    spectrum = np.fft.rfft2(frame, size).conj() * np.fft.rfft2(recorded, size)
    return float(np.fft.irfft2(spectrum, size).max())
