"""Distances so short that the whole integral would take a million nodes."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal.collins import Collins
from fastaxis.engines.azimuthal.nearby import Nearby, suits
from fastaxis.engines.azimuthal.resolving import Settings, extended
from fastaxis.laws import TravelLaw
from fastaxis.units import mm, nm

WAVELENGTH = 632.8 * nm
K = 2 * np.pi / WAVELENGTH
W = 0.5 * mm
RAYLEIGH = K * W**2 / 2


@pytest.fixture(scope="module")
def bell():
    peak = np.sqrt(2 / np.pi) / W
    return extended(lambda r: peak * np.exp(-((r / W) ** 2))[np.newaxis], np.linspace(0, 4 * W, 4), Settings())[0]


# The reference takes radii and distances as the engine does, so only the engine's roundings count: some hundred.
@pytest.mark.parametrize("l", [0, 1, -2, 5])
@pytest.mark.parametrize("share", [5e-2, 1e-2, -1e-3, 1e-4, 1e-6])
def test_spiral_gaussian_close_to_its_plate(bell, vortex, share, l):
    section = Collins(bell, (l,), K, TravelLaw.free(share * RAYLEIGH), before=0.0, behind=0.0)
    assert suits(section)
    near = Nearby(section)
    radii = np.concatenate([np.array([0.02, 0.2, 0.6, 0.999]) * near.inner, np.linspace(1.001 * near.inner, 5 * W, 9)])
    exact = vortex(l, W, 1.0, section.flat.b, 1.0, radii)
    # The phase k r^2/2z of the wave from the axis is rounded to eps of it, and that wave is down by (sqrt(z/k)/r)^2.
    assert abs(near(radii) - exact).max() < 3e-12 * abs(exact).max()


@pytest.mark.parametrize("magnification", [-1.7, 0.6])
def test_close_to_an_image(bell, vortex, magnification):
    b = 2e-3 * RAYLEIGH
    section = TravelLaw(magnification, b, 0.5, (1 + 0.5 * b) / magnification)
    near = Nearby(Collins(bell, (1,), K, section, before=0.0, behind=0.5 / magnification))
    radii = np.array([0.01, 0.3, 0.9, 2.2]) * W
    exact = vortex(1, W, section.a, section.b, section.d, radii)
    field = near(radii)[0] * np.exp(1j * K * 0.25 / magnification * radii**2)
    # The front of 0.5/m is rounded here, at phases of some ten radians.
    assert abs(field - exact).max() < 1e-12 * abs(exact).max()


def test_a_cut_field_keeps_its_soft_end(bell):
    from fastaxis.engines.azimuthal.taper import Taper

    section = Collins(bell, (0,), K, TravelLaw.free(1e-4 * RAYLEIGH), before=0.0, behind=0.0, taper=Taper(1 * W, 2 * W))
    radii = np.array([0.5, 1.5, 2.5]) * W
    # So close that the picture is the object, to the curvature of the end times sqrt(z/k)^2.
    assert abs(abs(Nearby(section)(radii)) - bell(radii).real * section.taper(radii)).max() < 5e-3 * bell.peak


def test_not_for_rims_focus_or_fine_fields(bell):
    def section(profile, travel):
        return Collins(profile, (0,), K, travel, before=0.0, behind=0.0)

    short = TravelLaw.free(1e-3 * RAYLEIGH)
    assert suits(section(bell, short))
    assert not suits(section(bell.clipped(0, W), short))
    assert not suits(section(bell.clipped(0.1 * W, bell.end), short))
    assert not suits(section(bell, TravelLaw(0.0, 0.3, -1 / 0.3, 1.0)))
    assert not suits(section(bell, TravelLaw.free(RAYLEIGH)))
