"""Benches with many knobs."""

import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import normal, uniform
from fastaxis.units import deg, mm, mW, nm, um


@pytest.fixture(scope="module")
def many():
    """Twelve knobs on a centred train with a q-plate between uniform plates."""
    return fa.Train(wavelength=532 * nm, name="Cinder Lane").along(
        fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=10 * deg, name="hwp"),
        fa.QuarterWavePlate(fast=20 * deg, name="q1"),
        fa.QPlate(q=0.5, offset=4 * deg, retardance=170 * deg, name="qp"),
        fa.HalfWavePlate(fast=3 * deg, name="h2"),
        fa.QuarterWavePlate(fast=40 * deg, name="q2"),
        fa.Polarizer(axis=0 * deg, extinction=1e3, name="pol"),
        fa.FreeSpace(300 * mm, name="space"),
        fa.Camera(pixel=60 * um, shape=(32, 32), name="cam"),
    )


@pytest.fixture(scope="module")
def twelve():
    names = [
        "hwp.fast", "hwp.retardance", "q1.fast", "q1.retardance", "qp.offset", "qp.retardance", "h2.fast",
        "h2.retardance", "q2.fast", "q2.retardance", "pol.axis",
    ]  # fmt: skip
    return {**{name: normal(1 * deg) for name in names}, "pol.extinction": uniform(100.0)}


@pytest.fixture(scope="module")
def malus():
    """A polarizer behind H: the power is P cos^2(axis)."""
    return fa.Train(wavelength=633 * nm, name="Marram").along(
        fa.Laser(waist=1 * mm, power=1.0, state=fa.H, name="laser"),
        fa.Polarizer(axis=30 * deg, name="pol"),
        fa.Detector(name="meter"),
    )
