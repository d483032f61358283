"""The brightest pixel of a camera against what its pixels hold."""

from __future__ import annotations

import math
import warnings
from collections.abc import Iterator
from typing import Any

import numpy as np

from fastaxis.camera import Exposure, expose, no_analyzer
from fastaxis.camera.photons import electrons_of, fills_well_after
from fastaxis.elements.camera import Camera
from fastaxis.elements.sensor import Sensor
from fastaxis.errors import FastaxisError
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.words import many, percent, seconds

__all__ = ["peaks", "saturation"]

AIM = 0.8  # of what saturates a pixel: room for a laser that drifts
DIM = 0.03  # of it: a hundred levels of a 12-bit camera
SHORTEST = 1e-5  # [s]; shorter exposures are beyond many shutters, and a filter does better


def saturation(bench: Bench) -> Iterator[Finding]:
    """Cameras declared with a sensor: saturated behind some analyzer, hardly used, or without an exposure time."""
    for name in dict.fromkeys(visit.name for visit in bench.of_kind(Camera)):
        camera = bench.train.elements[name]
        shots = None if camera.sensor is None else _shots(bench.train, name)
        if shots is not None:
            yield from _told(shots, camera.sensor, camera.exposure_time)


def peaks(shots: Exposure) -> tuple[float, float]:
    """Power [W] of the brightest pixel behind the analyzer that suits it best, and without an analyzer.

    Behind the state it is polarized in, a pixel has (S0 + |S|)/2.
    """
    s0, polarized = shots.stokes[0], np.sqrt((shots.stokes[1:] ** 2).sum(axis=0))
    return float((s0 + polarized).max()) / 2, float(s0.max())


def _shots(train: Any, name: str) -> Exposure | None:
    """A picture, where one can be worked out; why not is told by the check of sampling."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        try:
            return expose(train, name, no_analyzer(), precision="single")  # the peak to 1e-6
        except FastaxisError:
            return None


def _told(shots: Exposure, sensor: Sensor, time: float | None) -> Iterator[Finding]:
    brightest, bare = peaks(shots)
    after = fills_well_after(brightest, sensor, shots.wavelength)
    if math.isinf(after):
        return  # light that misses the sensor altogether is told by the check of its size
    if time is None:
        yield _finding(
            shots, Severity.NOTE, "saturation", "a camera declared with its exposure_time is checked for it",
            got=f"full after {seconds(after)}", fix=_time(shots, AIM * after),
        )  # fmt: skip
        return
    fill = time / after
    if fill > 1:
        yield _finding(
            shots, Severity.HIGH, "saturation",
            f"its pixels hold {sensor.most_electrons:.0f} electrons: expose for less, or put a neutral density of "
            f"{_density(fill):g} before it",
            got=f"{_electrons(brightest, shots, sensor, time)} electrons in the brightest pixel after {seconds(time)}, "
            f"{many(fill)} times as many as it holds", fix=_dimmer(shots, time, fill),
        )  # fmt: skip
    elif (bare_fill := time / fills_well_after(bare, sensor, shots.wavelength)) > 1:
        yield _finding(
            shots, Severity.LOW, "saturation", "an analyzer takes part of the light: a frame without one is brighter",
            got=f"in {seconds(time)} without an analyzer the brightest pixel gets {many(bare_fill)} times its fill",
            fix=_dimmer(shots, time, bare_fill),
        )  # fmt: skip
    elif fill < DIM:
        yield _finding(
            shots, Severity.LOW, "few counts",
            "signal to noise grows with the root of the light: faint frames are grainy",
            got=f"{_electrons(brightest, shots, sensor, time)} electrons in the brightest pixel after {seconds(time)}, "
            f"{percent(fill)} of what it holds", fix=_time(shots, time * AIM / fill),
        )  # fmt: skip


def _finding(shots: Exposure, severity: Severity, check: str, rule: str, *, got: str, fix: str) -> Finding:
    got = f"{shots.target}: {got}"
    return Finding(severity=severity, check=check, element=shots.target, rule=rule, got=got, fix=fix)


def _electrons(power: float, shots: Exposure, sensor: Sensor, time: float) -> str:
    return many(float(electrons_of(power, sensor, wavelength=shots.wavelength, exposure_time=time)))


def _time(shots: Exposure, time: float) -> str:
    return f'train.with_changes({{"{shots.target}.exposure_time": {time:.2g}}})'


def _dimmer(shots: Exposure, time: float, fill: float) -> str:
    shorter = time * AIM / fill
    dimmed = f"fa.NeutralDensity(density={_density(fill):g}) before {shots.target}"
    return dimmed if shorter < SHORTEST else _time(shots, shorter)


def _density(fill: float) -> float:
    """Of the filter that leaves room; filters come in tenths."""
    return math.ceil(10 * math.log10(fill / AIM)) / 10
