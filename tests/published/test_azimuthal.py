"""Centred benches against published values and closed forms, to all their digits.

Sources: Born & Wolf, Principles of Optics, 7th ed. (1999), 8.5.2 (Airy), 8.9 (Poisson's spot); J. W. Goodman,
Introduction to Fourier Optics, 3rd ed. (2005), ch. 4 (circular aperture on axis); V. V. Kotlyar et al., J. Opt. Soc.
Am. A 22, 849 (2005) and Gradshteyn & Ryzhik, Table of Integrals, 7th ed., 6.631 (spiral plate on a Gaussian beam);
S. Slussarenko et al., Opt. Express 19, 4085 (2011) (detuned q-plate). The digits were recomputed from the formulas.
"""

import numpy as np
import pytest
from scipy.optimize import brentq, minimize_scalar
from scipy.special import ive, j0, j1

from fastaxis.elements import Aperture, Camera, FreeSpace, HalfWavePlate, Laser, Lens, Obstacle, QPlate, SpiralPlate
from fastaxis.engines import propagate
from fastaxis.light import FlatTop, Gaussian, H, L, PlaneWave, R
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import cm, deg, m, mm, nm, um

ORIGIN = np.zeros(1)


def arrive(mode, *parts, wavelength, state=H, power=1.0):
    laser = Laser(mode=mode, power=power, state=state, name="laser")
    camera = Camera(pixel=5 * um, shape=(8, 8), name="cam")
    train = Train(wavelength=wavelength).along(laser, *parts, camera)
    return propagate(make_plan(train, "cam", engine="azimuthal"))[0]


def irradiance(field, radii):
    return (abs(field.at(np.atleast_1d(radii), ORIGIN)) ** 2).sum(axis=0)[0]


def ring(field, guess):
    """Radius and irradiance of the maximum near a guess; a maximum is known to the root of the field's error."""
    found = minimize_scalar(
        lambda r: -irradiance(field, r)[0],
        bounds=(0.8 * guess, 1.2 * guess),
        method="bounded",
        options={"xatol": 1e-9 * guess},
    )
    return found.x, -found.fun


@pytest.fixture(scope="module")
def airy():
    """An evenly lit hole of 2 mm, 500 nm, in the focus of 1 m: v = pi D r/(lambda f)."""
    field = arrive(FlatTop(radius=1 * mm), Lens(focal=1 * m), FreeSpace(1 * m), wavelength=500 * nm)
    return field, 500 * nm * 1 * m / (2 * mm)


def test_airy_pattern_is_exact_everywhere(airy):
    field, unit = airy
    v = np.linspace(0.01, 16, 60)
    peak = np.pi * (1 * mm) ** 2 / (500 * nm) ** 2
    # The amplitude is settled to 1e-13 of its peak on each panel, the irradiance to some times that.
    assert abs(irradiance(field, v / np.pi * unit) - peak * (2 * j1(v) / v) ** 2).max() < 5e-13 * peak


@pytest.mark.parametrize("zero", [1.21966989, 2.23313059, 3.23831548, 4.24106286])
def test_airy_zeros(airy, zero):
    field, unit = airy
    amplitude = brentq(lambda u: _signed(field, u * unit), zero - 0.1, zero + 0.1, xtol=1e-12)
    assert amplitude == pytest.approx(zero, abs=6e-9)  # half a unit of the last printed digit


def _signed(field, r):
    """The amplitude on a circle, its phase counted from the axis and the parabola behind a lens's focus."""
    value = field.at(np.array([r, 0.0]), ORIGIN)[0, 0]
    bend = np.exp(-1j * np.pi / field.wavelength * r**2 / (1 * m))
    return (value[0] * bend / value[1]).real


@pytest.mark.parametrize(("place", "height"), [(1.634719, 0.01749786), (2.679292, 0.00415800), (3.698710, 0.00160064)])
def test_airy_rings(airy, place, height):
    field, unit = airy
    radius, value = ring(field, place * unit)
    assert radius / unit == pytest.approx(place, abs=6e-7)
    assert value / irradiance(field, 0.0)[0] == pytest.approx(height, abs=6e-9)


@pytest.mark.parametrize(
    ("zero", "share"),
    [(1.21966989, 0.83778487), (2.23313059, 0.90993054), (3.23831548, 0.93764747), (4.24106286, 0.95231917)],
)
def test_airy_encircled_energy(airy, zero, share):
    field, unit = airy
    nodes, weights = np.polynomial.legendre.leggauss(64)
    edge = zero * unit
    r = edge * (nodes + 1) / 2
    inside = 2 * np.pi * np.sum(irradiance(field, r) * r * weights) * edge / 2
    assert inside == pytest.approx(share, abs=6e-9)
    assert inside == pytest.approx(1 - j0(np.pi * zero) ** 2 - j1(np.pi * zero) ** 2, abs=1e-12)


def test_airy_half_maximum(airy):
    field, unit = airy
    top = irradiance(field, 0.0)[0]
    half = brentq(lambda u: irradiance(field, u * unit)[0] / top - 0.5, 0.4, 0.6, xtol=1e-12)
    assert 2 * half == pytest.approx(1.02899397, abs=6e-9)


@pytest.mark.parametrize(("zones", "expected"), [(1, 4.0), (2, 0.0), (3, 4.0), (4, 0.0), (0.5, 2.0), (40, 0.0)])
def test_on_axis_behind_a_hole_lit_by_a_plane_wave(zones, expected):
    """I/I0 = 4 sin^2(pi N/2) with N = a^2/(lambda z); the very plane wave, cut by the hole."""
    radius, wavelength = 1 * mm, 500 * nm
    distance = radius**2 / (wavelength * zones)
    flat = PlaneWave(area=1 * mm**2)
    field = arrive(flat, FreeSpace(0.1), Aperture(radius=radius), FreeSpace(distance), wavelength=wavelength)
    assert irradiance(field, 0.0)[0] * mm**2 == pytest.approx(expected, abs=1e-11)


@pytest.mark.parametrize("distance", [0.5 * m, 2 * m])
def test_poisson_spot(distance):
    """A Gaussian beam of 5 mm stands for the plane wave, which has no end: on the axis behind a disc of radius a

    |u|^2 / |u without disc|^2 = exp(-2 a^2/w^2), exactly for its waist at the disc, and it tends to 1.
    """
    radius, waist = 1 * mm, 5 * mm
    beam = Gaussian(waist=waist)
    open_field = arrive(beam, FreeSpace(distance), wavelength=500 * nm)
    behind = arrive(beam, Obstacle(radius=radius), FreeSpace(distance), wavelength=500 * nm)
    ratio = irradiance(behind, 0.0)[0] / irradiance(open_field, 0.0)[0]
    assert ratio == pytest.approx(np.exp(-2 * (radius / waist) ** 2), rel=1e-11)


RINGS = {
    1: (0.8442312118, 0.1987534442),
    2: (1.339134845, 0.08905784323),
    3: (1.798697673, 0.04889991868),
    4: (2.251992386, 0.03019399449),
    5: (2.709924335, 0.02021741239),
    6: (3.176027573, 0.01437591191),
    8: (4.130241394, 0.008262805099),
    10: (5.102862407, 0.005336136589),
}


@pytest.mark.parametrize("charge", RINGS)
def test_rings_of_a_spiral_plate_in_focus(charge):
    waist, focal, wavelength = 1 * mm, 300 * mm, 632.8 * nm
    spot = wavelength * focal / (np.pi * waist)
    field = arrive(
        Gaussian(waist=waist), SpiralPlate(charge=charge), Lens(focal=focal), FreeSpace(focal), wavelength=wavelength
    )
    place, height = RINGS[charge]
    radius, value = ring(field, place * spot)
    # Half a unit in the tenth printed digit of the height; at a maximum the place is known to the root of the rounding, 1e-8.
    assert radius / spot == pytest.approx(place, rel=3e-8)
    assert value / (2 / (np.pi * spot**2)) == pytest.approx(height, rel=5e-10)


def test_the_same_in_micrometres():
    field = arrive(
        Gaussian(waist=1 * mm), SpiralPlate(charge=1), Lens(focal=30 * cm), FreeSpace(30 * cm), wavelength=632.8 * nm
    )
    assert ring(field, 51 * um)[0] == pytest.approx(51.015160 * um, rel=3e-8)


@pytest.mark.parametrize(
    ("charge", "s", "value"),
    [
        (1, 1.0, 0.433023297055),
        (2, 1.0, 0.264241117657),
        (3, 1.0, 0.121474012878),
    ],
)
def test_far_field_amplitudes_of_a_spiral_plate(charge, s, value):
    """U_l(1), and its phase (-i)^l exp(i l theta) on top of the focus without the plate."""
    waist, focal, wavelength = 1 * mm, 300 * mm, 632.8 * nm
    spot = wavelength * focal / (np.pi * waist)
    parts = [Lens(focal=focal), FreeSpace(focal)]
    plain = arrive(Gaussian(waist=waist), *parts, wavelength=wavelength)
    twisted = arrive(Gaussian(waist=waist), SpiralPlate(charge=charge), *parts, wavelength=wavelength)
    x, y = np.array([s * spot]), np.array([s * spot])
    at_x = twisted.at(x, ORIGIN)[0, 0, 0] / plain.at(x, ORIGIN)[0, 0, 0] * np.exp(-(s**2))
    at_y = twisted.at(ORIGIN, y)[0, 0, 0] / plain.at(ORIGIN, y)[0, 0, 0] * np.exp(-(s**2))
    assert at_x == pytest.approx((-1j) ** charge * value, abs=1e-12)
    assert at_y == pytest.approx((-1j) ** charge * 1j**charge * value, abs=1e-12)
    half = s**2 / 2
    closed = np.sqrt(np.pi) / 2 * s * (ive((charge - 1) / 2, half) - ive((charge + 1) / 2, half))
    assert abs(at_x) == pytest.approx(closed, rel=1e-11)


@pytest.mark.parametrize(
    ("charge", "place", "value"),
    [
        (1, 0.5, 0.057550069), (1, 1.0, 0.130997222), (1, 2.0, 0.051362030),
        (2, 0.5, 0.003306538), (2, 1.0, 0.032070124), (2, 2.0, 0.067736207),
    ],
)  # fmt: skip
def test_spiral_plate_at_the_rayleigh_range(charge, place, value):
    waist, wavelength = 0.5 * mm, 532 * nm
    rayleigh = np.pi * waist**2 / wavelength
    field = arrive(Gaussian(waist=waist), SpiralPlate(charge=charge), FreeSpace(rayleigh), wavelength=wavelength)
    unit = 2 / (np.pi * waist**2)
    assert irradiance(field, place * waist)[0] / unit == pytest.approx(value, abs=6e-10)


@pytest.mark.parametrize("retardance", [45, 90, 135, 170, 180])
def test_conversion_of_a_detuned_q_plate(retardance):
    field = arrive(Gaussian(waist=1 * mm), QPlate(q=0.5, retardance=retardance * deg), wavelength=532 * nm, state=L)
    s0, _, _, s3 = field.total_stokes
    assert (s0 + s3) / 2 == pytest.approx(np.sin(retardance * deg / 2) ** 2, abs=1e-14)


def test_two_q_plates_add_their_charges_about_a_half_wave_plate():
    """L, 0 -> R, 2q -> L, 2q -> R, 4q (Marrucci et al. 2006)."""
    parts = [QPlate(q=0.5), HalfWavePlate(fast=0.3), QPlate(q=0.5)]
    field = arrive(Gaussian(waist=1 * mm), *parts, wavelength=532 * nm, state=L)
    assert field.harmonics.orders == ((1, 2),)
    back = arrive(Gaussian(waist=1 * mm), *parts, wavelength=532 * nm, state=R)
    assert back.harmonics.orders == ((0, -2),)


def test_ring_of_a_radial_beam_in_focus():
    """532 nm, w = 0.80 mm, q = 1/2, f = 500 mm: the ring of charge 1, 0.8442312118 lambda f/(pi w) = 89.4 um."""
    field = arrive(
        Gaussian(waist=0.8 * mm), HalfWavePlate(fast=0.0), QPlate(q=0.5), FreeSpace(500 * mm), Lens(focal=500 * mm),
        FreeSpace(500 * mm), wavelength=532 * nm,
    )  # fmt: skip
    radius, _ = ring(field, 90 * um)
    assert radius == pytest.approx(0.8442312118 * 532 * nm * 500 * mm / (np.pi * 0.8 * mm), rel=3e-8)
    assert round(radius / um, 1) == 89.4
