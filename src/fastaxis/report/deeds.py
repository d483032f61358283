"""What a passage does to light, in words: to H, D and R, on turning the part, and to the power."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from math import pi
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.conventions import View
from fastaxis.laws import (
    Annulus,
    AxisLaw,
    CircularLaw,
    Disc,
    Flip,
    HalfPlane,
    Passage,
    Rectangle,
    ScalarLaw,
    Strip,
    TravelLaw,
    Turn,
)
from fastaxis.light import D, H, L, R, State
from fastaxis.maths import NUMBERS, Pattern, free_symbols, is_symbolic
from fastaxis.report.echo import degrees, length, percent, waves
from fastaxis.report.matrices import Letters, matrix_lines
from fastaxis.report.states_text import named

__all__ = ["deeds"]

LONGEST = 90  # characters; what is longer is read off the matrix more easily
LEAK = 1e-2  # below this the light behind a polarizer follows its axis to better than 6 deg
EXACT = 1e-9  # shares and angles below this are roundings of what was declared


def deeds(passage: Passage, view: View) -> Iterator[tuple[str, str]]:
    """Pairs (what, how) for a passage, in the order of its laws."""
    for law in passage.laws:
        yield from _OF_LAW[type(law)](law, view)
    if passage.reflected:
        yield from _flip(Flip(passage.reflected), view)


def _axis(law: AxisLaw, view: View) -> Iterator[tuple[str, str]]:
    if isinstance(law.angle, Pattern) or not (law.along.uniform and law.across.uniform):
        yield "matrix", "differs from place to place: that of a plate at each place's own axis and retardance"
        return
    yield "matrix", "\n".join(matrix_lines(law))
    if law.order != 0:
        yield from _turning_axis(law, view)
        return
    yield from _three_states(law, view)
    if not free_symbols((*law.along.values, *law.across.values)):
        yield from _turning(law)
        yield "power", _powers(replace(law, angle=0.0))


def _circular(law: CircularLaw, view: View) -> Iterator[tuple[str, str]]:
    yield "matrix", "\n".join(matrix_lines(law))
    yield from _three_states(law, view)
    angle = law.right.phase
    yield "turning", f"turns any linear light by {degrees(angle)} counter-clockwise, whatever its azimuth"
    yield (
        "way back",
        "turns back what it turned" if law.reciprocal else f"turns on: {degrees(2 * angle)} after a mirror",
    )
    if not free_symbols(law.values):
        yield "power", _powers(law)


def _three_states(law: AxisLaw | CircularLaw, view: View) -> Iterator[tuple[str, str]]:
    hand = R if view is View.RECEIVER else L
    for name, state in (("H", H), ("D", D), ("R", hand)):
        if not free_symbols(law.values):
            yield name, f"-> {named(_matrix(law) @ state.jones, view)}"
        elif isinstance(law, AxisLaw) and not free_symbols((*law.along.values, *law.across.values)) and _half_wave(law):
            # The hand changes, and linear light goes to the mirror image in the axis.
            yield name, "-> L" if name == "R" else f"-> linear at {Letters().exact(2 * law.angle - state.azimuth)}"
        elif isinstance(law, AxisLaw) and law.across.power == 0:
            yield name, f"-> linear at {law.angle}, {_malus(law, state)} of the power"
        elif isinstance(law, CircularLaw) and law.left.power == law.right.power == 1:
            yield name, f"-> {name if name == 'R' else f'linear at {Letters().exact(state.azimuth + law.right.phase)}'}"
        elif len(out := _vector(law, state)) <= LONGEST:
            yield name, f"-> {out}"


def _vector(law: AxisLaw | CircularLaw, state: State) -> str:
    """The Jones vector behind a law with letters."""
    letters = Letters()
    ex, ey = state.linear(letters)
    return f"({', '.join(str(letters.short(a * ex + b * ey)) for a, b in law.linear(letters))})"


def _malus(law: AxisLaw, state: State) -> str:
    """Share of the power that an ideal polarizer with a letter for its axis passes."""
    letters = Letters()
    shape = letters.half if state.ellipticity else letters.cos(law.angle - state.azimuth) ** 2
    return str(letters.number(law.along.power) * shape)


def _matrix(law: AxisLaw | CircularLaw) -> NDArray[Any]:
    return np.array(law.linear(NUMBERS), dtype=complex)


def _half_wave(law: AxisLaw) -> bool:
    along, across = law.along.number(), law.across.number()
    return abs(along + across) < EXACT * abs(along)


def _turning(law: AxisLaw) -> Iterator[tuple[str, str]]:
    """What turning the part by a degree does to linear light."""
    along, across = abs(law.along.number()), abs(law.across.number())
    if _half_wave(law):
        yield "turning", "linear light at a leaves at 2 fast - a: it turns 2 deg per deg of the plate"
    elif across**2 < LEAK * along**2:
        yield "turning", "the passed light turns with the axis, 1 deg per deg"
    elif abs(along - across) < EXACT and abs(law.along.number() - law.across.number()) > EXACT:
        yield "turning", "linear light along or across the axis stays as it is"


def _powers(law: AxisLaw | CircularLaw) -> str:
    """Largest and smallest share of power that passes, over all states."""
    largest, smallest = (float(value) ** 2 for value in np.linalg.svd(_matrix(law), compute_uv=False))
    if smallest > 1 - EXACT:
        return "all of it, in any state"
    if largest - smallest < EXACT:
        return f"{percent(largest)} in any state"
    smallest = smallest if smallest > EXACT**2 else 0.0  # the root of a rounding, squared
    mean = (largest + smallest) / 2
    return f"{percent(smallest)} to {percent(largest)}, by the state; {percent(mean)} of unpolarized light"


def _turning_axis(law: AxisLaw, view: View) -> Iterator[tuple[str, str]]:
    """A q-plate: local azimuth of linear light, charge of circular light, unconverted share."""
    q, offset = law.order, law.angle
    twice = 2 * q
    left, right = view.circular_name(1), view.circular_name(-1)
    converted = ""
    if not free_symbols((*law.along.values, *law.across.values)):
        a, b = (abs(value) ** 2 for value in law.mean_and_difference(NUMBERS))
        if a > EXACT * (a + b):
            yield "unconverted", f"{percent(a / (a + b))} of what passes keeps its state and charge; of the rest:"
        converted = f"{percent(a + b)} in any state"
    for name, azimuth in (("H", 0.0), ("D", pi / 4)):
        yield name, f"-> linear at {_local(twice, 2 * offset - azimuth)}"
    for name, other, sign in ((left, right, "+"), (right, left, "-")):
        yield name, f"-> {other}, charge l -> l {sign} {_plain(twice)}".replace("+ -", "- ").replace("- -", "+ ")
    if not is_symbolic(q):
        lobes = 4 * abs(float(q))
        yield (
            "analyzer",
            f"linear light shows {lobes:g} lobes, which turn {1 / float(twice):+.3g} deg per deg of the analyzer",
        )
    yield "turning", "offset turns the local azimuth by 2 deg per deg"
    if converted:
        yield "power", converted


def _plain(value: Any) -> str:
    return str(value) if is_symbolic(value) else f"{value:g}"


def _local(turns: Any, shift: Any) -> str:
    """Local azimuth turns*phi + shift, with the name of the pattern where it has one."""
    if is_symbolic(turns) or is_symbolic(shift):
        letters = Letters()
        return str(letters.exact(turns * letters.sympy.Symbol("phi") + shift))
    turned = round((shift * 180 / pi + 90 - 1e-9) % 180 - 90 + 1e-9, 6) + 0.0
    factor = {1.0: "", -1.0: "-"}.get(float(turns), f"{turns:g} ")
    angle = f"{factor}phi" + (f" {'-' if turned < 0 else '+'} {abs(turned):g} deg" if turned else "")
    names = {0.0: "radial", 90.0: "azimuthal"}
    return angle + (f" ({names.get(turned, 'spiral')})" if turns == 1 else "")


def _scalar(law: ScalarLaw, _view: View) -> Iterator[tuple[str, str]]:
    yield "state", "H -> H, D -> D, R -> R: any polarization is kept"
    transmission = law.transmission
    if not transmission.uniform:
        yield "amplitude", "differs from place to place"
    elif is_symbolic(transmission.phase) or abs(transmission.phase) > 0:
        yield "phase", f"{waves(transmission.phase)} later, the whole beam"
    if law.charge != 0:
        yield "charge", f"exp({_plain(law.charge)}i phi): l -> l + {_plain(law.charge)}".replace("+ -", "- ")
    if law.vergence != 0:
        effect = "" if is_symbolic(law.vergence) else (": converges" if law.vergence > 0 else ": diverges")
        yield "curvature", f"exp(-i k r^2/2f) with f = {length(1 / law.vergence)}{effect}"
    if law.tilt != (0.0, 0.0):
        yield "direction", f"turned by {_tilt_text(law.tilt)}"
    if law.stop is not None:
        yield "clear area", _stop_text(law)
    if transmission.uniform:
        lost = "" if law.stop is None else "; what falls beside the clear area is absorbed"
        yield "power", f"{percent(transmission.power)} in any state{lost}"


def _tilt_text(tilt: tuple[Any, Any]) -> str:
    return " and ".join(
        f"{value} towards {axis}" if is_symbolic(value) else f"{value * 1e3:g} mrad towards {axis}"
        for value, axis in zip(tilt, ("+x", "+y"), strict=True)
        if value != 0
    )


def _stop_text(law: ScalarLaw) -> str:
    stop = law.stop
    if isinstance(stop, Disc):
        return f"{'outside' if stop.opaque else 'inside'} a circle of {length(2 * stop.radius)} diameter"
    if isinstance(stop, Annulus):
        return f"between circles of {length(2 * stop.inner)} and {length(2 * stop.outer)} diameter"
    if isinstance(stop, Rectangle):
        return f"inside {length(stop.width)} (x) by {length(stop.height)} (y)"
    if isinstance(stop, Strip):
        return f"a slit of {length(stop.width)}, long side at {degrees(stop.angle)}"
    if isinstance(stop, HalfPlane):
        return f"from the centre in the direction {degrees(stop.angle)}"
    return type(stop).__name__


def _travel(law: TravelLaw, _view: View) -> Iterator[tuple[str, str]]:
    yield "state", "H -> H, D -> D, R -> R: any polarization is kept"
    yield "rays", f"height + {length(law.b)} x angle; angle kept"
    yield "path", f"{length(law.path)} of optical path"
    yield "power", "all of it, in any state"


def _flip(law: Flip, _view: View) -> Iterator[tuple[str, str]]:
    fold, other = ("x -> -x", "left and right") if law.axis == "x" else ("y -> -y", "up and down")
    yield "picture", f"flipped {fold}: {other} change places, charge l becomes -l"


def _turn(law: Turn, _view: View) -> Iterator[tuple[str, str]]:
    angle = degrees(law.angle)
    yield "", f"then turned by {angle} counter-clockwise, which puts exp(-i l {angle}) on charge l"


_OF_LAW: dict[type, Any] = {
    AxisLaw: _axis, CircularLaw: _circular, ScalarLaw: _scalar, TravelLaw: _travel,
    Flip: _flip, Turn: _turn,
}  # fmt: skip
