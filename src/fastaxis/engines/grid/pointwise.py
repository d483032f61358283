"""Laws that act in one plane, sample by sample."""

from __future__ import annotations

from dataclasses import replace
from functools import partial
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.grid.light import GridLight, Steep, inner, multiply_separable
from fastaxis.engines.grid.settling import leaves, noted, patterned, settled, watched
from fastaxis.engines.grid.singular import Turns
from fastaxis.engines.grid.workers import strips
from fastaxis.laws import AxisLaw, Flip, ScalarLaw, Stop
from fastaxis.maths import NUMBERS, Pattern
from fastaxis.plan import JonesStep
from fastaxis.plan.merge import split_lens
from fastaxis.plan.spread import closed
from fastaxis.recycled import scratch

__all__ = ["flipped", "passes_one_state", "past_axis", "past_matrix", "past_scalar"]

Reals = NDArray[np.float64]

# A matrix whose determinant is this small against its square norm passes one state only (1e-15: its rounding).
RANK_ONE = 1e-15


def past_matrix(light: GridLight, law: JonesStep) -> GridLight:
    """After a uniform Jones matrix. One that passes a single state leaves one scalar field to carry."""
    matrix = np.array(law.matrix, dtype=complex)
    if light.jones is not None:
        return replace(light, jones=matrix @ light.jones)
    if passes_one_state(law):
        left, strengths, right = np.linalg.svd(matrix)
        samples = np.empty_like(light.samples[:1])
        _mix(samples, light.samples, right[:1])
        one = replace(light, samples=samples, jones=left[:, 0] * strengths[0], steep=light.steep_past(right[:1]))
        return noted(one, {0: right[:1]})
    _mix(light.samples, light.samples, matrix)
    return noted(replace(light, steep=light.steep_past(matrix)), {0: matrix})


def passes_one_state(law: JonesStep) -> bool:
    """Whether a matrix leaves one scalar field, whatever comes to it."""
    strengths = np.linalg.svd(np.array(law.matrix, dtype=complex), compute_uv=False)
    return bool(strengths[1] <= RANK_ONE * strengths[0])


def _mix(out: NDArray[Any], samples: NDArray[Any], matrix: NDArray[np.complex128]) -> None:
    """Components of ``out`` as sums of those of ``samples``, which may be the same array."""
    matrix = matrix.astype(samples.dtype)

    def mix(strip: slice) -> None:
        ex, ey = samples[:, strip]
        for place, part in enumerate([a * ex + b * ey for a, b in matrix]):
            out[place, strip] = part

    strips(mix, *samples.shape[-2:])


def _places(light: GridLight, centre: tuple[float, float]) -> tuple[Reals, Reals]:
    return light.x[None, :] - centre[0], light.x[:, None] - centre[1]


def _turns(x: Reals, y: Reals, times: float) -> NDArray[np.complex128]:
    """exp(i times phi); for whole numbers a power of (x + iy)/r, which takes no angle of any place."""
    if times != int(times):
        return np.asarray(np.exp(1j * times * np.arctan2(y, x)))
    radius = np.sqrt(x * x + y * y)
    axis = radius == 0
    radius[axis] = 1
    ray = np.empty(radius.shape, dtype=complex)
    # Real lines over real radii: the modulus and the quotient of complex numbers take several times as long.
    np.divide(x, radius, out=ray.real)
    np.divide(y, radius, out=ray.imag)
    ray.real[axis] = 1  # on the axis itself phi counts as 0
    power = _power(ray, int(abs(times)))
    return power if times > 0 else power.conj()


def _power(ray: NDArray[np.complex128], times: int) -> NDArray[np.complex128]:
    if times <= 1:
        return ray if times else np.ones_like(ray)
    half = _power(ray, times // 2)
    square = half * half
    return square * ray if times % 2 else square


def past_axis(light: GridLight, law: AxisLaw, after: JonesStep | None = None) -> GridLight:
    """After a patterned plate or polarizer; from here on (Ex, Ey) differ from place to place.

    Parameters
    ----------
    after : a uniform matrix that follows, done in the same go.
    """
    cells = patterned(law)
    light = settled(light) if cells else watched(light, law.centre, int(2 * law.order))
    samples, steep = light.samples, _steep_past(light, law)
    if light.jones is not None:
        samples = scratch((2, *samples.shape[1:]), samples.dtype)
    if cells:
        _past_pattern(samples, light, law)
        light = replace(light, samples=samples, jones=None, filled=None, steep=steep)
        return past_matrix(light, after) if after else light
    turns = _past_turning(samples, light, law, np.eye(2) if after is None else np.array(after.matrix))
    light = replace(light, samples=samples, jones=None, filled=None, steep=steep)
    return noted(replace(light, steep=light.steep_past(np.array(after.matrix))) if after else light, turns)


def _steep_past(light: GridLight, law: AxisLaw) -> tuple[Steep, ...]:
    """Light beyond the band behind a plate, met where phi = 0: it has gone to all sides, and that loses no power."""
    if not light.steep:
        return ()
    place = np.zeros((1, 1))
    matrix = np.array([[np.ravel(one)[0] for one in row] for row in law.linear(NUMBERS, place, place, place)])
    return light.steep_past(matrix if light.jones is None else (matrix @ light.jones)[:, np.newaxis])


def _past_pattern(out: NDArray[Any], light: GridLight, law: AxisLaw) -> None:
    """A pattern may be any function of all places, so it is asked for the whole plane at once."""
    x, y = np.broadcast_arrays(*_places(light, law.centre))
    phi = np.arctan2(y, x) if law.order else 0.0
    rows = law.linear(NUMBERS, phi, x, y)
    if light.jones is None:
        ex, ey = light.samples
        out[0], out[1] = [a * ex + b * ey for a, b in rows]
        return
    jx, jy = light.jones
    for place, (a, b) in zip(out, rows, strict=True):
        np.multiply(a * jx + b * jy, light.samples[0], out=place, casting="same_kind")


def _past_turning(out: NDArray[Any], light: GridLight, law: AxisLaw, later: NDArray[Any]) -> Turns:
    """An axis at q phi + angle: its matrix is M0 + M1 cos + M2 sin of twice that, asked for at three angles only."""
    level, cosine, sine = (np.array(law.with_axis(NUMBERS, c, s), dtype=complex) for c, s in ((0, 0), (1, 0), (0, 1)))
    parts = [later @ level, later @ (cosine - level), later @ (sine - level)]
    if light.jones is not None:
        parts = [part @ light.jones for part in parts]
    whole, parts = parts, [part.astype(out.dtype) for part in parts]
    (x, y), start = _places(light, law.centre), NUMBERS.phasor(2 * law.angle)
    kind = out.real.dtype

    def turn(strip: slice) -> None:
        twice = start * _turns(x, y[strip], 2 * law.order)
        near = light.samples[:, strip], twice.real.astype(kind), twice.imag.astype(kind)
        (_turned if light.jones is None else _spread)(out[:, strip], parts, *near)

    strips(turn, light.count, light.count)
    level, cosine, sine = (part.reshape(2, -1) for part in whole)
    turns = {0: level}
    for hand in (1, -1):
        charge = hand * int(2 * law.order)
        turns[charge] = turns.get(charge, 0) + (cosine - hand * 1j * sine) * start**hand / 2
    return turns


def _spread(out: NDArray[Any], parts: list[NDArray[Any]], before: NDArray[Any], cosine: Reals, sine: Reals) -> None:
    """One scalar field times a Jones vector that changes from place to place."""
    for k, (level, of_cosine, of_sine) in enumerate(zip(*parts, strict=True)):
        np.multiply(cosine, of_cosine, out=out[k])
        out[k] += sine * of_sine
        out[k] += level
        out[k] *= before[0]


def _turned(out: NDArray[Any], parts: list[NDArray[Any]], before: NDArray[Any], cosine: Reals, sine: Reals) -> None:
    """Two components, possibly in place, times a matrix that changes from place to place."""
    ex, ey = before
    made = []
    for i in (0, 1):
        a, b = (parts[0][i, j] + parts[1][i, j] * cosine + parts[2][i, j] * sine for j in (0, 1))
        a *= ex
        b *= ey
        a += b
        made.append(a)
    out[0], out[1] = made


def past_scalar(light: GridLight, law: ScalarLaw) -> GridLight:
    """After a mask, wedge, spiral plate, stop or lens. A centred lens only changes the curvature kept apart.

    Where an edge crosses a sample its coverage c scales the field, so that the field is right to second order in the
    pitch. The power c^2 |E|^2 such samples keep is less than the c |E|^2 that passes: the rest goes to steep angles
    beyond their band and is counted apart.
    """
    if law.vergence:
        rest, _ = split_lens(law, light.wavelength)
        light = past_scalar(light, rest)
        return replace(light, curvature=light.curvature - law.vergence)
    if leaves(light, law):
        light = settled(light)
    x, y = _places(light, law.centre)
    if any(isinstance(v, Pattern) for v in law.transmission.values):
        light = _multiply(light, law.transmission.value(NUMBERS, *np.broadcast_arrays(x, y)))
    elif law.transmission.values != (1.0, 0.0):
        light = _multiply(light, law.transmission.value(NUMBERS))
    if law.tilt != (0.0, 0.0):
        across, down = (
            np.exp(2j * np.pi / light.wavelength * tilt * place.ravel())
            for place, tilt in zip((x, y), law.tilt, strict=True)
        )
        multiply_separable(light.samples, across, down)
    if law.stop is not None:
        lost = sum(strips(partial(_stopped, light, law.stop, (x, y)), light.count, light.count))
        light = replace(
            light, periodic=False, beyond=_beyond(light, law.stop, lost), steep=() if closed(law.stop) else light.steep
        )
    return replace(_spiralled(light, law, (x, y)) if law.charge else light, filled=None)


def _spiralled(light: GridLight, law: ScalarLaw, places: tuple[Reals, Reals]) -> GridLight:
    """Behind a spiral plate, in place. One of a broken charge is cut along a line, and singular all along it."""
    charge, whole = int(law.charge), law.charge == int(law.charge)
    light = watched(light, law.centre, charge) if whole else settled(light)
    (x, y), samples = places, light.samples

    def turn(strip: slice) -> None:
        samples[:, strip] *= _turns(x, y[strip], law.charge).astype(samples.dtype, copy=False)

    strips(turn, light.count, light.count)
    return noted(light, {charge: np.eye(len(samples), dtype=complex)}) if whole else light


def _multiply(light: GridLight, factor: Any) -> GridLight:
    np.multiply(light.samples, factor, out=light.samples, casting="same_kind")
    size = np.sqrt(np.mean(abs(np.asarray(factor)) ** 2))  # of light gone to all sides
    return replace(light, steep=light.steep_past(size * np.eye(len(light.samples)))) if light.steep else light


def _stopped(light: GridLight, stop: Stop, places: tuple[Reals, Reals], strip: slice) -> float:
    """Some rows behind a stop, in place; squares that pass it and that the samples do not keep."""
    samples, x, y = light.samples[:, strip], places[0], places[1][strip]
    coverage = _coverage(stop.depth(x, y), light.pitch)
    rim = (coverage > 0) & (coverage < 1)
    part, field = coverage[rim], samples[:, rim].astype(np.complex128, copy=False)
    samples *= coverage.astype(samples.real.dtype, copy=False)
    return float(np.sum(part * (1 - part) * (field.real**2 + field.imag**2)))


def _beyond(light: GridLight, stop: Stop | None, lost: float) -> float:
    """Light beyond the band behind a stop; what came scattered this far does not find a closed opening."""
    before = 0.0 if stop is not None and closed(stop) else light.beyond
    kept = inner(light.samples, light.samples).real if lost else 0.0
    return before + (lost / kept if kept else 0.0)


def _coverage(depth: Any, pitch: float) -> Reals:
    """Share of each sample's square inside the clear area, to first order in the edge's distance from its centre.

    Cut to whole samples the edge is a stair whose area is wrong by a random half sample per step; the share keeps
    the area right and the field converges faster.
    """
    return np.asarray(np.clip(depth / pitch + 0.5, 0.0, 1.0))


def flipped(light: GridLight, law: Flip) -> GridLight:
    """Places reversed along x or y: the order of columns or rows, exactly."""
    if law.axis == "x":
        return light.moved(lambda samples: samples[:, :, ::-1], lambda place: -place.conjugate())
    return light.moved(lambda samples: samples[:, ::-1], lambda place: place.conjugate())
