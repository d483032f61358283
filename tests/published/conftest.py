"""Light at a camera, by the grid engine."""

import numpy as np
import pytest

from fastaxis.elements import Camera, Laser
from fastaxis.engines import propagate
from fastaxis.light import H
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import nm, um


@pytest.fixture(scope="session")
def arrive():
    """The field behind some parts, from a mode of 1 W."""
    return _arrive


def _arrive(mode, *parts, wavelength=632.8 * nm, grid=None):
    laser = Laser(mode=mode, power=1.0, state=H, name="laser")
    camera = Camera(pixel=10 * um, shape=(64, 64), name="cam")
    train = Train(wavelength=wavelength).along(laser, *parts, camera)
    (field,) = propagate(make_plan(train, "cam", grid=grid, engine="grid"))
    return field


@pytest.fixture(scope="session")
def peak_near():
    """Place and height of the largest irradiance along x within a width of a guess."""
    return _peak_near


def _peak_near(field, guess, width):
    x = np.linspace(guess - width, guess + width, 2001)
    values = np.sum(abs(field.at(x, np.array([0.0]))) ** 2, axis=0)[0]
    return x[values.argmax()], values.max()
