"""Propagation against published values: diffraction at edges, sampling rules.

Unless another place is named, numbers are those of the works named beside them, from memory, and were recomputed
from the formulas with an arbitrary-precision library.
"""

import numpy as np
import pytest
from scipy import special

from fastaxis.elements import (
    Annulus,
    Aperture,
    FreeSpace,
    KnifeEdge,
    Laser,
    Lens,
    Mask,
    Obstacle,
    Slit,
)
from fastaxis.engines.grid.band import band_limit
from fastaxis.light import Gaussian, PlaneWave, Raster
from fastaxis.plan import Grid, make_plan
from fastaxis.train import Train
from fastaxis.units import mm, nm, um

# Samples set by hand on purpose coarser than edges and vortices want; that they are is said, and tested elsewhere.
coarse = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")

WAVELENGTH = 632.8 * nm
ORIGIN = np.array([0.0])
FLAT = PlaneWave(area=1.0)  # 1 W on 1 m^2: irradiance 1 W/m^2
# What edges leave on 1024 samples: the rim is half a sample uncertain, 1e-2 of the peak at worst.
EDGE = 1e-2


def irradiance(field, x, y=ORIGIN):
    return np.sum(abs(field.at(np.atleast_1d(x), y)) ** 2, axis=0)[0]


# -- round apertures ------------------------------------------------------------------------------------------------

RADIUS, FOCAL = 1 * mm, 300 * mm


@pytest.fixture(scope="module")
def airy(arrive):
    return arrive(FLAT, Aperture(radius=RADIUS), Lens(focal=FOCAL), FreeSpace(FOCAL))


def at_v(v):
    """Radius in the focal plane for v = pi D rho/(wavelength f)."""
    return np.asarray(v) * WAVELENGTH * FOCAL / (2 * np.pi * RADIUS)


def test_airy_pattern(airy):
    """(2 J1(v)/v)^2. Born & Wolf, Principles of Optics, section 8.5.2."""
    v = np.linspace(0.01, 15, 200)
    peak = (np.pi * RADIUS**2 / (WAVELENGTH * FOCAL)) ** 2
    assert np.allclose(irradiance(airy, at_v(v)) / peak, (2 * special.j1(v) / v) ** 2, atol=1e-4)


@pytest.mark.parametrize("zero", [1.21966989, 2.23313059, 3.23831548])
def test_airy_dark_rings(airy, zero):
    """Zeros of J1 over pi. Born & Wolf, table 8.2."""
    peak = irradiance(airy, ORIGIN)[0]
    assert irradiance(airy, at_v(np.pi * zero))[0] / peak < 1e-6


@pytest.mark.parametrize(("place", "height"), [(1.634719, 0.01749786), (2.679292, 0.00415800), (3.698710, 0.00160064)])
def test_airy_bright_rings(peak_near, airy, place, height):
    """Born & Wolf, table 8.2."""
    where, value = peak_near(airy, at_v(np.pi * place), at_v(0.3))
    assert where == pytest.approx(at_v(np.pi * place), rel=1e-3)
    assert value / irradiance(airy, ORIGIN)[0] == pytest.approx(height, rel=EDGE)


def test_airy_width(airy):
    """Half maximum at v = 1.61633995: full width 1.02899397 wavelength f/D. Born & Wolf, section 8.5.2."""
    assert irradiance(airy, at_v(1.61633995))[0] / irradiance(airy, ORIGIN)[0] == pytest.approx(0.5, abs=1e-4)


def test_airy_rayleigh_dip(airy):
    """Two points 1.2197 wavelength f/D apart dip to 0.735032. Born & Wolf, section 8.6.2."""
    half = at_v(np.pi * 1.21966989) / 2
    assert 2 * irradiance(airy, half)[0] / irradiance(airy, ORIGIN)[0] == pytest.approx(0.735032, abs=1e-4)


@pytest.mark.parametrize(("zero", "share"), [(1.21966989, 0.83778487), (2.23313059, 0.90993054)])
def test_airy_encircled_power(airy, zero, share):
    """1 - J0^2 - J1^2. Lord Rayleigh (1881); Born & Wolf, section 8.5.2. By pixels of 1/40 of the first ring."""
    pixel = at_v(np.pi * 1.21966989) / 40
    raster = Raster(float(pixel), (161, 161))
    inside = np.hypot(raster.x[None], raster.y[:, None]) <= at_v(np.pi * zero)
    whole = np.pi * RADIUS**2
    assert airy.stokes_on(raster)[0][inside].sum() / whole == pytest.approx(share, abs=3e-3)


@pytest.mark.parametrize(("fresnel_number", "expected"), [(1, 4.0), (2, 0.0), (3, 4.0), (4, 0.0)])
def test_on_the_axis_behind_a_round_hole(arrive, fresnel_number, expected):
    """4 sin^2(pi N/2), N = a^2/(wavelength z). J. W. Goodman, Introduction to Fourier Optics, 3rd ed. (2005)."""
    distance = (1 * mm) ** 2 / (500 * nm * fresnel_number)
    field = arrive(FLAT, Aperture(radius=1 * mm), FreeSpace(distance), wavelength=500 * nm)
    assert irradiance(field, ORIGIN)[0] == pytest.approx(expected, abs=EDGE)


@coarse
@pytest.mark.parametrize("distance", [1.0, 3.0])
def test_poisson_spot(arrive, distance):
    """Behind a round obstacle the irradiance on the axis is 1 at every distance. Born & Wolf, chapter 8.

    30 samples across the radius, each rim sample half a sample uncertain: 2 %.
    """
    field = arrive(FLAT, Obstacle(radius=1 * mm), FreeSpace(distance))
    assert irradiance(field, ORIGIN)[0] == pytest.approx(1, abs=2e-2)
    assert irradiance(field, 0.5 * mm)[0] < 0.5


@coarse
def test_a_ring_is_the_difference_of_two_holes(arrive):
    """Babinet: amplitudes behind an annulus are those of the outer hole less those of the inner one."""
    parts = [Lens(focal=FOCAL), FreeSpace(FOCAL)]
    grid = Grid(1024, 7 * mm)
    x = np.linspace(0, 0.3 * mm, 30)
    ring, outer, inner = (
        arrive(FLAT, stop, *parts, grid=grid).at(x, ORIGIN)
        for stop in (Annulus(inner=0.5 * mm, outer=1 * mm), Aperture(radius=1 * mm), Aperture(radius=0.5 * mm))
    )
    assert np.allclose(ring, outer - inner, atol=1e-12 * abs(outer).max())


# -- straight edges -------------------------------------------------------------------------------------------------


@pytest.fixture(scope="module")
def knife(arrive):
    return arrive(FLAT, KnifeEdge(angle=0.0), FreeSpace(1.0))


@pytest.mark.parametrize(
    ("w", "expected"),
    [(0.0, 0.25), (1.217198, 1.37044292), (1.872519, 0.77825105), (2.344485, 1.19927120), (2.739008, 0.84316190)],
)
def test_knife_edge_fringes(knife, w, expected):
    """Extremes of [(C + 1/2)^2 + (S + 1/2)^2]/2 at x = w sqrt(wavelength z/2). Born & Wolf, section 8.7.3."""
    assert irradiance(knife, w * np.sqrt(WAVELENGTH * 1.0 / 2))[0] == pytest.approx(expected, abs=EDGE)


def test_knife_edge_first_maximum(peak_near, knife):
    """At 0.684667 mm for 632.8 nm and 1 m. Hecht, Optics, section 10.3.8."""
    where, _ = peak_near(knife, 0.68 * mm, 0.1 * mm)
    assert where == pytest.approx(0.684667 * mm, rel=5e-3)


def test_single_slit(peak_near, arrive):
    """sinc^2, secondary maxima at beta/pi = 1.43029665 (0.04719045), 2.45902403 (0.01648003). Hecht, section 10.2.1."""
    width = 200 * um
    field = arrive(FLAT, Slit(width=width), Lens(focal=500 * mm), FreeSpace(500 * mm))
    unit = WAVELENGTH * 500 * mm / width  # place of beta = pi
    peak = irradiance(field, ORIGIN)[0]
    for beta, height in [(1.43029665, 0.04719045), (2.45902403, 0.01648003)]:
        where, value = peak_near(field, beta * unit, 0.3 * unit)
        assert where == pytest.approx(beta * unit, rel=EDGE)
        assert value / peak == pytest.approx(height, rel=3 * EDGE)
    assert irradiance(field, unit)[0] / peak < 1e-4


@coarse
def test_double_slit(peak_near, arrive):
    """Fringe period wavelength z/d = 2.0 mm, orders +-4 missing for d/b = 4. Hecht, section 10.2.2."""
    b, d, z = 62.5 * um, 250 * um, 1.0

    def two_slits(x, y):
        open_ = (abs(abs(x) - d / 2) < b / 2) & (abs(y) < 0.5 * mm)
        return open_ * 1.0

    # Samples of 15.625 um fall 4 to a slit, edges between them.
    field = arrive(
        FLAT, Mask(transmission=two_slits), Aperture(radius=3 * mm), Lens(focal=z), FreeSpace(z),
        wavelength=500 * nm, grid=Grid(1024, 16 * mm),
    )  # fmt: skip
    peak = irradiance(field, ORIGIN)[0]
    # The first order lies under the envelope sinc^2(pi b/d) = 0.811, which draws it inwards by 2 %.
    where, value = peak_near(field, 2 * mm, 0.4 * mm)
    assert where == pytest.approx(2 * mm, rel=3e-2)
    assert value / peak == pytest.approx(np.sinc(0.25) ** 2, rel=3e-2)
    assert irradiance(field, 1 * mm)[0] / peak < 1e-4
    assert irradiance(field, 8 * mm)[0] / peak < 1e-4


def test_talbot_images(arrive):
    """1 + m cos(2 pi x/a) comes back after 2a^2/wavelength = 31.60556258 mm, shifted by a/2 half-way.

    Lord Rayleigh, Phil. Mag. 11, 196 (1881); M. V. Berry and S. Klein, J. Mod. Opt. 43, 2139 (1996). On a window of
    whole periods a plane wave is periodic, so it is exact to the rounding of the transforms.
    """
    period, m = 100 * um, 0.4
    length = 2 * period**2 / WAVELENGTH
    assert length == pytest.approx(31.60556258 * mm, rel=1e-9)
    grating = Mask(transmission=lambda x, y: (0.5 + m / 2 * np.cos(2 * np.pi * x / period)) ** 2)
    x = np.linspace(-100, 100, 41) * um
    images = [
        irradiance(arrive(FLAT, grating, FreeSpace(z), grid=Grid(256, 64 * period)), x)
        for z in (1e-9, length / 4, length / 2, length)
    ]
    shape = (0.5 + m / 2 * np.cos(2 * np.pi * x / period)) ** 2
    assert np.allclose(images[0], shape, atol=1e-6)  # 1 nm of travel
    assert np.allclose(images[1], 0.25 * (1 + m**2 * np.cos(2 * np.pi * x / period) ** 2), atol=1e-12)
    assert np.allclose(images[2], (0.5 - m / 2 * np.cos(2 * np.pi * x / period)) ** 2, atol=1e-12)
    assert np.allclose(images[3], shape, atol=1e-12)


# -- sampling rules -------------------------------------------------------------------------------------------------


def test_band_limit():
    """K. Matsushima and T. Shimobaba, Opt. Express 17, 19662 (2009), eqs. (11)-(13), (20): 1024 samples of 10 um,
    padded to twice the window, at 0.5 m pass 32357.3110 per metre; they begin to cut at 0.323479 m."""
    padded = 2 * 1024 * 10 * um
    limit = band_limit(padded, 0.5, WAVELENGTH)
    assert limit == pytest.approx(32357.3110, rel=1e-9)
    assert 0.5 * limit / np.sqrt(1 / WAVELENGTH**2 - limit**2) == pytest.approx(padded / 2, rel=1e-12)
    assert band_limit(padded, 0.323479, WAVELENGTH) == pytest.approx(1 / (2 * 10 * um), rel=1e-5)


@coarse
def test_the_kernel_changes_at_the_critical_distance():
    """window^2/(samples wavelength). D. G. Voelz and M. C. Roggemann, Appl. Opt. 48, 6132 (2009)."""
    grid = Grid(1024, 10.24 * mm)
    critical = grid.window**2 / (grid.samples * WAVELENGTH)
    assert critical == pytest.approx(0.16182048, rel=1e-7)
    kernels = []
    for distance in (0.99 * critical, 1.01 * critical):
        laser = Laser(mode=FLAT, power=1.0, name="laser")
        train = Train(wavelength=WAVELENGTH).along(laser, Aperture(radius=1.5 * mm), FreeSpace(distance))
        kernels.append(make_plan(train, "space1", grid=grid).sampling.planes[-1].hop.kernel)
    assert kernels == ["scaled", "single"]


def test_gaussian_by_transform(arrive):
    """256 samples in 8 mm, waist 0.5 mm, 1 m: field to 1e-9, power to 1e-13. H. Kogelnik and T. Li, Appl. Opt. 5, 1550
    (1966); Goodman, chapters 3-5. The window holds 8 radii; the beam of 0.642 mm ends at exp(-6.2^2)."""
    mode = Gaussian(waist=0.5 * mm)
    field = arrive(mode, FreeSpace(1.0), grid=Grid(256, 8 * mm))
    x = np.linspace(-1.5, 1.5, 31) * mm
    expected = mode.moved(1.0).amplitude(x[None], x[:, None], WAVELENGTH)
    assert np.max(abs(field.at(x, x)[0] - expected)) / np.max(abs(expected)) < 1e-9
    assert field.power == pytest.approx(1, abs=1e-13)


def test_gaussian_amplitude_with_its_sign(arrive):
    """u(0.3 mm, 1 m) = 0.54865390 - 0.30139358i for unit peak at the waist. Kogelnik & Li (1966), conjugated."""
    field = arrive(Gaussian(waist=0.5 * mm), FreeSpace(1.0))
    peak = np.sqrt(2 / np.pi) / (0.5 * mm)
    assert field.at(np.array([0.3 * mm]), ORIGIN)[0, 0, 0] / peak == pytest.approx(0.54865390 - 0.30139358j, abs=1e-8)
