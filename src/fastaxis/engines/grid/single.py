"""Travel by a single transform: the far side of a chirped field."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from fastaxis.engines.grid.light import GridLight, curve, multiply_separable
from fastaxis.engines.grid.transforms import forward
from fastaxis.laws import TravelLaw

__all__ = ["travel_single"]


def travel_single(light: GridLight, travel: TravelLaw) -> GridLight:
    """After an ABCD section with B not 0, on samples of pitch wavelength |B| / (n pitch).

    The Collins integral as it stands, with A' = A + B K for samples * exp(i k K r^2/2):

        u2(r) = (-i/(wavelength B)) exp(i k (D/B) r^2/2) F[u1 exp(i k (A'/B) r^2/2)](r/(wavelength B)).

    Samples of both planes are symmetric about the axis, half a pitch off it: with c = (n - 1)/2 the kernel
    exp(-2 pi i (j - c)(m - c)/n) is a plain transform between two factors exp(2 pi i c j/n).
    """
    count, pitch, wavelength, b = light.count, light.pitch, light.wavelength, travel.b
    middle = (count - 1) / 2
    # Counted in whole turns over n so that the phase of a far sample is not rounded.
    turns = np.mod(middle * np.arange(count), count) / count
    shift = np.exp(2j * np.pi * turns)
    chirp = curve(light.x, (travel.a + b * light.curvature) / b, wavelength) * shift
    samples = light.samples
    multiply_separable(samples, chirp)
    out = forward(samples)
    corner = np.exp(-2j * np.pi * np.mod(middle * middle, count) / count)
    factor = shift * corner
    out *= (-1j * pitch**2 / (wavelength * b)) * factor[:, None]
    out *= factor[None, :]
    if b < 0:
        out = np.ascontiguousarray(out[:, ::-1, ::-1])
    return replace(light, samples=out, pitch=wavelength * abs(b) / (count * pitch), curvature=travel.d / b)
