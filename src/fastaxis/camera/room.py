"""Whether the pictures asked for fit into this computer."""

from __future__ import annotations

import os
from collections.abc import Iterable
from math import isqrt

from fastaxis.errors import ParameterError

__all__ = ["check_frames", "check_room", "memory"]

IMAGES = 8  # of 8 bytes a pixel: four Stokes images, and as much again while they are collected and oriented


def memory() -> int | None:
    """Bytes of memory in this computer; None where the system doesn't tell."""
    try:
        return os.sysconf("SC_PAGE_SIZE") * os.sysconf("SC_PHYS_PAGES")
    except (AttributeError, OSError, ValueError):
        return None


def check_room(name: str, shapes: Iterable[tuple[int, int]]) -> None:
    """Refuse sensors whose pictures don't fit, before any light is sent.

    Parameters
    ----------
    name : of the sensors, for the message.
    shapes : (ny, nx) of each.

    Raises
    ------
    ParameterError : they need more memory than there is.
    """
    there, needed = memory(), 8 * IMAGES * sum(ny * nx for ny, nx in shapes)
    if there is not None and needed > there:
        side = min(4096, isqrt(there // (16 * 8 * IMAGES)))
        raise ParameterError(
            "the pictures of a sensor fit into the memory there is",
            got=f"{name}: about {needed / 1e9:.3g} GB for its pictures, {there / 1e9:.3g} GB there",
            fix=f"shape=({side}, {side})",
        )


def check_frames(name: str, count: int, shape: tuple[int, int], *, size: int, fix: str) -> None:
    """Refuse to hold more frames at a time than fit.

    Parameters
    ----------
    name : of the camera, for the message.
    count : of frames.
    shape : (ny, nx) of each.
    size : bytes a pixel.
    fix : what to do instead.

    Raises
    ------
    ParameterError : they need more memory than there is.
    """
    there, needed = memory(), count * size * shape[0] * shape[1]
    if there is not None and needed > there:
        raise ParameterError(
            "frames held at one time fit into the memory there is",
            got=f"{name}: {count} frames of {needed / 1e9:.3g} GB in all, {there / 1e9:.3g} GB there",
            fix=fix,
        )
