"""Travel by a scaled angular spectrum: a stretch of free space, magnified."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from fastaxis.engines.grid.band import band_limit, cut_band
from fastaxis.engines.grid.filled import filled
from fastaxis.engines.grid.guard import rim_share
from fastaxis.engines.grid.light import GridLight, multiply_separable
from fastaxis.engines.grid.transforms import forward, inverse
from fastaxis.laws import TravelLaw

__all__ = ["travel_scaled"]


def travel_scaled(light: GridLight, travel: TravelLaw, *, measured: bool = False) -> GridLight:
    """After an ABCD section, on samples as many as before, their pitch magnified.

    The field is samples * exp(i k K r^2/2), so the samples go through A' = A + B K, C' = C + D K. Completing the
    square of the Collins integral gives, with z = B/A',

        u2(r) = (1/A') exp(i k (C'/A') r^2/2) free_z[u1](r/A'),

    where free_z multiplies the spectrum by exp(-i pi wavelength z f^2). A' < 0 reverses both axes, and 1/A' then
    holds the half turn of phase through the focus. B = 0 needs no transform. With ``measured`` the light knows how much
    of the band it fills. S. A. Collins, J. Opt. Soc. Am. 60,
    1168 (1970).
    """
    near, far = travel.a + travel.b * light.curvature, travel.c + travel.d * light.curvature
    distance = travel.b / near
    samples, cut, waves, band = light.samples, 0.0, None, 0.0
    if distance != 0:
        spectrum = forward(samples)
        band = 0.0 if light.periodic else rim_share(spectrum, spectrum=True)
        frequency = np.asarray(np.fft.fftfreq(light.count, light.pitch), dtype=float)
        if not light.periodic:
            limit = band_limit(light.window, abs(distance), light.wavelength)
            cut = cut_band(spectrum, frequency, limit)
        waves = filled(spectrum, frequency * light.window) if measured else None
        factor = np.exp(-1j * np.pi * light.wavelength * distance * frequency**2)
        multiply_separable(spectrum, factor, factor / near)
        samples = inverse(spectrum)
    elif near != 1:
        samples *= 1 / near
    if near < 0:
        samples = np.ascontiguousarray(samples[:, ::-1, ::-1])
    pitch, curvature = light.pitch * abs(near), far / near
    light = replace(light, samples=samples, pitch=pitch, curvature=curvature, filled=waves)
    return light.met(band=band, cut=cut)
