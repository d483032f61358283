"""Watts per pixel, strip by strip."""

import numpy as np
import pytest

from fastaxis.engines.field import CLEAN
from fastaxis.engines.grid import workers
from fastaxis.engines.grid.far import FarField
from fastaxis.engines.grid.filled import filled
from fastaxis.engines.grid.light import GridLight
from fastaxis.engines.grid.reading import GridField
from fastaxis.laws import TravelLaw
from fastaxis.light import Raster, stokes

COUNT, PITCH = 96, 0.1e-3


def noise(share):
    """Two components that fill a share of the band of their samples."""
    rng = np.random.default_rng(5)
    spectrum = np.zeros((2, COUNT, COUNT), complex)
    order = np.abs(np.fft.fftfreq(COUNT, 1 / COUNT))
    lit = np.maximum.outer(order, order) < share * COUNT / 2
    spectrum[:, lit] = rng.normal(size=(2, lit.sum())) + 1j * rng.normal(size=(2, lit.sum()))
    return np.fft.ifft2(spectrum)


def by_matrices(samples, raster, integral_matrix):
    """Irradiance on four times as many samples by zeros in the spectrum; then the whole window for every pixel."""
    wide = np.zeros((2, 4 * COUNT, 4 * COUNT), complex)
    low, high = slice(0, COUNT // 2), slice(-COUNT // 2, None)
    spectrum = np.fft.fft2(samples)
    shift = np.exp(2j * np.pi * (1 / 8 - 1 / 2) / COUNT * np.fft.fftfreq(4 * COUNT, 1 / (4 * COUNT)))
    for rows in (low, high):
        for columns in (low, high):
            wide[:, rows, columns] = spectrum[:, rows, columns]
    field = np.fft.ifft2(wide * np.multiply.outer(shift, shift)) * 16
    sides = zip((raster.y, raster.x), strict=False), raster.pitch / 2
    edges = [np.append(a - sides[1], a[-1] + sides[1]) for (a,) in sides[0]]
    down, across = (integral_matrix(edge, 4 * COUNT, PITCH / 4) for edge in edges)
    return down @ stokes(field) @ across.T


@pytest.mark.parametrize(("share", "parts"), [(0.3, 1), (0.7, 2), (0.95, 3)])
@pytest.mark.parametrize("raster", [Raster(0.07e-3, (90, 70), (1e-3, 0.2e-3)), Raster(0.4e-3, (25, 30))])
def test_any_share_of_the_band_is_collected_exactly(integral_matrix, share, parts, raster, monkeypatch):
    monkeypatch.setattr(workers, "ALONE", 0)
    monkeypatch.setattr(workers, "STRIP", 7 * COUNT)
    monkeypatch.setattr("fastaxis.engines.grid.reading.nearby", lambda *_: None)
    field = GridField(GridLight(noise(share), None, PITCH, 0.0, 633e-9), CLEAN)
    assert field.collected_by(raster).parts == parts
    right = by_matrices(field.light.samples, raster, integral_matrix)
    # Sums of 1e2 terms a side, and the kernel's 2e-14 on each side.
    assert np.allclose(field.stokes_on(raster), right, rtol=0, atol=1e-12 * right[0].max())


@pytest.mark.parametrize(("share", "kind", "error"), [(0.7, complex, 1e-12), (0.95, complex, 1e-12), (1.1, complex, 1e-12),
                                                      (0.7, np.complex64, 1e-5)])  # fmt: skip
@pytest.mark.parametrize("raster", [Raster(0.07e-3, (90, 70), (1e-3, 0.2e-3)), Raster(0.4e-3, (25, 30))])
def test_row_by_row_it_is_the_same(integral_matrix, share, kind, error, raster, monkeypatch):
    """Also where the highest wave is lit, which both signs share; in single precision a hundred roundings of 6e-8."""
    monkeypatch.setattr("fastaxis.engines.grid.reading.nearby", lambda *_: None)
    field = GridField(GridLight(noise(share).astype(kind), None, PITCH, 0.0, 633e-9), CLEAN)
    found, right = field._by_rows(raster), by_matrices(field.light.samples.astype(complex), raster, integral_matrix)
    assert found.dtype == field.light.samples.real.dtype
    if share < 1:  # by matrices the shared wave counts with one sign only
        assert np.allclose(found, right, rtol=0, atol=error * right[0].max())
    moved = field.collected_by(raster).stokes()
    assert np.allclose(found, moved, rtol=0, atol=error * right[0].max())
    monkeypatch.setattr("fastaxis.engines.grid.reading.ROOM", 0)
    assert field._by_rows(raster) is None


def test_what_the_light_fills_is_measured_on_its_waves():
    spectrum = np.fft.fft2(noise(0.5))
    assert filled(spectrum, np.fft.fftfreq(COUNT, 1 / COUNT)) == 48
    assert filled(np.zeros((1, 8, 8), complex), np.arange(8)) == 2


class Taken(dict):
    """Of one raster, in the moment when another thread has asked for a second one."""

    def __setitem__(self, key, value):
        super().__setitem__(key, value)
        self.clear()


def test_two_threads_may_look_at_one_field():
    raster = Raster(0.4e-3, (25, 30))
    field = GridField(GridLight(noise(0.3), None, PITCH, 0.0, 633e-9), CLEAN, _read=Taken())
    assert field.collected_by(raster).stokes().shape == (4, 25, 30)
    travel = TravelLaw(b=1.5, d=1.0)
    ahead = FarField(GridLight(noise(0.3), None, PITCH, 0.0, 633e-9, ahead=travel), CLEAN, _read=Taken())
    assert ahead.collected_by(raster, ahead.orders).stokes().shape == (4, 25, 30)
