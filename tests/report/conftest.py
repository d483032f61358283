"""Exposures whose Stokes images are known in closed form, made without a train."""

import numpy as np
import pytest

from fastaxis.camera.exposure import Exposure
from fastaxis.camera.sets import SIX_STATES
from fastaxis.camera.settings import as_settings
from fastaxis.light.raster import Raster


def poincare_shots(settings=SIX_STATES, shape=(96, 128), pitch=25e-6, waist=0.6e-3, centre=(0.2e-3, 0.0), power=4e-3):
    """E_L = LG00, E_R = LG01 with charge +1, equal powers: S3 > 0 (R) outside r = waist/sqrt2."""
    raster = Raster(pitch, shape)
    x, y = np.meshgrid(raster.x - centre[0], raster.y - centre[1])
    ring = np.sqrt(2) * (x + 1j * y) / waist
    left = np.sqrt(2 / np.pi) / waist * np.exp(-(x**2 + y**2) / waist**2) * np.sqrt(power / 2)
    right = ring * left
    cross = left.conj() * right
    stokes = [abs(left) ** 2 + abs(right) ** 2, 2 * cross.real, 2 * cross.imag, abs(right) ** 2 - abs(left) ** 2]
    return exposure(np.stack(stokes) * pitch**2, raster, settings)


def exposure(stokes, raster, settings=SIX_STATES):
    return Exposure(
        stokes=stokes,
        settings=as_settings(settings),
        x=raster.x,
        y=raster.y,
        pixel=raster.pitch,
        wavelength=532e-9,
        name="Saltpan",
        target="cam",
    )


@pytest.fixture
def six_shots():
    return poincare_shots()


@pytest.fixture(name="poincare_shots")
def _poincare_shots():
    return poincare_shots


@pytest.fixture(name="exposure")
def _exposure():
    return exposure
