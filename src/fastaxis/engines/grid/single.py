"""Travel by a single transform: the far side of a chirped field."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from fastaxis.engines.grid.filled import filled
from fastaxis.engines.grid.light import GridLight, Samples, curve, multiply_separable
from fastaxis.engines.grid.transforms import forward
from fastaxis.engines.grid.waves import Waves
from fastaxis.laws import TravelLaw

__all__ = ["travel_single"]

KEPT = 2048  # samples along a side up to which the waves are kept: beyond, memory counts for more than time


def travel_single(light: GridLight, travel: TravelLaw, *, measured: bool = False) -> GridLight:
    """After an ABCD section with B not 0, on samples of pitch wavelength |B| / (n pitch).

    The Collins integral as it stands, with A' = A + B K for samples * exp(i k K r^2/2):

        u2(r) = (-i/(wavelength B)) exp(i k (D/B) r^2/2) F[u1 exp(i k (A'/B) r^2/2)](r/(wavelength B)).

    Samples of both planes are symmetric about the axis, half a pitch off it: with c = (n - 1)/2 the kernel
    exp(-2 pi i (j - c)(m - c)/n) is a plain transform between two factors exp(2 pi i c j/n).

    Near and far plane are each other's spectrum: with ``measured``, how far the light reaches out here tells how much
    of the band it fills there, and the waves are kept for whoever reads between the samples.
    """
    count, pitch, wavelength, b = light.count, light.pitch, light.wavelength, travel.b
    middle = (count - 1) / 2
    # Counted in whole turns over n so that the phase of a far sample is not rounded.
    turns = np.mod(middle * np.arange(count), count) / count
    shift = np.exp(2j * np.pi * turns)
    chirp = curve(light.x, (travel.a + b * light.curvature) / b, wavelength)
    scale = -1j * pitch**2 / (wavelength * b)
    samples = light.samples
    wide = filled(samples, np.arange(count) - middle) if measured else None
    waves = _kept(samples, min(wide, count), chirp, scale, mirrored=b < 0) if wide and count <= KEPT else None
    multiply_separable(samples, chirp * shift)
    out = forward(samples)
    corner = np.exp(-2j * np.pi * np.mod(middle * middle, count) / count)
    factor = shift * corner
    multiply_separable(out, factor, scale * factor)
    if b < 0:
        out = np.ascontiguousarray(out[:, ::-1, ::-1])
    pitch = wavelength * abs(b) / (count * pitch)
    return replace(light, samples=out, pitch=pitch, curvature=travel.d / b, filled=wide, waves=waves)


def _kept(samples: Samples, wide: int, chirp: Samples, scale: complex, *, mirrored: bool) -> Waves:
    """The middle of a chirped field as waves of its far side."""
    count = samples.shape[-1]
    first = (count - wide) // 2
    middle = slice(first, first + wide)
    amplitudes = samples[:, middle, middle].copy()
    multiply_separable(amplitudes, chirp[middle], scale * chirp[middle])
    return Waves(amplitudes, first, count, mirrored)
