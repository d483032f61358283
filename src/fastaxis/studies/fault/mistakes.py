"""Every single mistake that benches usually have, made on a train."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, field, replace
from itertools import pairwise
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements import (
    Camera,
    DovePrism,
    FaradayRotator,
    HalfWavePlate,
    KMirror,
    Laser,
    Mirror,
    Polarizer,
    QPlate,
    Retarder,
    Rotator,
    SpiralPlate,
)
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import FastaxisError
from fastaxis.laws import Law
from fastaxis.light import State
from fastaxis.maths import is_symbolic

__all__ = ["Mistake", "met", "mistakes"]

AXES = ("fast", "slow", "axis", "offset", "roll", "angle")
STEP = 0.1  # [deg] between the values of a knob that are tried; mounts are read to about that
# Plates that lie in the same drawer: those sold, and what they are from behind.
DRAWER_Q = (0.5, 1.0, 1.5, 2.0, -0.5, -1.0, -1.5, -2.0)
DRAWER_CHARGES = (1, 2, 3, 4, -1, -2, -3, -4)
QUARTER, HALF = math.pi / 2, math.pi
LIKE = math.radians(20)  # a retardance nearer than that to a half or a quarter wave is meant as one
ORDERED = (Retarder, QPlate, SpiralPlate, Polarizer, Rotator, FaradayRotator, DovePrism, KMirror)
LEFT_OUT = ("HalfWavePlate", "QuarterWavePlate", "Polarizer", "QPlate", "Rotator", "FaradayRotator", "SpiralPlate")


@dataclass(frozen=True, kw_only=True)
class LeftOut(ThroughElement):
    """A part that is not there."""

    def laws(self, wavelength: Any) -> tuple[Law, ...]:
        return ()


@dataclass(frozen=True, eq=False)
class Mistake:
    """A train with one mistake, or with a knob at values that would each be one.

    Parameters
    ----------
    words : what is wrong.
    train : with the mistake.
    knob : parameter to try values of; "" if there is nothing to fit.
    nominal : value of the knob as declared.
    values : of the knob.
    """

    words: str
    train: Any = field(repr=False)
    knob: str = ""
    nominal: float = 0.0
    values: NDArray[np.float64] = field(default_factory=lambda: np.zeros(0), repr=False)

    def at(self, value: float) -> tuple[str, Any]:
        """Words and train with the knob at a value."""
        # Steps of a tenth of a degree added up leave roundings that nobody reads; + 0.0 turns -0 into 0.
        off, told = (round(math.degrees(angle), 6) + 0.0 for angle in (value - self.nominal, value))
        words = self.words.format(value=f"{told:.4g} deg", off=f"{off:+.4g} deg")
        return words, self.train.with_changes({self.knob: value})


def mistakes(train: Any, target: str) -> Iterator[Mistake]:
    """All of them, first those with nothing to fit.

    Parameters
    ----------
    train : as declared.
    target : camera, detector or port that is looked at; only parts that its light meets are tried.
    """
    names = met(train, target)
    for name in names:
        yield from _of_part(train, name)
    yield from _out_of_order(train, names)
    yield from _extra(train, target)
    for name in names:
        yield from _knobs(train, name)


def met(train: Any, target: str) -> list[str]:
    """Parts on the way to a target, in order."""
    legs = [leg.element_name for route in train.routes(target) for leg in route.legs]
    sources = [route.source_name for route in train.routes(target)]
    return list(dict.fromkeys([*sources, *legs, target.partition(".")[0]]))


def _number(value: Any) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool) and not is_symbolic(value)


def _of_part(train: Any, name: str) -> Iterator[Mistake]:
    part = train.elements[name]
    for words, values in (*_of_axes(part), *_of_charge(part), *_of_retardance(part), *_of_ends(part)):
        try:
            yield Mistake(f"{name}: {words}", train.with_changes({f"{name}.{k}": v for k, v in values.items()}))
        except FastaxisError:
            continue  # not a bench that could be built, so not the mistake
    if type(part).__name__ in LEFT_OUT:
        yield Mistake(f"{name}: left out", _replaced(train, name, LeftOut(name=name)))


def _of_axes(part: Any) -> Iterator[tuple[str, dict[str, Any]]]:
    given = part.parameters()
    if isinstance(part, Retarder | QPlate):
        axis = next(k for k in ("fast", "slow", "offset") if given.get(k) is not None)
        if _number(given[axis]):
            yield "fast and slow axis swapped", {axis: given[axis] + math.pi / 2}
    for axis in AXES:
        # An axis along x or y stands where it stood when its sign is turned.
        if _number(given.get(axis)) and given[axis] % math.pi:
            yield f"sign of {axis}", {axis: -given[axis]}


def _of_charge(part: Any) -> Iterator[tuple[str, dict[str, Any]]]:
    """The sign, and the other plates of the drawer."""
    if isinstance(part, QPlate) and _number(part.q):
        yield "sign of q (the plate stands back to front)", {"q": -part.q}
        for q in DRAWER_Q:
            if abs(q) != abs(part.q):
                yield f"another plate, of q = {q:g}", {"q": q}
    if isinstance(part, SpiralPlate) and _number(part.charge):
        yield "sign of the charge (the plate stands back to front)", {"charge": -part.charge}
        for charge in DRAWER_CHARGES:
            if abs(charge) != abs(part.charge):
                yield f"another plate, of charge {charge:+d}", {"charge": charge}


def _of_retardance(part: Any) -> Iterator[tuple[str, dict[str, Any]]]:
    """A half-wave plate in place of a quarter-wave plate, and the other way round."""
    given: Any = part.parameters().get("retardance")
    if not isinstance(part, Retarder | QPlate) or not _number(given):
        return
    for meant, taken, words in ((QUARTER, HALF, "half"), (HALF, QUARTER, "quarter")):
        if abs(given - meant) < LIKE:
            yield f"a {words}-wave plate in its place", {"retardance": taken}


def _out_of_order(train: Any, names: list[str]) -> Iterator[Mistake]:
    """Neighbouring parts in each other's place, whatever travel lies between them."""
    parts = [name for name in names if isinstance(train.elements[name], ORDERED)]
    for first, second in pairwise(parts):
        one, other = train.elements[first], train.elements[second]
        if _renamed(one, "") == _renamed(other, ""):
            continue
        copy = train.copy()
        copy.elements = {**copy.elements, first: _renamed(other, first), second: _renamed(one, second)}
        yield Mistake(f"{first} and {second} in each other's place", copy)


def _renamed(part: Any, name: str) -> Any:
    return replace(part, name=name)


def _of_ends(part: Any) -> Iterator[tuple[str, dict[str, Any]]]:
    if isinstance(part, Laser) and isinstance(part.state, State | None):
        yield from _of_source(part.state or State(0.0))
    if isinstance(part, Camera):
        other = "mirrored" if part.orientation == "upright" else "upright"
        yield f"picture {other}", {"orientation": other}


def _of_source(state: State) -> Iterator[tuple[str, dict[str, Any]]]:
    azimuth, ellipticity = state.azimuth, state.ellipticity
    if not _number(azimuth) or not _number(ellipticity):
        return
    if ellipticity:
        yield "handedness of its light", {"state": State(azimuth, -ellipticity)}
    if abs(ellipticity) < math.pi / 4:
        yield "long axis of its light turned by 90 deg", {"state": State(azimuth + math.pi / 2, ellipticity)}
        if azimuth % (math.pi / 2):
            yield "sign of the azimuth of its light", {"state": State(-azimuth, ellipticity)}


def _replaced(train: Any, name: str, part: Any) -> Any:
    copy = train.copy()
    copy.elements = {**copy.elements, name: part}
    return copy


def _extra(train: Any, target: str) -> Iterator[Mistake]:
    """A mirror, or a half-wave plate, that is not in the drawing, right in front of the target."""
    entering = [joint for joint in train.joints if joint[1].partition(".")[0] == target.partition(".")[0]]
    ends = target.partition(".")[0] in {*train.cameras} or not train.elements[target.partition(".")[0]].exit
    if len(entering) != 1 or not ends:
        return
    yield Mistake(
        "one mirror more or fewer in front of the target", _inserted(train, entering[0], Mirror(name="extra"))
    )
    plate = HalfWavePlate(fast=0.0, name="extra")
    grid = np.radians(np.arange(-90 + STEP, 90 + STEP / 2, STEP))
    words = "a half-wave plate left in front of the target, fast axis at {value}"
    yield Mistake(words, _inserted(train, entering[0], plate), "extra.fast", 0.0, grid)


def _inserted(train: Any, joint: tuple[str, str], part: Any) -> Any:
    copy = train.copy()
    copy.joints = tuple(one for one in copy.joints if one != joint)
    into, out = f"{part.name}.front", f"{part.name}.front" if isinstance(part, Mirror) else f"{part.name}.back"
    return copy.add(part).join(joint[0], into).join(out, joint[1])


def _knobs(train: Any, name: str) -> Iterator[Mistake]:
    part = train.elements[name]
    given = part.parameters()
    for parameter in (*AXES, "retardance"):
        if not _number(given.get(parameter)):
            continue
        declared = float(given[parameter])
        if parameter == "retardance":
            values = np.radians(np.arange(0, 360, 2 * STEP))
            words = f"{name}.retardance is {{value}}, {{off}} off"
        else:
            values = declared + np.radians(np.arange(-90 + STEP, 90 + STEP / 2, STEP))
            words = f"{name}.{parameter} stands at {{value}}, {{off}} off"
        yield Mistake(words, train, f"{name}.{parameter}", declared, values)
