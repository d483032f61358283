"""The light of many draws, and the figures of merit read off it: as sums, or propagated anew for each draw."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.exposing import recorded, sensor_at
from fastaxis.camera.mixing import mixed
from fastaxis.camera.mounting import Mounting
from fastaxis.engines import propagate
from fastaxis.engines.combining import combined, combines
from fastaxis.engines.sharing import Relay
from fastaxis.plan import make_plan
from fastaxis.studies.spanning import spanning, squares
from fastaxis.studies.tolerance.chain import Chain, make_chain, muellers
from fastaxis.studies.tolerance.merits import PictureMerit, StokesMerit

__all__ = ["Anew", "Merit", "Summed", "Work", "light_at", "prepared"]

Reals: TypeAlias = NDArray[np.float64]
Merit: TypeAlias = Any  # StokesMerit, PictureMerit, or a function of a train

BLOCK = 32 << 20  # bytes of frames made in one product


@dataclass(frozen=True, eq=False)
class Summed:
    """Draws whose light is a sum of a few pictures.

    Parameters
    ----------
    merit : what is read.
    images : (4, chosen, pixels), in front of the last uniform parts.
    shares : (draws * steps, chosen).
    last : (draws * steps, 4, 4) Mueller matrices of the last uniform parts.
    shape, x, y : of a picture, and its axes [m].
    """

    merit: StokesMerit | PictureMerit
    images: Reals = field(repr=False)
    shares: Reals = field(repr=False)
    last: Reals = field(repr=False)
    shape: tuple[int, ...] = ()
    x: Any = None
    y: Any = None

    @property
    def steps(self) -> int:
        """Rows that belong to one draw."""
        return len(self.merit.steps) if isinstance(self.merit, StokesMerit) else 1

    def part(self, start: int, stop: int) -> Summed:
        """Some of the draws."""
        rows = slice(start * self.steps, stop * self.steps)
        return Summed(self.merit, self.images, self.shares[rows], self.last[rows], self.shape, self.x, self.y)

    def stokes(self) -> Reals:
        """Powers of all light (draws, steps, 4) [W]."""
        before = np.einsum("vc,kcp->vk", self.shares, self.images)
        return np.asarray(np.einsum("vij,vj->vi", self.last, before)).reshape(-1, self.steps, 4)

    def values(self) -> Reals:
        """The figure of merit of each draw."""
        if isinstance(self.merit, StokesMerit):
            return self.merit.values(self.stokes())
        weights = np.einsum("i,vij->vj", self.merit.weights, self.last)
        mixture = np.einsum("vk,vc->vkc", weights, self.shares).reshape(len(self.shares), -1)
        flat = self.images.reshape(mixture.shape[1], -1)
        block = max(1, BLOCK // (8 * flat.shape[1]))
        out = []
        for start in range(0, len(mixture), block):
            frames = mixed(mixture[start : start + block], flat)
            out += [self.merit.value(frame.reshape(self.shape), self.x, self.y) for frame in frames]
        return np.array(out)


@dataclass(frozen=True, eq=False)
class Anew:
    """Draws whose light is propagated one by one.

    Parameters
    ----------
    merit : what is read.
    train : as declared.
    changes : the values of each draw.
    options : grid and engine.
    """

    merit: Merit
    train: Any
    changes: tuple[dict[str, float], ...] = field(repr=False)
    options: dict[str, Any] = field(default_factory=dict)

    def part(self, start: int, stop: int) -> Anew:
        """Some of the draws."""
        return Anew(self.merit, self.train, self.changes[start:stop], self.options)

    def values(self) -> Reals:
        """The figure of merit of each draw."""
        return np.array([self._value(self.train.with_changes(change), change) for change in self.changes])

    def _value(self, train: Any, change: dict[str, float]) -> float:
        merit = self.merit
        if isinstance(merit, StokesMerit):
            turned = [_turned(train, merit.knob, change, step) for step in merit.steps]
            stokes = np.array([light_at(one, merit, self.options)[0].sum(axis=(1, 2)) for one in turned])
            return float(merit.values(stokes))
        if isinstance(merit, PictureMerit):
            stokes, x, y = light_at(train, merit, self.options)
            return merit.value(np.tensordot(merit.weights, stokes, axes=1), x, y)
        return float(merit(train))


Work: TypeAlias = Summed | Anew


def _turned(train: Any, knob: str, change: dict[str, float], step: float) -> Any:
    if not knob:
        return train
    part, _, parameter = knob.partition(".")
    declared = change.get(knob, train.elements[part].parameters()[parameter])
    return train.with_changes({knob: declared + step})


def light_at(train: Any, merit: StokesMerit | PictureMerit, options: dict[str, Any]) -> tuple[Reals, Any, Any]:
    """Stokes images at the target of a figure of merit, columns and rows; one pixel where all light is taken."""
    plan = make_plan(train, merit.target, power_only=isinstance(merit, StokesMerit), **options)
    return _seen(train, merit, propagate(plan))


def _seen(train: Any, merit: StokesMerit | PictureMerit, light: Any) -> tuple[Reals, Any, Any]:
    if isinstance(merit, PictureMerit):
        sensor = sensor_at(train, merit.target)
        stokes, x, y = recorded(light, sensor)
        if merit.reading == "correlation":
            return stokes, x, y  # beside a frame of the same camera
        mounting = Mounting(getattr(sensor, "orientation", "upright"))
        return mounting.undone(stokes), *mounting.undone_axes(x, y)
    return np.asarray(sum(part.total_stokes for part in light))[:, None, None], None, None


def prepared(train: Any, causes: Any, offsets: Reals, merit: Merit, options: dict[str, Any]) -> Work:
    """The work of reading one figure of merit at many rows of offsets; what it takes in propagations is done here."""
    if isinstance(merit, StokesMerit | PictureMerit):
        names, values = _rows(train, causes, offsets, merit)
        chain = make_chain(train, merit.target, names, values)
        if chain is not None:
            return _summed(train, merit, (names, values), chain, options)
    changes = tuple(causes.changes(row) for row in offsets)
    return Anew(merit, train.copy(), changes, options)


def _rows(train: Any, causes: Any, offsets: Reals, merit: StokesMerit | PictureMerit) -> tuple[tuple[str, ...], Reals]:
    """Parameters and their values, a row for each step of each draw."""
    names, nominal = causes.names, list(causes.nominal.values())
    steps = np.array(merit.steps if isinstance(merit, StokesMerit) else (0.0,))
    knob = merit.knob if isinstance(merit, StokesMerit) else ""
    if knob and knob not in names:
        part, _, parameter = knob.partition(".")
        names, nominal = (*names, knob), [*nominal, float(train.elements[part].parameters()[parameter])]
        offsets = np.hstack([offsets, np.zeros((len(offsets), 1))])
    values = np.repeat(offsets + np.array(nominal), len(steps), axis=0)
    if knob:
        values[:, names.index(knob)] += np.tile(steps, len(offsets))
    return names, values


def _summed(
    train: Any, merit: StokesMerit | PictureMerit, rows: tuple[tuple[str, ...], Reals], chain: Chain, options: Any
) -> Summed:
    names, values = rows
    bare = chain.stripped(train)
    kept = [k for k, name in enumerate(names) if name.partition(".")[0] not in chain.removed]
    fields = spanning(chain.fields)
    pictures = spanning(squares(fields.coefficients))

    def at(row: int) -> Any:
        return bare.with_changes({names[k]: float(values[row, k]) for k in kept})

    seen = _pictures(at, merit, fields, pictures, options)
    images = np.stack([stokes for stokes, _, _ in seen], axis=1)
    last = np.broadcast_to(muellers(chain.last), (len(values), 4, 4))
    flat = images.reshape(*images.shape[:2], -1)
    return Summed(merit, flat, pictures.coefficients, last, images.shape[2:], seen[0][1], seen[0][2])


def _pictures(at: Any, merit: Any, fields: Any, pictures: Any, options: Any) -> Sequence[tuple[Reals, Any, Any]]:
    whole = isinstance(merit, StokesMerit)
    first = make_plan(at(int(fields.nodes[0])), merit.target, power_only=whole, **options)
    totals = whole or not hasattr(sensor_at(at(int(fields.nodes[0])), merit.target), "pixel")
    summed = combines(first.engine, totals=totals)
    trains = [at(int(row)) for row in (fields if summed else pictures).nodes]
    plans = [make_plan(each, merit.target, power_only=whole, **options) for each in trains]
    lights = list(Relay().propagate(plans))
    if not summed:
        return [_seen(each, merit, light) for each, light in zip(trains, lights, strict=True)]
    rows = [fields.coefficients[row] for row in pictures.nodes]
    return [_seen(trains[0], merit, combined(first.engine, lights, row)) for row in rows]
