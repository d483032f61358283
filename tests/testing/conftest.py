"""Small benches for assertions, and a way to look at how one fails."""

import pytest

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mm, mW, nm, um


@pytest.fixture
def fails():
    """Run an assertion that must fail; gives the error."""

    def call(assertion, *arguments, **options):
        with pytest.raises(ft.BenchError) as caught:
            assertion(*arguments, **options)
        error = caught.value
        for part in (error.expected, error.got, error.cause):
            assert part in str(error)
        return error

    return call


@pytest.fixture(scope="module")
def line():
    """H through a half-wave plate at 45 deg onto a crossed polarizer."""
    return fa.Train(wavelength=633 * nm, name="Gannet").along(
        fa.Laser(waist=1 * mm, power=4 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=45 * deg, name="hwp"),
        fa.Polarizer(axis=0 * deg, extinction=1e5, name="pol"),
        fa.Detector(name="meter"),
    )


@pytest.fixture(scope="module")
def ring():
    """A radial beam on a small camera."""
    return fa.Train(wavelength=532 * nm, name="Saltpan").along(
        fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.QPlate(q=0.5, offset=0 * deg, name="qp"),
        fa.FreeSpace(500 * mm, name="space"),
        fa.Lens(focal=500 * mm, name="lens"),
        fa.FreeSpace(500 * mm),
        fa.Camera(pixel=8 * um, shape=(64, 64), name="cam"),
    )
