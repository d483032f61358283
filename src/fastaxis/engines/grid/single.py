"""Travel by a single transform: the far side of a chirped field."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from fastaxis.engines.grid.filled import filled
from fastaxis.engines.grid.light import GridLight, Samples, curve, multiply_separable
from fastaxis.engines.grid.transforms import forward
from fastaxis.laws import TravelLaw

__all__ = ["far_pitch", "near_chirp", "scale", "travel_single"]


def far_pitch(light: GridLight, travel: TravelLaw) -> float:
    """Pitch [m] of the samples behind the travel: wavelength |B| / (n pitch)."""
    return float(light.wavelength * abs(travel.b) / light.window)


def near_chirp(light: GridLight, travel: TravelLaw) -> Samples:
    """exp(i k (A'/B) x^2/2) along a side, with A' = A + B K."""
    return curve(light.x, (travel.a + travel.b * light.curvature) / travel.b, light.wavelength)


def scale(light: GridLight, travel: TravelLaw) -> complex:
    """-i pitch^2/(wavelength B): of a sum over the samples, for the integral of Collins."""
    return complex(-1j * light.pitch**2 / (light.wavelength * travel.b))


def travel_single(light: GridLight, travel: TravelLaw, *, measured: bool = False) -> GridLight:
    """After an ABCD section with B not 0, on samples of pitch wavelength |B| / (n pitch).

    The Collins integral as it stands, with A' = A + B K for samples * exp(i k K r^2/2):

        u2(r) = (-i/(wavelength B)) exp(i k (D/B) r^2/2) F[u1 exp(i k (A'/B) r^2/2)](r/(wavelength B)).

    Samples of both planes are symmetric about the axis, half a pitch off it: with c = (n - 1)/2 the kernel
    exp(-2 pi i (j - c)(m - c)/n) is a plain transform between two factors exp(2 pi i c j/n).

    Near and far plane are each other's spectrum: with ``measured``, how far the light reaches out here tells how much
    of the band it fills there.
    """
    count = light.count
    middle = (count - 1) / 2
    # Counted in whole turns over n so that the phase of a far sample is not rounded.
    turns = np.mod(middle * np.arange(count), count) / count
    shift = np.exp(2j * np.pi * turns)
    samples = light.samples
    wide = filled(samples, np.arange(count) - middle) if measured else None
    multiply_separable(samples, near_chirp(light, travel) * shift)
    out = forward(samples)
    corner = np.exp(-2j * np.pi * np.mod(middle * middle, count) / count)
    factor = shift * corner
    multiply_separable(out, factor, scale(light, travel) * factor)
    if travel.b < 0:
        out = np.ascontiguousarray(out[:, ::-1, ::-1])
    return replace(
        light,
        samples=out,
        pitch=far_pitch(light, travel),
        curvature=travel.d / travel.b,
        filled=wide,
        turned=not light.turned,
    )
