"""Parts beside their place: where a plate, a lens or the camera would stand to make what was recorded."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from functools import partial
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements import Camera, FreeSpace, Lens, PatternedPolarizer, PatternedRetarder, QPlate, SpiralPlate
from fastaxis.errors import FastaxisError
from fastaxis.maths import is_symbolic

__all__ = ["displaced"]

Reals: TypeAlias = NDArray[np.float64]

CENTRED = (QPlate, SpiralPlate, PatternedRetarder, PatternedPolarizer, Lens, Camera)
STEP = 0.02  # of the beam's waist between two places that are compared
FAR = 0.3  # of the waist moved in one go: about as far as pictures change in proportion
ROUNDS = 4
EXPLAINS = 0.9  # of the difference must be left at most after the first step; else the place is not what is wrong
LEAST = 0.005  # of the waist: nearer than that a part stands where it was declared


def displaced(
    train: Any, names: list[str], frames: Callable[[Any], Reals], recorded: Reals
) -> Iterator[tuple[str, Any]]:
    """(words, train) for each part with a centre, at the place that fits best.

    Least squares in the place and the scale common to all frames, with slopes from places on either side.

    Parameters
    ----------
    names : parts that the light meets, the camera among them.
    frames : of a train.
    recorded : frames, of any scale.
    """
    length = _length(train)
    for name in names:
        part = train.elements[name]
        # Right behind a plate its singular point is inside a pixel, and every place of the camera takes a minute.
        if isinstance(part, Camera) and not _travels(train, names):
            continue
        if not isinstance(part, CENTRED) or any(is_symbolic(value) for value in part.centre):
            continue
        start = np.array([float(value) for value in part.centre])
        try:
            place = _fitted(start, partial(_seen, train, name, frames), recorded, length)
        except FastaxisError:
            continue
        off = place - start
        if np.abs(off).max() >= LEAST * length:
            words = f"{name} stands {_told(off[0])} in x and {_told(off[1])} in y beside its place"
            yield words, train.with_changes(_changes(name, place))


def _travels(train: Any, names: list[str]) -> bool:
    """Whether light goes some way from the last plate with a pattern to the camera."""
    parts = [train.elements[name] for name in names]
    plates = [k for k, part in enumerate(parts) if isinstance(part, CENTRED) and not isinstance(part, Lens | Camera)]
    return not plates or any(isinstance(part, FreeSpace) for part in parts[plates[-1] :])


def _fitted(place: Reals, frames: Callable[[Reals], Reals], recorded: Reals, length: float) -> Reals:
    wanted = recorded.ravel()
    for turn in range(ROUNDS):
        around = [place + sign * STEP * length * axis for axis in np.eye(2) for sign in (1, -1)]
        right, left, up, down = (frames(one).ravel() for one in around)
        # The mean of four places about it stands for the place itself: on the axis light may be computed another way.
        middle = (right + left + up + down) / 4
        slopes = np.stack([middle, right - left, up - down], axis=1)
        scale, *moved = numbers = _least_squares(slopes, wanted)
        whole = _least_squares(slopes[:, :1], wanted)[0] * middle
        rest, before = (float(np.linalg.norm(wanted - fit)) for fit in (slopes @ numbers, whole))
        if not scale > 0 or (turn == 0 and rest > EXPLAINS * before):
            return place
        step = 2 * STEP * length * np.array(moved) / scale
        size = float(np.linalg.norm(step))
        place = place + step * min(1.0, FAR * length / max(size, 1e-300))
        if size < LEAST / 10 * length:
            break
    return np.asarray(place)


def _least_squares(columns: Reals, wanted: Reals) -> list[float]:
    return [float(number) for number in np.linalg.lstsq(columns, wanted, rcond=None)[0]]


def _seen(train: Any, name: str, frames: Callable[[Any], Reals], place: Reals) -> Reals:
    return frames(train.with_changes(_changes(name, place)))


def _length(train: Any) -> float:
    """Size of the beam [m], about."""
    waists = [getattr(train.elements[name], "waist", None) for name in train.sources]
    known = [float(waist) for waist in waists if isinstance(waist, int | float) and math.isfinite(waist)]
    return known[0] if known else 1e-3


def _changes(name: str, place: Reals) -> dict[str, float]:
    return {f"{name}.centre_x": float(place[0]), f"{name}.centre_y": float(place[1])}


def _told(length: float) -> str:
    return f"{length * 1e6:+.3g} um"
