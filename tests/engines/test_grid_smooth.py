"""Smooth beams on the grid against closed forms: Gauss, Laguerre and Hermite modes, anywhere."""

import numpy as np
import pytest

from fastaxis.elements import FreeSpace, Laser, Lens, Wedge
from fastaxis.engines import propagate
from fastaxis.light import Beam, Gaussian, H, HermiteGauss, LaguerreGauss, SampledMode, Term
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import mm, mrad, nm

WAVELENGTH = 632.8 * nm
WAIST = 0.5 * mm
RAYLEIGH = np.pi * WAIST**2 / WAVELENGTH

# The window holds six radii of the beam's second moment, where the field is below its own rounding; what is left is
# the rounding of two transforms (a few eps times sqrt(log2 n^2)) and of modes with polynomials of degree up to 11.
ROUNDING = 2e-13


def error(field, expected, x, y):
    """Largest difference of the complex fields, phase included, over the peak."""
    found = field.at(x, y)[0]
    return np.max(abs(found - expected)) / np.max(abs(expected))


MODES = [
    Gaussian(waist=WAIST),
    Gaussian(waist=WAIST, waist_at=2 * RAYLEIGH),
    Gaussian(waist=WAIST, waist_at=-RAYLEIGH / 2),
    Gaussian(waist=WAIST, centre=(0.7 * mm, -0.3 * mm)),
    LaguerreGauss(0, 1, WAIST),
    LaguerreGauss(2, 3, WAIST),
    LaguerreGauss(3, -5, WAIST),
    HermiteGauss(1, 0, WAIST),
    HermiteGauss(3, 2, WAIST),
]


@pytest.mark.parametrize("ranges", [0.01, 0.1, 1, 10])
@pytest.mark.parametrize("mode", MODES, ids=str)
def test_free_space_of_any_length(arrive, mode, ranges):
    distance = ranges * RAYLEIGH
    field, moved = arrive(mode, FreeSpace(distance)), mode.moved(distance)
    places = np.linspace(-2, 2, 27) * moved.width(WAVELENGTH)
    x, y = places + mode.centre[0], places + mode.centre[1]
    assert error(field, moved.amplitude(x[None], y[:, None], WAVELENGTH), x, y) < ROUNDING
    assert field.power == pytest.approx(1, abs=1e-12)


@pytest.mark.parametrize("distance", [0.05, 0.19493814, 0.2, 0.25, 0.4, 1.0])
def test_through_a_focus_with_its_gouy_phase(arrive, distance):
    """A lens of 200 mm at the waist: the new beam is the Gaussian with 1/q' = 1/q - 1/f, and its phase is absolute."""
    field = arrive(Gaussian(waist=WAIST), Lens(focal=0.2), FreeSpace(distance))
    q = 1 / (1 / (-1j * RAYLEIGH) - 1 / 0.2) + distance
    on_axis = np.sqrt(2 / np.pi) / WAIST * ((q - distance) / q)  # u = u0 q0/q exp(i k r^2/2q)
    width = 1 / np.sqrt(np.pi / WAVELENGTH * np.imag(1 / q))
    x = np.linspace(-2, 2, 27) * width
    expected = on_axis * np.exp(1j * np.pi / WAVELENGTH / q * (x[None] ** 2 + x[:, None] ** 2))
    assert error(field, expected, x, x) < ROUNDING


@pytest.mark.parametrize("mode", [LaguerreGauss(0, 2, 0.2 * mm), HermiteGauss(2, 1, 0.2 * mm)], ids=str)
def test_a_relay_magnifies_inverts_and_turns_by_half_a_wave(arrive, mode):
    """4f relay of 50 and 200 mm: u(x, y) -> -(1/4) u(-x/4, -y/4), with no transform at all."""
    relay = [FreeSpace(0.05), Lens(focal=0.05), FreeSpace(0.25), Lens(focal=0.2), FreeSpace(0.2)]
    x = np.linspace(-2, 2, 21) * 0.8 * mm
    expected = -mode.amplitude(-x[None] / 4, -x[:, None] / 4, WAVELENGTH) / 4
    assert error(arrive(mode, *relay), expected, x, x) < ROUNDING


def test_one_travel_is_two_half_travels(arrive):
    """Thin glass of no power between them stops the plan from merging, so two kernels meet one."""
    from fastaxis.elements import PatternedRetarder

    idle = PatternedRetarder(fast=lambda x, y: 0 * x, retardance=0.0)
    mode = LaguerreGauss(1, 2, WAIST)
    x = np.linspace(-2, 2, 21) * mm
    for near, far in [(0.3, 0.7), (0.01, 8.0)]:
        one = arrive(mode, FreeSpace(near + far)).at(x, x)
        # The idle plate counts as rough, so the window there is chosen by other rules; 384 samples in 20 mm hold it.
        two = arrive(mode, FreeSpace(near), idle, FreeSpace(far)).at(x, x)
        assert np.max(abs(one - two)) / np.max(abs(one)) < 1e-10


def test_a_wedge_turns_the_beam(arrive):
    """Behind a tilt t the beam walks by t z and carries exp(i k (t x - t^2 z/2)): the paraxial Galilean shift."""
    mode, tilt, distance = LaguerreGauss(0, 1, WAIST), 1 * mrad, 0.5
    field = arrive(mode, Wedge(x=tilt), FreeSpace(distance))
    x, y = np.linspace(-1, 1, 21) * mm + tilt * distance, np.linspace(-1, 1, 21) * mm
    k = 2 * np.pi / WAVELENGTH
    shifted = mode.moved(distance).amplitude(x[None] - tilt * distance, y[:, None], WAVELENGTH)
    expected = shifted * np.exp(1j * k * (tilt * x[None] - tilt**2 * distance / 2))
    # The tilt's phase reaches k t x = 15 rad; its rounding is that many times larger than that of the beam.
    assert error(field, expected, x, y) < 5 * ROUNDING


def test_an_off_centre_lens_focuses_behind_its_centre(arrive):
    """At the focus u(x) = (-i/(wavelength f)) exp(i k |x - c|^2/2f) U((x - c)/(wavelength f)) about the centre c."""
    focal, c = 0.3, 0.4 * mm
    mode = Gaussian(waist=WAIST)
    field = arrive(mode, Lens(focal=focal, centre=(c, 0.0)), FreeSpace(focal))
    spot = WAVELENGTH * focal / (np.pi * WAIST)
    x, y = c + np.linspace(-2, 2, 21) * spot, np.linspace(-2, 2, 21) * spot
    r2 = (x[None] - c) ** 2 + y[:, None] ** 2
    # The lens law is exp(-i k |r - c|^2/2f), so with s = r - c the beam's own centre sits at s = -c.
    k = 2 * np.pi / WAVELENGTH
    expected = (-1j * np.sqrt(2 / np.pi) / spot) * np.exp(-r2 / spot**2 + 1j * k / (2 * focal) * r2)
    expected = expected * np.exp(1j * k * c * (x[None] - c) / focal)
    assert error(field, expected, x, y) < 5 * ROUNDING


def test_samples_of_a_mode_travel_as_the_mode(arrive):
    pixel = WAIST / 12
    x = (np.arange(128) - 63.5) * pixel
    mode = LaguerreGauss(0, 1, WAIST)
    sampled = SampledMode(mode.amplitude(x[None], x[:, None], WAVELENGTH), pixel=pixel)
    places = np.linspace(-1, 1, 21) * mm
    field = arrive(sampled, FreeSpace(1.0))
    expected = mode.moved(1.0).amplitude(places[None], places[:, None], WAVELENGTH)
    # Cubic splines through 12 samples a waist: (1/12)^4/24 times fourth derivatives of a few tens, 1e-4.
    assert error(field, expected, places, places) < 3e-4
    assert field.power == pytest.approx(1, abs=1e-12)


def test_parts_of_two_wavelengths_spread_differently():
    beam = Beam((Term(1, Gaussian(waist=WAIST), H),))
    laser = Laser(incoherent=((0.5, beam, 500 * nm), (0.5, beam, 1000 * nm)), power=1.0)
    fields = propagate(make_plan(Train(wavelength=633 * nm).along(laser, FreeSpace(2.0)), "space1"))
    for field, wavelength in zip(fields, (500 * nm, 1000 * nm), strict=True):
        origin = np.array([0.0])
        peak = abs(field.at(origin, origin)[0, 0, 0]) ** 2
        width = WAIST * np.hypot(1, 2.0 * wavelength / (np.pi * WAIST**2))
        assert field.wavelength == wavelength
        assert peak == pytest.approx(0.5 * 2 / (np.pi * width**2), rel=1e-12)
