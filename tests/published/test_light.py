"""Light against published values: Stokes parameters, handedness, Gaussian beams, modes and second moments.

Numbers quoted "from memory" were not read in print; each was computed again by another way before it was put here.
Where a source names circular light from behind (IEEE, IAU), S3 is compared through the view of the source.
"""

import math

import numpy as np
import pytest
from scipy.integrate import quad
from scipy.optimize import brentq, minimize_scalar
from scipy.special import erf

from fastaxis.conventions import View
from fastaxis.light import (
    A,
    D,
    FlatTop,
    Gaussian,
    H,
    HermiteGauss,
    L,
    LaguerreGauss,
    R,
    SampledMode,
    V,
    ellipse,
    elliptical,
    helicity,
    stokes,
)
from fastaxis.units import deg, mm, nm

HENE = 632.8 * nm
W0 = 0.5 * mm
IN_VIEW = {view: np.array([1, 1, 1, view.s3_sign]) for view in View}


@pytest.mark.parametrize(
    ("state", "hecht"),
    [
        (H, (1, 1, 0, 0)),
        (V, (1, -1, 0, 0)),
        (D, (1, 0, 1, 0)),
        (A, (1, 0, -1, 0)),
        (R, (1, 0, 0, 1)),
        (L, (1, 0, 0, -1)),
    ],
)
def test_six_cardinal_states(state, hecht):
    """E. Hecht, Optics (4th ed. 2002), Table 8.5; M. Born and E. Wolf (7th ed. 1999), 1.4.2; from memory."""
    np.testing.assert_allclose(stokes(state.jones), hecht, rtol=0, atol=1e-15)


@pytest.mark.parametrize("view", View)
def test_positive_helicity_under_either_naming(view):
    """sigma+ = (1, i)/sqrt2 has S3 = -1 in Hecht, Born and Wolf, Goldstein and +1 in IEEE, IAU; from memory."""
    plus = np.array([1, 1j]) / math.sqrt(2)
    np.testing.assert_allclose(helicity(+1).jones, plus, rtol=0, atol=1e-15)
    expected = {View.RECEIVER: -1, View.SOURCE: +1}[view]
    assert (stokes(plus) * IN_VIEW[view])[3] == pytest.approx(expected, abs=1e-15)
    assert view.circular_name(+1) == {View.RECEIVER: "L", View.SOURCE: "R"}[view]


@pytest.mark.parametrize(("state", "turn"), [(L, +1), (R, -1)])
def test_l_sweeps_counter_clockwise_in_time(state, turn):
    """IEC 60050 'left-hand polarization': anticlockwise as seen looking in the source; IEEE Std 149-1979, 11.1.

    The tip of Re[E exp(-iwt)] sweeps pi/2 a period for unit power, counter-clockwise facing the source for L.
    """
    time = np.linspace(0, 2 * math.pi, 2001)
    x, y = (np.outer(state.jones, np.exp(-1j * time))).real
    swept = np.sum(x[:-1] * y[1:] - x[1:] * y[:-1]) / 2
    assert swept == pytest.approx(turn * math.pi / 2, abs=1e-5)  # 2000 chords fall short of an arc by (2 pi/2000)^2/6


@pytest.mark.parametrize("view", View)
def test_ellipse_angles_and_stokes(view):
    """Born and Wolf (7th ed.), 1.4.2 eqs. (44)-(45), at azimuth 25 and ellipticity -12 deg; from memory.

    E = R(azimuth)(cos, i s sin) with s = +1 under the naming of the source and -1 under that of the receiver.
    """
    azimuth, ellipticity = 25 * deg, -12 * deg
    state = elliptical(azimuth, ellipticity * view.s3_sign)
    along, across = math.cos(ellipticity), -view.s3_sign * 1j * math.sin(ellipticity)
    cos, sin = math.cos(azimuth), math.sin(azimuth)
    np.testing.assert_allclose(
        state.jones, [cos * along - sin * across, sin * along + cos * across], rtol=0, atol=1e-15
    )
    found = stokes(state.jones) * IN_VIEW[view]
    np.testing.assert_allclose(found, [1, 0.5872157011, 0.6998164214, -0.4067366431], rtol=0, atol=5e-11)
    back = ellipse(stokes(state.jones))
    assert (back[0], back[1] * view.s3_sign) == pytest.approx((azimuth, ellipticity), abs=1e-14)


def test_beam_of_a_helium_neon_laser():
    """H. Kogelnik and T. Li, Appl. Opt. 5, 1550 (1966), eqs. (19)-(26); Siegman, Lasers, ch. 17; from memory."""
    beam = Gaussian(W0, waist_at=-1.0)
    assert beam.rayleigh(HENE) == pytest.approx(1.24114754, rel=1e-8)
    assert beam.width(HENE) == pytest.approx(0.64209854 * mm, rel=1e-8)
    assert 1 / beam.curvature(HENE) == pytest.approx(2.54044722, rel=1e-8)
    assert beam.gouy(HENE) == pytest.approx(0.67821053, rel=1e-8)
    half_angle = 2 * math.sqrt(beam.moments(HENE).t2)
    assert half_angle == pytest.approx(0.40285299e-3, rel=2e-8)  # eight printed digits


def test_complex_amplitude_with_its_gouy_sign():
    """Kogelnik and Li (1966), conjugated to exp(-iwt); Siegman 17.1. Peak 1 at the waist; from memory."""
    at_waist = Gaussian(W0).amplitude(0.0, 0.0, HENE)
    u = Gaussian(W0).moved(1.0).amplitude(0.3 * mm, 0.0, HENE) / at_waist
    assert u.real == pytest.approx(0.54865390, abs=1e-8)  # eight printed digits
    assert u.imag == pytest.approx(-0.30139358, abs=1e-8)


@pytest.mark.parametrize(
    ("radius", "share"), [(1.0, 0.86466472), (1.5, 0.98889100), (2.0, 0.99966454), (0.5, 0.39346934)]
)
def test_power_within_a_radius(radius, share):
    """1 - exp(-2 a^2/w^2): Siegman, Lasers, 17.1; terms of ISO 13694:2018; from memory."""
    beam = Gaussian(W0)
    within = quad(lambda r: 2 * math.pi * r * W0**2 * abs(beam.radial(r * W0, HENE)) ** 2, 0, radius)[0]
    assert within == pytest.approx(share, abs=1e-8)


def test_widths_of_a_gaussian():
    """FWHM = 1.17741002 w; knife edge 10-90 % = 1.28155157 w: Siegman 17.1; peak 2/(pi w^2); from memory."""
    beam = Gaussian(W0)
    peak = abs(beam.radial(0.0, HENE)) ** 2
    assert peak == pytest.approx(2 / (math.pi * W0**2), rel=1e-14)
    half = brentq(lambda r: abs(beam.radial(r * W0, HENE)) ** 2 / peak - 0.5, 0.1, 1, xtol=1e-12)
    assert 2 * half == pytest.approx(1.17741002, abs=1e-8)
    # At y = 0 the light along x is that of the knife edge times the fixed height across.
    across = math.sqrt(2 / math.pi) / W0
    left = lambda x: quad(lambda s: abs(beam.amplitude(s * W0, 0.0, HENE)) ** 2 * W0 / across, -6, x)[0]  # noqa: E731 - a formula
    low, high = (brentq(lambda x, share=share: left(x) - share, -3, 3, xtol=1e-11) for share in (0.1, 0.9))
    assert high - low == pytest.approx(1.28155157, abs=1e-8)
    assert left(0.5) - left(-0.5) == pytest.approx(erf(1 / math.sqrt(2)), abs=1e-10)  # 16-84 % is one w


@pytest.mark.parametrize(
    ("p", "l", "quality"), [(0, 0, 1), (0, 1, 2), (0, 2, 3), (1, 0, 3), (1, 1, 4), (2, 3, 8), (2, -3, 8)]
)
def test_second_moments_of_laguerre_gauss(p, l, quality):
    """M^2 = 2p + |l| + 1: ISO 11146-1:2021, 3; R. L. Phillips and L. C. Andrews, Appl. Opt. 22, 643 (1983)."""
    for distance in (0.0, 0.7, 3.0):
        mode = LaguerreGauss(p, l, W0).moved(distance)
        w = mode.width(HENE)
        x2 = quad(lambda r: math.pi * r**3 * w**4 * abs(mode.radial(r * w, HENE)) ** 2, 0, 9, epsabs=1e-20)[0]
        assert x2 == pytest.approx(w**2 / 4 * quality, rel=1e-8)
        assert mode.moments(HENE).x2 == pytest.approx(x2, rel=1e-8)
        assert mode.moments(HENE).quality(HENE) == pytest.approx(quality, rel=1e-9)


@pytest.mark.parametrize(("m", "quality"), [(0, 1), (1, 3), (2, 5), (5, 11)])
def test_second_moments_of_hermite_gauss(m, quality):
    """M^2 = 2m + 1: W. H. Carter, Appl. Opt. 19, 1027 (1980); ISO 11146-1."""
    for mode in (HermiteGauss(m, 0, W0, 0.4), HermiteGauss(0, m, W0, 0.4)):
        assert mode.moments(HENE).quality(HENE) == pytest.approx(quality, rel=1e-9)
        assert mode.moments(HENE).x2 == pytest.approx(mode.width(HENE) ** 2 / 4 * quality, rel=1e-9)


def test_widths_of_simple_shapes():
    """D4sigma of a disc is 2a, of a square 1.15470054 L: ISO 11146-1/-3; A. E. Siegman (1990); from memory."""
    assert 4 * math.sqrt(FlatTop(1 * mm).moments(HENE).x2) == pytest.approx(2 * mm, rel=1e-12)
    count, side = 400, 1 * mm
    square = SampledMode(np.ones((count, count)), side / count)
    # The mean square of cell centres lacks 1/count^2 of that of the square.
    measured = 4 * math.sqrt(square.moments(HENE).x2 / (1 - 1 / count**2))
    assert measured == pytest.approx(1.15470054 * side, rel=1e-8)


@pytest.mark.parametrize(
    ("l", "radius", "peak", "of_gaussian"),
    [
        (1, 0.70710678, 0.23419933, 0.36787944),
        (2, 1.0, 0.17231423, 0.27067057),
        (3, 1.22474487, 0.14262945, 0.22404181),
    ],
)
def test_ring_of_a_vortex(l, radius, peak, of_gaussian):
    """r = w sqrt(|l|/2): L. Allen et al., Phys. Rev. A 45, 8185 (1992); Phillips and Andrews (1983); from memory."""
    mode = LaguerreGauss(0, l, W0)
    light = lambda r: abs(mode.radial(r * W0, HENE)) ** 2 * W0**2  # noqa: E731 - a formula
    found = minimize_scalar(lambda r: -light(r), bounds=(0.2, 2), method="bounded", options={"xatol": 1e-9})
    assert found.x == pytest.approx(radius, abs=2e-8)  # a maximum is found to the root of a rounding
    assert light(radius) == pytest.approx(peak, abs=1e-8)
    assert light(radius) * math.pi / 2 == pytest.approx(of_gaussian, abs=1e-8)


@pytest.mark.parametrize(("p", "l"), [(0, 1), (1, -2), (2, 3)])
def test_laguerre_gauss_as_printed(p, l):
    """Allen et al. (1992), eqs. (1)-(2), conjugated to exp(-iwt) and e^{+il phi}; Siegman 17.5; from memory."""
    from scipy.special import eval_genlaguerre

    z, r, phi = 0.9, 0.37 * mm, 0.8
    reach = math.pi * W0**2 / HENE
    w, radius, zeta = W0 * math.hypot(1, z / reach), z * (1 + (reach / z) ** 2), math.atan(z / reach)
    norm = math.sqrt(2 * math.factorial(p) / (math.pi * math.factorial(p + abs(l)))) / w
    shape = (math.sqrt(2) * r / w) ** abs(l) * eval_genlaguerre(p, abs(l), 2 * r**2 / w**2) * math.exp(-(r**2) / w**2)
    phase = math.pi / HENE * r**2 / radius + l * phi - (2 * p + abs(l) + 1) * zeta
    found = LaguerreGauss(p, l, W0).moved(z).amplitude(r * math.cos(phi), r * math.sin(phi), HENE)
    assert found == pytest.approx(norm * shape * np.exp(1j * phase), rel=1e-12)


def test_gouy_order_of_hermite_gauss():
    """The phase on a lobe turns by (m + n + 1) zeta from waist to far field: Siegman 17.5."""
    mode = HermiteGauss(2, 1, W0)
    far = mode.moved(1e6)  # zeta = pi/2 less 1.2e-6
    x, y = 0.9 * far.width(HENE), 0.5 * far.width(HENE)
    curve = math.pi / HENE * far.curvature(HENE) * (x * x + y * y)
    turned = far.amplitude(x, y, HENE) * np.exp(-1j * curve) / mode.amplitude(0.9 * W0, 0.5 * W0, HENE)
    assert turned / abs(turned) == pytest.approx(np.exp(-4j * math.pi / 2), abs=6e-6)


def test_coupling_of_two_gaussians():
    """H. Kogelnik (1964); W. B. Joyce and B. C. DeLoach, Appl. Opt. 23, 4187 (1984); from memory."""
    beam = Gaussian(W0)
    reach = beam.rayleigh(HENE)
    coupling = lambda other: abs(beam.overlap(other, HENE)) ** 2  # noqa: E731 - a formula
    assert coupling(Gaussian(1.5 * W0)) == pytest.approx(0.85207101, abs=1e-8)
    assert coupling(Gaussian(W0, centre=(W0, 0.0))) == pytest.approx(0.36787944, abs=1e-8)
    assert coupling(beam.moved(reach)) == pytest.approx(0.8, abs=1e-14)
    assert coupling(beam.moved(2 * reach)) == pytest.approx(0.5, abs=1e-14)


def test_coupling_of_a_tilted_gaussian():
    """exp[-(pi w theta/lambda)^2], by the same sources."""
    beam, tilt = Gaussian(W0), 0.3e-3
    line = (np.arange(256) - 127.5) * (8 * W0 / 256)
    x, y = np.meshgrid(line, line)
    tilted = SampledMode(beam.amplitude(x, y, HENE) * np.exp(2j * math.pi / HENE * tilt * x), line[1] - line[0])
    expected = math.exp(-((math.pi * W0 * tilt / HENE) ** 2))
    assert abs(tilted.overlap(beam, HENE)) ** 2 == pytest.approx(expected, abs=1e-8)
