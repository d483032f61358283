"""Benches whose light meets again."""

import pytest

import fastaxis as fa
from fastaxis.units import mm, nm


def wave(name="laser", state=fa.H, power=1.0, **values):
    return fa.Laser(mode=fa.PlaneWave(area=1e-6), power=power, state=state, name=name, **values)


def beam(name="laser", state=fa.H, power=1.0, **values):
    return fa.Laser(**{"waist": 1 * mm, "power": power, "state": state, "name": name, **values})


@pytest.fixture
def mach_zehnder():
    def make(laser=None, arm=(), other=(), reflectance=0.5):
        train = fa.Train(wavelength=632.8 * nm, name="two arms").along(
            laser or beam(), fa.BeamSplitter(reflectance=reflectance, name="in"), fa.PhaseShift(phase=0.0, name="phase"),
            *arm, fa.Mirror(name="m1"), fa.BeamSplitter(reflectance=reflectance, name="out"),
        )  # fmt: skip
        return train.along("in.reflected", fa.Mirror(name="m2"), *other, "out.side")

    return make
