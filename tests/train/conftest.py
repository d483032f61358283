"""Benches that several tests of the train share."""

import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um


def laser(name="laser", **values):
    return fa.Laser(**{"waist": 0.80 * mm, "power": 5 * mW, "state": fa.H, "name": name, **values})


def camera(name="cam"):
    return fa.Camera(pixel=3.45 * um, shape=(16, 16), name=name)


@pytest.fixture
def line():
    """Cinder Lane: laser, half-wave plate, lens, camera."""
    return fa.Train(wavelength=532 * nm, name="Cinder Lane").along(
        laser(), fa.HalfWavePlate(fast=10 * deg, name="hwp"), fa.Lens(focal=500 * mm, name="lens"), camera()
    )


@pytest.fixture
def isolator():
    """Low Quay: a double pass through a quarter-wave plate sends the light out at the side of the splitter."""
    train = fa.Train(wavelength=632.8 * nm, name="Low Quay").along(
        laser(),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.Mirror(name="mirror"),
        "qwp.back",
    )
    return train.join("qwp.front", "pbs.transmitted").along("pbs.side", camera())


@pytest.fixture
def fork():
    """Gannet Stack: two arms between two splitters."""
    train = fa.Train(wavelength=632.8 * nm, name="Gannet Stack")
    train.along(laser(), fa.BeamSplitter(name="bs1"), fa.Mirror(name="m1"), fa.BeamSplitter(name="bs2"), camera())
    return train.along("bs1.reflected", fa.Mirror(name="m2"), "bs2.side")
