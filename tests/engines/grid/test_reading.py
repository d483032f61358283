"""Watts per pixel and the field at any place, from samples."""

import numpy as np
import pytest
from scipy.special import erf

from fastaxis.engines.field import CLEAN
from fastaxis.engines.grid import reading
from fastaxis.engines.grid.interpolant import value_matrix
from fastaxis.engines.grid.light import GridLight, axis
from fastaxis.engines.grid.reading import GridField
from fastaxis.light import Raster, stokes

COUNT, PITCH, WAVELENGTH, W = 128, 0.1e-3, 500e-9, 0.9e-3


def gaussian(x0=0.0, y0=0.0, curvature=0.0, jones=(1, 0)):
    x = axis(COUNT, PITCH)
    samples = np.exp(-((x[None] - x0) ** 2 + (x[:, None] - y0) ** 2) / W**2).astype(complex)[None]
    return GridField(GridLight(samples, np.array(jones, dtype=complex), PITCH, curvature, WAVELENGTH), CLEAN)


def two_states():
    x = axis(COUNT, PITCH)
    one = np.exp(-((x[None] - 0.4e-3) ** 2 + x[:, None] ** 2) / W**2)
    two = np.exp(-(x[None] ** 2 + (x[:, None] + 0.3e-3) ** 2) / W**2) * np.exp(2j * np.pi * 300 * x[None])
    return GridField(GridLight(np.stack([one + 0j, two]), None, PITCH, 0.2, WAVELENGTH), CLEAN)


def shares(edges, x0):
    """Integral of exp(-2 (x - x0)^2/w^2) between edges."""
    return np.diff(W * np.sqrt(np.pi / 8) * erf(np.sqrt(2) * (edges - x0) / W))


@pytest.mark.parametrize("pixel", [7e-6, 0.1e-3, 0.37e-3, 1.3e-3])
def test_pixels_of_any_size_hold_the_integral_of_the_irradiance(pixel):
    raster = Raster(pixel, (5, 7), (0.2e-3, -0.1e-3))
    found = gaussian(0.3e-3, -0.2e-3, curvature=0.5).stokes_on(raster)
    rows, columns = (np.append(a - pixel / 2, a[-1] + pixel / 2) for a in (raster.y, raster.x))
    right = np.outer(shares(rows, -0.2e-3), shares(columns, 0.3e-3))
    # The beam ends at exp(-7^2); 128 waves of rounding on a sum of order w^2.
    assert np.allclose(found[0], right, atol=1e-14 * W**2)
    assert np.array_equal(found[0], found[1])  # H


def test_a_beam_on_one_pixel_is_its_power():
    for field in (gaussian(0.1e-3), two_states()):
        assert field.stokes_on(Raster(20e-3, (1, 1)))[0, 0, 0] == pytest.approx(field.power, rel=1e-12)


def test_pixels_tile_the_power():
    field = two_states()
    assert field.stokes_on(Raster(1e-3, (13, 13)))[0].sum() == pytest.approx(field.power, rel=1e-12)


def test_pixels_outside_the_window_are_dark():
    raster = Raster(1e-3, (1, 1), (30e-3, 0.0))
    assert gaussian().stokes_on(raster)[0, 0, 0] == 0
    assert not gaussian().at(np.array([30e-3]), np.array([0.0])).any()


def test_all_four_stokes_images_of_mixed_light_are_those_of_the_field():
    field, raster = two_states(), Raster(4e-6, (6, 5), (0.1e-3, 0.05e-3))
    # A pixel of 4 um against 300 fringes a metre and a beam of 0.9 mm: the middle stands for the mean to
    # (4 um/0.9 mm)^2 = 2e-5.
    middle = stokes(field.at(raster.x, raster.y)) * raster.pitch**2
    assert np.allclose(field.stokes_on(raster), middle, rtol=0, atol=3e-5 * abs(middle).max())


def test_a_constant_and_a_checkerboard_are_kept():
    """The lowest and the highest wave of the samples, where halving and shifting could go wrong."""
    ones = np.ones((1, 16, 16), complex)
    for samples in (ones, ones * (-1.0) ** np.arange(16), ones * (-1.0) ** np.add.outer(np.arange(16), np.arange(16))):
        field = GridField(GridLight(samples, np.array([1, 0j]), 1e-3, 0.0, WAVELENGTH), CLEAN)
        x = axis(16, 1e-3)
        assert np.allclose(field.at(x, x)[0], samples[0], atol=1e-14)
        total = field.stokes_on(Raster(16e-3, (1, 1)))[0, 0, 0]
        # A cosine at the highest frequency carries half the mean square of its samples per axis it runs along.
        halved = 0.5 ** sum(np.ptp(samples[0].real, axis=a).any() for a in (0, 1))
        assert total == pytest.approx(field.power * halved, rel=1e-13)


def test_the_field_between_samples_is_the_field():
    field = gaussian(0.3e-3, -0.2e-3, curvature=0.7, jones=(0.6, 0.8j))
    x, y = np.linspace(-1e-3, 1e-3, 9), np.linspace(-0.7e-3, 1.2e-3, 5)
    r2 = x[None] ** 2 + y[:, None] ** 2
    shape = np.exp(-((x[None] - 0.3e-3) ** 2 + (y[:, None] + 0.2e-3) ** 2) / W**2 + 1j * np.pi / WAVELENGTH * 0.7 * r2)
    assert np.allclose(field.at(x, y), np.array([0.6, 0.8j])[:, None, None] * shape, atol=1e-13)


def test_matrices_are_the_sums_of_waves_they_stand_for(integral_matrix):
    count, pitch = 10, 0.3
    x = axis(count, pitch)
    m = np.arange(1, 4)[:, None]
    waves = np.cos(2 * np.pi * m * x / (count * pitch) + 0.3)
    places = np.array([0.11, -1.2, 0.4])
    assert np.allclose(value_matrix(places, count, pitch) @ waves.T, np.cos(2 * np.pi * m * places / 3 + 0.3).T)
    edges = np.array([-0.5, 0.1, 0.7])
    right = np.diff(np.sin(2 * np.pi * m * edges / 3 + 0.3) * 3 / (2 * np.pi * m), axis=1)
    assert np.allclose(integral_matrix(edges, count, pitch) @ waves.T, right.T)


def test_places_on_samples_and_a_hair_beside_them():
    count, pitch = 16, 0.1e-3
    x = axis(count, pitch)
    # On a sample a place may be a rounding beside it, and so is what it takes of the neighbours.
    assert np.allclose(value_matrix(x, count, pitch), np.eye(count), rtol=0, atol=2e-15)
    hair = 1e-9 * pitch
    # The slope of the curve of one sample at another is at most pi a sample.
    assert np.allclose(value_matrix(x + hair, count, pitch)[:-1], np.eye(count)[:-1], rtol=0, atol=np.pi * 1e-9)
    # The window's two ends are one place, half a sample beyond the first and the last.
    ends = value_matrix(np.array([-8, 8]) * pitch, count, pitch)
    assert np.allclose(ends[0], ends[1], rtol=0, atol=2e-15)
    assert ends.sum(axis=1) == pytest.approx(1)
    assert not value_matrix(np.array([8.001 * pitch]), count, pitch).any()


@pytest.mark.parametrize("pixel", [5e-6, 30e-6, 0.15e-3])
def test_reading_near_a_small_camera_is_reading_from_the_whole_window(pixel, monkeypatch):
    rng = np.random.default_rng(3)
    x = axis(COUNT, PITCH)
    # Noise up to the highest frequency: the worst a window can hold.
    noise = rng.normal(size=(2, COUNT, COUNT)) + 1j * rng.normal(size=(2, COUNT, COUNT))
    field = GridField(
        GridLight(noise * np.exp(-(x[None] ** 2 + x[:, None] ** 2) / 4e-6), None, PITCH, 0.3, WAVELENGTH), CLEAN
    )
    raster = Raster(pixel, (9, 12), (0.3e-3, -0.2e-3))
    near = field.stokes_on(raster)
    monkeypatch.setattr(reading, "nearby", lambda *_: None)
    whole = field.stokes_on(raster)
    # The kernel's own 2e-14, on four Stokes images of two axes and a thousand waves.
    assert np.allclose(near, whole, atol=2e-12 * whole[0].max())
    assert abs(near - whole).max() > 0  # both ways were really taken
