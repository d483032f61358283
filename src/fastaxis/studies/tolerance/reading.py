"""Which light figures of merit are read off: those of one light are read together."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import recorded, sensor_at
from fastaxis.camera.mounting import Mounting
from fastaxis.engines import propagate
from fastaxis.plan import make_plan
from fastaxis.studies.tolerance.merits import Merit, PictureMerit, StokesMerit

__all__ = ["Reading", "light_at", "readings", "seen"]

Reals: TypeAlias = NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Reading:
    """Figures of merit that one light, or one picture, is enough for.

    Parameters
    ----------
    kind : "powers" of all light at a port; "picture" in the beam's frame; "frame" as the camera is mounted; or "train".
    merits : what is read.
    columns : their places among all figures of merit.
    """

    kind: str
    merits: tuple[Merit, ...]
    columns: tuple[int, ...]

    @property
    def target(self) -> str:
        """Port, camera or detector."""
        return str(self.merits[0].target)

    @property
    def knob(self) -> str:
        """Parameter turned for each look; "" for none."""
        return str(self.merits[0].knob) if self.kind == "powers" else ""

    @property
    def steps(self) -> tuple[float, ...]:
        """Angles added to it."""
        return _steps(self.merits[0])

    def only(self, kept: Sequence[bool]) -> Reading:
        """Some of the figures of merit."""
        some = [place for place, keep in enumerate(kept) if keep]
        merits, columns = (tuple(all_of[place] for place in some) for all_of in (self.merits, self.columns))
        return replace(self, merits=merits, columns=columns)


def readings(merits: Sequence[Merit]) -> list[Reading]:
    """Figures of merit sorted by the light they are read off."""
    found: dict[Any, list[int]] = {}
    for column, merit in enumerate(merits):
        kind = _kind(merit)
        light = column if kind == "train" else (merit.target, getattr(merit, "knob", ""), _steps(merit))
        found.setdefault((kind, light), []).append(column)
    return [
        Reading(kind, tuple(merits[column] for column in columns), tuple(columns))
        for (kind, _), columns in found.items()
    ]


def _kind(merit: Merit) -> str:
    if isinstance(merit, StokesMerit):
        return "powers"
    if isinstance(merit, PictureMerit):
        return "frame" if merit.reading == "correlation" else "picture"  # beside a frame of the same camera
    return "train"


def _steps(merit: Merit) -> tuple[float, ...]:
    return getattr(merit, "steps", (0.0,))


def light_at(train: Any, target: str, kind: str, options: dict[str, Any]) -> tuple[Reals, Any, Any]:
    """Stokes images at a target, columns and rows; one pixel where all light is taken."""
    plan = make_plan(train, target, power_only=kind == "powers", **options)
    return seen(train, target, kind, propagate(plan))


def seen(train: Any, target: str, kind: str, light: Any) -> tuple[Reals, Any, Any]:
    """What of the light at a target is read."""
    if kind == "powers":
        return np.asarray(sum(part.total_stokes for part in light))[:, None, None], None, None
    sensor = sensor_at(train, target)
    stokes, x, y = recorded(light, sensor)
    if kind == "frame":
        return stokes, x, y
    mounting = Mounting(getattr(sensor, "orientation", "upright"))
    return mounting.undone(stokes), *mounting.undone_axes(x, y)
