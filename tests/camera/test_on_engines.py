"""Exposures on the real engines: pixels, detectors, incoherent light, offset and turned cameras."""

import numpy as np
import pytest

from scipy.special import erf

import fastaxis as fa
from fastaxis.analysis import widths
from fastaxis.camera import load, reconstruct, save
from fastaxis.light.modes import SampledMode
from fastaxis.units import deg, mm, mW, nm, um

# Smooth fields on the grid are exact to this share of the peak or better.
SMOOTH = 1e-8


def gaussian(state=fa.D, **camera):
    train = fa.Train(wavelength=633 * nm, name="Low Quay")
    train.along(
        fa.Laser(waist=0.3 * mm, power=2 * mW, state=state, centre=(0.2 * mm, 0.1 * mm), name="laser"),
        fa.QuarterWavePlate(fast=20 * deg, name="qwp"),
        fa.Camera(**{"pixel": 20 * um, "shape": (100, 120), "name": "cam"} | camera),
    )
    return train


@pytest.fixture(scope="module")
def plain():
    return gaussian().expose("cam", fa.SIX_STATES)


def test_all_the_power_lands_on_a_large_sensor(plain):
    assert plain.total_power == pytest.approx(2 * mW, rel=SMOOTH)


def test_the_state_is_read_back_from_the_frames(plain):
    found = reconstruct(plain.frames, plain.settings).stokes.sum(axis=(1, 2)) / plain.total_power
    # D through a quarter-wave plate at 20 deg: azimuth 20 deg, tan(ellipticity) = tan(25 deg), left-handed.
    expected = fa.elliptical(20 * deg, -25 * deg).stokes
    np.testing.assert_allclose(found, expected, atol=SMOOTH)


def test_the_beam_is_where_it_was_put(plain):
    assert widths(plain.stokes[0], x=plain.x, y=plain.y).centroid == pytest.approx(
        (0.2 * mm, 0.1 * mm), abs=SMOOTH * mm
    )


def test_an_offset_sensor_sees_the_beam_at_the_same_place():
    shots = gaussian(centre=(0.15 * mm, -0.05 * mm)).expose("cam", fa.H)
    # 20 um pixels integrate: sums still give the centroid, up to the tail beyond the sensor, exp(-2 (0.85/0.3)^2) = 1e-7.
    assert widths(shots.stokes[0], x=shots.x, y=shots.y).centroid == pytest.approx((0.2 * mm, 0.1 * mm), abs=1e-6 * mm)


def test_a_turned_camera_sees_the_beam_turned_and_polarization_kept(plain):
    shots = gaussian(orientation="turned 90").expose("cam", fa.SIX_STATES)
    place = widths(shots.stokes[0], x=shots.x, y=shots.y).centroid
    assert place == pytest.approx((-0.1 * mm, 0.2 * mm), abs=1e-6 * mm)
    assert [shots.power(k) for k in "HVDARL"] == pytest.approx([plain.power(k) for k in "HVDARL"], abs=1e-6 * mW)


def test_a_detector_reads_what_a_large_camera_adds_up(plain):
    train = fa.Train(wavelength=633 * nm)
    train.along(*list(gaussian().elements.values())[:2], fa.Detector(name="bucket"))
    shots = train.expose("bucket", fa.SIX_STATES)
    assert shots.frames.shape == (6, 1, 1)
    assert [shots.power(k) for k in "HVDARL"] == pytest.approx([plain.power(k) for k in "HVDARL"], abs=SMOOTH * mW)


def test_a_detector_behind_a_patterned_plate_reads_unpolarized_light():
    train = fa.Train(wavelength=633 * nm)
    train.along(
        fa.Laser(waist=0.5 * mm, power=2 * mW, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, retardance=180 * deg, name="qp"),
        fa.Detector(name="bucket"),
    )
    shots = train.expose("bucket", fa.SIX_STATES, grid=fa.Grid(samples=256, window=6 * mm))
    assert shots.total_power == pytest.approx(2 * mW, rel=SMOOTH)
    # A turning axis averages out by symmetry of the samples, to roundings of a million of them.
    assert [shots.power(k) for k in "HVDA"] == pytest.approx([1 * mW] * 4, rel=SMOOTH)


def test_a_plane_wave_gives_a_detector_the_power_on_its_area():
    train = fa.Train(wavelength=633 * nm)
    train.along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=3 * mW, state=fa.H, name="laser"), fa.Detector(name="bucket")
    )
    assert train.expose("bucket", fa.H).power("H") == pytest.approx(3 * mW, rel=1e-12)


def test_unpolarized_light_is_halved_by_every_ideal_analyzer():
    shots = gaussian(state=fa.UNPOLARIZED).expose("cam", [*fa.SIX_STATES, fa.linear(33 * deg)])
    half = shots.total_power / 2
    assert [shots.power(k) for k in range(7)] == pytest.approx([half] * 7, rel=SMOOTH)


# Pixels integrate fringes of period P to a visibility of sinc(p/P): J. W. Goodman, Introduction to Fourier Optics; G. D. Boreman,
# Modulation Transfer Function in Optical and Electro-Optical Systems (2001), from memory.


@pytest.fixture(scope="module")
def fringes():
    """A field cos(pi x / P) under a wide Gaussian, with P = 40 um, on samples of 5 um."""
    axis = (np.arange(512) - 255.5) * 5 * um
    field = np.cos(np.pi * axis / (40 * um)) * np.exp(-((axis**2 + axis[:, None] ** 2) / (0.4 * mm) ** 2))
    return SampledMode(field, pixel=5 * um)


# Two plane directions 8 mrad off the axis: the samples carry 34 mrad, but their second moment asks for tails there are not.
@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")
@pytest.mark.parametrize(("share", "visibility"), [(4, 0.90031632), (2, 0.63661977), (1, 0.0)])
def test_pixels_wash_fringes_out_by_their_sinc(fringes, share, visibility):
    train = fa.Train(wavelength=633 * nm)
    pixel = 40 * um / share
    count = int(2.24 * mm / pixel) // 2 * 2 + 1  # odd: a pixel is centred on a bright fringe
    train.along(
        fa.Laser(mode=fringes, power=1 * mW, state=fa.H, name="laser"),
        fa.Camera(pixel=pixel, shape=(count, count), name="cam"),
    )
    shots = train.expose("cam", fa.H, grid=fa.Grid(samples=512, window=4.8 * mm))
    rows = shots.frame("H").sum(axis=0)
    wave = np.cos(2 * np.pi * shots.x / (40 * um))
    # At two pixels a fringe the wave and its mirror image are one and the same, and it counts once.
    found = rows @ wave / rows.sum() * (1 if share == 2 else 2)
    if share == 1:  # a pixel a fringe: nothing of the fringes is left beside the smooth envelope
        smooth = np.diff(erf(np.sqrt(2) * (np.append(shots.x, shots.x[-1] + pixel) - pixel / 2) / (0.4 * mm)))
        found = rows[count // 2] / rows.sum() / (smooth[count // 2] / smooth.sum()) - 1
    # The curve of the envelope leaves (P/w)^2/pi^2 = 1.01e-3 of a fringe on a pixel of one period.
    assert found == pytest.approx(visibility, abs=1.1e-3)


def test_a_real_exposure_survives_its_file(plain, tmp_path):
    back = load(save(plain, tmp_path / "shots.npz"))
    np.testing.assert_array_equal(back.frames, plain.frames)
    assert back.guard == plain.guard
    assert back.plan == plain.plan


# A. M. Beckley, T. G. Brown, M. A. Alonso, Opt. Express 18, 10777 (2010): S3 runs as (1 - rho^2)/(1 + rho^2), rho^2 = 2 r^2/w^2, towards
# the state of the core, the azimuth as phi/2. Here it goes through eight frames of a rotating plate first.


def test_a_full_poincare_beam_is_mapped_by_a_rotating_plate():
    w = 0.9 * mm
    core = fa.Term(np.sqrt(0.5), fa.LaguerreGauss(p=0, l=0, waist=w), fa.L)
    around = fa.Term(np.sqrt(0.5), fa.LaguerreGauss(p=0, l=1, waist=w), fa.R)
    train = fa.Train(wavelength=633 * nm, name="Saltpan")
    train.along(
        fa.Laser(beam=fa.Beam((core, around)), power=1 * mW, name="laser"),
        fa.Camera(pixel=10 * um, shape=(200, 200), name="cam"),
    )
    shots = train.expose("cam", fa.rotating_plate(8))
    s0, s1, s2, s3 = reconstruct(shots.frames, shots.settings).stokes
    x, y = np.meshgrid(shots.x, shots.y)
    rho2 = 2 * (x**2 + y**2) / w**2
    # A square pixel averages: (10 um)^2/24 times the Laplacian of S3/S0, at most 16/w^2 (in the middle), is 8.23e-5.
    np.testing.assert_allclose(s3 / s0, -(1 - rho2) / (1 + rho2), atol=8.3e-5)
    turn = (s1 + 1j * s2) / np.hypot(s1, s2) * np.exp(-1j * np.arctan2(y, x))
    # L core with l = +1 around: the long axis turns by half of phi, a lemon. At the middle four pixels phi itself changes within one.
    away = rho2 > 0.01
    assert np.ptp(np.angle(turn[away] / turn[0, 0])) < 1e-3
