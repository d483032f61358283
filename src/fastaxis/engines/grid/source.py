"""The light of a source on samples."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import replace
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.ndimage import binary_dilation
from scipy.special import erf, gammainccinv

from fastaxis.engines.grid.filled import EMPTY
from fastaxis.engines.grid.light import GridLight, Samples, axis, curve, inner, multiply_separable
from fastaxis.engines.grid.workers import strips
from fastaxis.light import SampledMode
from fastaxis.light.modes.family import GaussFamily
from fastaxis.plan import Branch
from fastaxis.plan.sampling import Sampling
from fastaxis.recycled import scratch

__all__ = ["start"]

SUB = 16  # places per axis in a sample that the edge of a hard-edged mode crosses
FADE = 0.125  # width of a plane wave's fading, as a share of the window


def start(branch: Branch, sampling: Sampling) -> GridLight:
    """The field where samples begin, with the power of the branch; one scalar field if all terms share a state.

    A sample that a hard edge crosses holds c of the amplitude and c^2 of the power. Light keeps its amplitude, which is
    right in a focus to second order; what the samples lack in power the edge has scattered beyond them.
    """
    room, pitch = sampling.planes[0].samples, sampling.planes[0].pitch
    dark = max(math.floor(room / 2 - _reach(branch) / pitch), 0) if branch.opening else 0
    x = axis(room - 2 * dark, pitch)
    terms, scale = branch.beam.terms, branch.beam.scale(branch.wavelength) * np.sqrt(branch.power)
    curvature = sampling.planes[0].kept
    kind = np.dtype(np.complex64 if sampling.precision == "single" else np.complex128)
    shapes = (_shape(term.mode, x, pitch, branch.wavelength, kind) for term in terms)
    numbers = [scale * term.number for term in terms]
    if branch.beam.state is not None:
        samples, jones = _sum(shapes, [np.array([number]) for number in numbers]), branch.beam.state.jones
    else:
        samples, jones = _sum(shapes, [number * t.state.jones for number, t in zip(numbers, terms, strict=True)]), None
    if curvature:
        multiply_separable(samples, curve(x, -curvature, branch.wavelength))
    infinite = any(term.mode.infinite for term in terms)
    if sampling.taper:
        multiply_separable(samples, _fading(x, sampling.grid.window))
    periodic = infinite and not sampling.taper
    light = GridLight(samples, jones, pitch, curvature, branch.wavelength, periodic=periodic, room=room)
    hard = any(term.mode.hard for term in terms) and not infinite
    return replace(light, beyond=branch.power / light.power - 1) if hard and light.power else light


def _reach(branch: Branch) -> float:
    """Radius [m] beyond which the modes of a beam hold no more than rounding of their power.

    With t = 2 r^2/w^2 the irradiance of a mode of degree N is exp(-t) times a polynomial, at most t^N 2^N/N! far out:
    what is beyond is below 2^N Q(N + 1, t), the incomplete gamma function.
    """
    rounding = EMPTY[np.dtype(np.complex128)]
    modes = [term.mode for term in branch.beam.terms if isinstance(term.mode, GaussFamily)]
    return max(
        mode.width(branch.wavelength) * math.sqrt(gammainccinv(mode.degree + 1, rounding / 2**mode.degree) / 2)
        for mode in modes
    )


def _sum(shapes: Iterable[Samples], vectors: Sequence[NDArray[np.complex128]]) -> Samples:
    """The sum of shapes times vectors, (components, n, n), one shape at a time."""
    total: Samples | None = None
    for shape, vector in zip(shapes, vectors, strict=True):
        if total is not None:
            for part, number in zip(total, vector, strict=True):
                np.add(part, number * shape, out=part)
        elif vector.size == 1:
            total = np.multiply(shape, vector[0], out=shape)[None]
        else:
            total = vector.astype(shape.dtype)[:, None, None] * shape
    assert total is not None
    return total


def _shape(mode: Any, x: NDArray[np.float64], pitch: float, wavelength: float, kind: np.dtype[Any]) -> Samples:
    shape: Samples = scratch((x.size, x.size), kind)

    def fill(strip: slice) -> None:
        shape[strip] = mode.amplitude(x[None, :], x[strip, None], wavelength)

    strips(fill, *shape.shape)
    if mode.hard:
        _soften(shape, mode, x, pitch, wavelength)
    if isinstance(mode, SampledMode):
        # What splines between foreign samples leave of unit power is the sampling's doing, not the beam's.
        shape /= np.sqrt(inner(shape[None], shape[None]).real * pitch**2)
    return shape


def _soften(shape: Samples, mode: Any, x: NDArray[np.float64], pitch: float, wavelength: float) -> None:
    """A hard edge averaged over each sample it crosses; cut to whole samples its area would be wrong by chance."""
    lit = shape != 0
    rows, columns = np.nonzero(binary_dilation(lit) & binary_dilation(~lit))
    shifts = axis(SUB, pitch / SUB)
    parts = (mode.amplitude(x[columns] + dx, x[rows] + dy, wavelength) for dx in shifts for dy in shifts)
    shape[rows, columns] = sum(parts) / SUB**2


def _fading(x: NDArray[np.float64], window: float) -> NDArray[np.float64]:
    """1 in the middle, falling smoothly to 0 at the edge: no edge of its own that would diffract.

    Error functions of width FADE/4.7 window: 1e-10 of their way is left at either end.
    """
    width = FADE * window / 4.7
    return (1 - erf((abs(x) - (0.5 - FADE) * window) / width)) / 2
