"""Benches of a few parts."""

import pytest

from fastaxis.elements import Camera, Laser
from fastaxis.light import Gaussian, H
from fastaxis.train import Train
from fastaxis.units import mm, mW, nm, um


@pytest.fixture
def bench():
    """A train of a laser, some parts and a camera."""

    def build(*parts, mode=None, state=H, wavelength=633 * nm):
        laser = Laser(mode=mode or Gaussian(waist=0.5 * mm), power=2 * mW, state=state, name="laser")
        return Train(wavelength=wavelength).along(laser, *parts, Camera(pixel=10 * um, shape=(64, 64), name="cam"))

    return build
