"""Letters and short trains shared by the tests of forms."""

import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic import derive

_NAMES = "alpha beta delta epsilon theta q"


@pytest.fixture
def letters():
    return sp.symbols(_NAMES, real=True)


@pytest.fixture
def bench():
    """bench(part, ..., state=fa.H, laser=...) -> the train from a laser to a camera called cam."""

    def make(*parts, state=fa.H, laser=None, wavelength=532e-9):
        train = fa.Train(wavelength=wavelength)
        laser = laser or fa.Laser(waist=0.8e-3, state=state, power=1.0)
        train.along(laser, *parts, fa.Camera(pixel=5e-6, shape=(8, 8), name="cam"))
        return train

    return make


@pytest.fixture
def form(bench):
    def make(*parts, **options):
        return derive(bench(*parts, **options), "cam")

    return make
