"""Benches of a few parts, asked in one call."""

import pytest

from fastaxis.elements import Camera, Laser
from fastaxis.engines import propagate
from fastaxis.engines.memory import forget_light
from fastaxis.light import H
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import nm, um


@pytest.fixture(autouse=True)
def nothing_remembered():
    """What a test works out is its own."""
    forget_light()


@pytest.fixture
def bench():
    """A train of a laser, some parts and a camera."""

    def build(mode, *parts, state=H, wavelength=632.8 * nm, power=1.0, beam=None):
        shape = {"beam": beam} if beam else {"mode": mode, "state": state}
        laser = Laser(power=power, name="laser", **shape)
        return Train(wavelength=wavelength).along(laser, *parts, Camera(pixel=10 * um, shape=(64, 64), name="cam"))

    return build


@pytest.fixture
def arrive(bench):
    """The light of a mode behind some parts, as one plane field."""

    def run(mode, *parts, grid=None, engine="grid", **options):
        (field,) = propagate(make_plan(bench(mode, *parts, **options), "cam", grid=grid, engine=engine))
        return field

    return run
