import numpy as np
import pytest

from fastaxis.light import Gaussian, HermiteGauss, LaguerreGauss, Mode, Raster, SampledMode
from fastaxis.units import mm, um

PIXEL = 25 * um
TRUTH = LaguerreGauss(0, 2, 0.4 * mm, waist_at=-0.6)


def sampled(truth=TRUTH, pixel=PIXEL, shape=(200, 180), wavelength=632.8e-9):
    raster = Raster(pixel, shape)
    return SampledMode(3j * truth.amplitude(*np.meshgrid(raster.x, raster.y), wavelength), pixel)


def test_samples_are_scaled_to_unit_power_and_frozen():
    mode = sampled()
    assert isinstance(mode, Mode)
    assert np.sum(abs(mode.array) ** 2) * PIXEL**2 == pytest.approx(1, abs=1e-13)
    with pytest.raises(ValueError, match="read-only"):
        mode.array[0, 0] = 1


def test_samples_come_back_at_the_pixels(wavelength):
    mode = sampled()
    back = mode.amplitude(*np.meshgrid(mode.raster.x, mode.raster.y), wavelength)
    # A spline passes through its knots to the roundings of a banded solve.
    np.testing.assert_allclose(back, mode.array, rtol=0, atol=1e-12 * abs(mode.array).max())


def test_rows_run_along_y(wavelength):
    array = np.zeros((8, 12))
    array[6, 1] = 1
    mode = SampledMode(array, PIXEL)
    peak = mode.amplitude(mode.raster.x[1], mode.raster.y[6], wavelength)
    assert abs(peak) == pytest.approx(1 / PIXEL)


def test_between_pixels_the_error_falls_with_the_fourth_power_of_the_pixel(wavelength):
    x, y = np.meshgrid(np.linspace(-0.5, 0.5, 41) * mm, np.linspace(-0.4, 0.6, 43) * mm)
    truth, errors, pixels = TRUTH.amplitude(x, y, wavelength), [], np.array([40, 20, 10]) * um
    for pixel in pixels:
        found = sampled(pixel=pixel, shape=(round(5 * mm / pixel),) * 2).amplitude(x, y, wavelength) / 1j
        errors.append(abs(found - truth).max() / abs(truth).max())
    rate = np.polyfit(np.log(pixels), np.log(errors), 1)[0]
    assert rate == pytest.approx(4, abs=0.3)  # cubic splines
    assert errors[-1] < 1e-5


def test_dark_outside(wavelength):
    mode = SampledMode(np.ones((8, 8)), PIXEL)
    edge = 4 * PIXEL
    assert mode.amplitude(edge * 1.01, 0, wavelength) == 0
    assert mode.amplitude(0, -edge * 1.01, wavelength) == 0
    assert mode.amplitude(edge * 0.99, 0, wavelength) != 0


@pytest.mark.parametrize("truth", [TRUTH, HermiteGauss(0, 3, 0.3 * mm, waist_at=0.4), Gaussian(0.3 * mm)], ids=str)
def test_moments_and_curvature_are_those_of_the_light(truth, wavelength):
    mode = sampled(truth, shape=(240, 240))
    found, expected = mode.moments(wavelength), truth.moments(wavelength)
    # Sums over well-sampled smooth light converge geometrically; what is cut at the window is below 1e-12.
    assert found.x2 == pytest.approx(expected.x2, rel=1e-10)
    assert found.t2 == pytest.approx(expected.t2, rel=1e-10)
    assert found.xt == pytest.approx(expected.xt, abs=1e-10 * np.sqrt(expected.x2 * expected.t2))
    assert mode.curvature(wavelength) == pytest.approx(truth.curvature(wavelength), abs=1e-9)


def test_overlaps_are_sums_over_the_pixels(wavelength):
    mode, other = sampled(), HermiteGauss(2, 0, 0.5 * mm)
    expected = TRUTH.overlap(other, wavelength)
    assert mode.overlap(other, wavelength) == pytest.approx(-1j * expected, abs=1e-11)
    assert other.overlap(mode, wavelength) == pytest.approx(1j * expected.conjugate(), abs=1e-11)
    assert mode.overlap(mode, wavelength) == pytest.approx(1, abs=1e-13)


def test_of_two_sampled_modes_the_finer_pixels_count(wavelength):
    fine, coarse = sampled(pixel=12.5 * um, shape=(400, 400)), sampled()
    # The coarse one is interpolated: error of the spline at 25 um, see above.
    assert coarse.overlap(fine, wavelength) == pytest.approx(1, abs=1e-4)
    assert coarse.overlap(fine, wavelength) == fine.overlap(coarse, wavelength).conjugate()


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("SampledMode(array='dark', pixel=1e-5)", "SampledMode: str; samples are numbers"),
        ("SampledMode(array=numpy.ones(9), pixel=1e-5)", "SampledMode: shape = (9,); samples form a (ny, nx) array"),
        ("SampledMode(array=numpy.ones((3, 9)), pixel=1e-5)", "of at least 4 by 4"),
        ("SampledMode(array=numpy.zeros((8, 8)), pixel=1e-5)", "samples are finite and not all zero"),
        ("SampledMode(array=numpy.full((8, 8), numpy.nan), pixel=1e-5)", "samples are finite and not all zero"),
        ("SampledMode(array=numpy.ones((8, 8)), pixel=0)", "pixel must be positive"),
        ("SampledMode(array=numpy.ones((8, 8)), pixel=10)", "pixel is in metres and 10 m is beyond 0.1 m"),
        ("SampledMode(numpy.ones((8, 8)), 10*um).overlap(PlaneWave(1*mm**2), 633*nm)", "a plane wave has no end"),
        ("mode.radial(0, 633*nm)", "a sampled mode has no radial form"),
    ],
)
def test_refusals(refuses, code, text):
    refuses(code, text, mode=SampledMode(np.ones((8, 8)), PIXEL))
