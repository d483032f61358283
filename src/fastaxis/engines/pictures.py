"""Pictures of earlier questions: light that differs by uniform parts alone is not followed nor read again.

A uniform part turns the Stokes parameters of every pixel by one Mueller matrix. So pictures are kept as they are
without the uniform parts behind the last patterned one, from the second time on that they are asked for.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, fields, replace
from functools import reduce
from importlib import import_module
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines import arrived
from fastaxis.engines.content import content_of
from fastaxis.engines.field import Guard
from fastaxis.engines.kept_picture import Kept, Picture, even
from fastaxis.engines.memory import LIGHT
from fastaxis.engines.remembering import size_of
from fastaxis.errors import FastaxisWarning, SamplingError, caution, cautions_held
from fastaxis.light import Raster
from fastaxis.plan import Branch, JonesStep, Plan
from fastaxis.plan.last_plates import without_last_plates

__all__ = ["Picture", "remembered"]

Images = NDArray[Any]
Complexes = NDArray[np.complex128]

SHAPED = {"grid", "handover", "azimuthal", "modes"}
"""Engines that work a picture out; the others know it at once."""

SAID = {"steps", "group", "path", "opening", "power", "engine"}
"""Of a branch: what is looked at apart, scales the light, or is only said about it."""

MET, UNFIT = "met", "unfit"  # asked for once; not to be kept
MARK = 256  # bytes that a key and a mark take


def remembered(plan: Plan, raster: Raster, *, alone: bool = True) -> tuple[Picture, ...] | None:
    """Pictures of the light at the target of a plan, one for each coherent part; None if it has to be followed.

    Parameters
    ----------
    plan : whose light is looked at.
    raster : pixels of the sensor.
    alone : whether no other plan is asked together with it, whose steps it might share.

    Warns
    -----
    SamplingWarning : what following the light would warn of.
    """
    groups = [_Group.of(plan.engine, group, raster) for group in plan.groups]
    # To look whether pictures fit is cheaper than to say what they depend on.
    if 4 * 8 * math.prod(raster.shape) > LIGHT.largest or not all(group.worth(alone=alone) for group in groups):
        return None
    kept = _kept_of(groups)
    pictures = [one.behind(group.late, group.power) for one, group in zip(kept, groups, strict=False) if one]
    found = tuple(picture for picture in pictures if picture)
    if len(found) < len(groups):
        return None
    for warning in (warning for one in kept if one for warning in one.told):
        caution(type(warning)(warning.rule, got=warning.got, fix=warning.fix))
    return found


def _kept_of(groups: Sequence[_Group]) -> list[Kept | None]:
    """What is kept of some light, or is from now on; an empty list if not all of it has been asked for before."""
    keys = [key for group in groups if (key := group.key)]
    known = [LIGHT.get(key) for key in keys]
    for key, found in zip(keys, known, strict=True):
        if found is None:
            LIGHT.put(key, MET, MARK)
    if len(keys) < len(groups) or None in known or UNFIT in known:
        return []
    work = zip(groups, keys, known, strict=True)
    return [group.kept(key) if found is MET else found for group, key, found in work]


@dataclass(frozen=True, eq=False)
class _Group:
    """Branches whose fields add up, without their last uniform parts.

    Parameters
    ----------
    engine : of the plan.
    branches : one alone, or arms that are left as they are.
    late : what the last uniform parts do together.
    raster : the pixels that look at it.
    """

    engine: str
    branches: tuple[Branch, ...]
    late: JonesStep
    raster: Raster

    @classmethod
    def of(cls, engine: str, branches: Sequence[Branch], raster: Raster) -> _Group:
        if len(branches) > 1:
            return cls(engine, tuple(branches), JonesStep(), raster)
        bare, late = without_last_plates(branches[0])
        return cls(engine, (bare,), late, raster)

    @property
    def engines(self) -> list[str]:
        return [branch.engine or self.engine for branch in self.branches]

    @property
    def power(self) -> float:
        """Of the light at its source [W]."""
        return self.branches[0].power

    def worth(self, *, alone: bool) -> bool:
        """Whether following this light takes longer than remembering it, and pictures tell all of it."""
        if not set(self.engines) & SHAPED:
            return False
        # The azimuthal engine does not know the state of what is left outside of the circle it looks at.
        if self.engines == ["azimuthal"] and not even(np.array(self.late.matrix)):
            return False
        return alone or all(size_of(branch) <= LIGHT.largest for branch in self.branches)

    @property
    def key(self) -> bytes | None:
        """What the picture depends on; None if that is not all data."""
        values: list[Any] = [self.raster, self.engines]
        for branch in self.branches:
            values += [getattr(branch, field.name) for field in fields(branch) if field.name not in SAID]
            values += [step.law for step in branch.steps]
        return content_of("picture", *values)

    def kept(self, key: bytes) -> Kept | None:
        """The picture, kept for the next time; None if the light without its last parts can't be followed."""
        with cautions_held() as told:
            try:
                found = arrived(self.engine, self.branches)
                images = reduce(np.add, (field.stokes_on(self.raster) for field in found))
            except SamplingError:
                LIGHT.put(key, UNFIT, MARK)
                return None
        kept = _kept(found, images, self.branches, told)
        kept.images.flags.writeable = False
        LIGHT.put(key, kept, kept.images.nbytes + MARK)
        return kept


def _kept(found: Sequence[Any], images: Images, branches: Sequence[Branch], told: list[FastaxisWarning]) -> Kept:
    field, branch = found[0], branches[0]
    guard, joined = field.guard, len(branches) > 1
    light = None if joined else getattr(field, "carried", None)
    kept = Kept(images, None, branch.power, None if joined else field.power, None, False, guard, 0.0, tuple(told))
    if light is None:
        return kept
    if light.jones is not None and light.jones.any():
        length = float(np.linalg.norm(light.jones))
        return replace(kept, images=images[:1].copy(), jones=light.jones / length)
    strain = _strain(guard, light.band_power, branch.sampling)
    scattered = light.beyond != 0
    return replace(kept, totals=field.total_stokes, scattered=scattered, strain=strain)


def _strain(guard: Guard, band_power: float, sampling: Any) -> float:
    edge, band = import_module("fastaxis.engines.grid.guard").limits(sampling)
    return float(max(guard.edge_power / edge, guard.discarded / edge, band_power / band))
