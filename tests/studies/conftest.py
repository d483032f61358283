"""Benches of three kinds of light, and the comparison with an exposure of each value for itself."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

# Both ways add the same some million roundings of 1e-16 in another order.
EXACT = 1e-12


def off_axis(**laser):
    light = laser or {"waist": 0.5 * mm, "state": fa.elliptical(10 * deg, 20 * deg)}
    return fa.Train(wavelength=633 * nm, name="Low Quay").along(
        fa.Laser(power=2 * mW, name="laser", **light),
        fa.QPlate(q=0.5, retardance=150 * deg, centre=(0.1 * mm, 0), name="qp"),
        fa.FreeSpace(distance=0.2, name="arm"),
        fa.HalfWavePlate(fast=20 * deg, name="hwp"),
        fa.Polarizer(axis=30 * deg, extinction=50, name="pol"),
        fa.QuarterWavePlate(fast=35 * deg, design=600 * nm, name="qwp"),
        fa.FreeSpace(distance=0.1, name="leg"),
        fa.QPlate(q=-0.5, retardance=100 * deg, name="second"),
        fa.FreeSpace(distance=0.1, name="end"),
        fa.Camera(pixel=60 * um, shape=(40, 48), orientation="mirrored, turned 180", name="cam"),
    )


@pytest.fixture
def bench_with():
    """Makes the bench with another laser."""
    return off_axis


@pytest.fixture
def bench():
    """Two q-plates, one beside the axis, and plates between: the grid engine."""
    return off_axis()


@pytest.fixture
def centred():
    """Everything on the axis: light about the axis."""
    return fa.Train(wavelength=633 * nm, name="Cinder Lane").along(
        fa.Laser(
            mode=fa.LaguerreGauss(0, 1, 0.5 * mm), power=2 * mW, state=fa.elliptical(10 * deg, 20 * deg), name="laser"
        ),
        fa.FreeSpace(distance=0.2, name="arm"),
        fa.QuarterWavePlate(fast=35 * deg, name="qwp"),
        fa.QPlate(q=0.5, retardance=100 * deg, name="qp"),
        fa.Aperture(radius=0.6 * mm, name="iris"),
        fa.FreeSpace(distance=0.1, name="leg"),
        fa.Camera(pixel=60 * um, shape=(40, 48), name="cam"),
    )


@pytest.fixture
def flat():
    """A plane wave through uniform plates: one Jones vector."""
    return fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=3 * mW, state=fa.elliptical(10 * deg, 20 * deg), name="laser"),
        fa.HalfWavePlate(fast=20 * deg, name="hwp"),
        fa.QuarterWavePlate(fast=35 * deg, name="qwp"),
        fa.Camera(pixel=60 * um, shape=(4, 5), name="cam"),
    )


@pytest.fixture
def compare():
    """Compares a sweep with an exposure of each of some values, frame by frame and power by power."""

    def run(train, values, *, settings=fa.SIX_STATES, target="cam", checked=4, zipped=False, **options):
        swept = train.sweep(values, target, settings, zipped=zipped, **options)
        picked = np.linspace(0, len(swept) - 1, checked).astype(int)
        for index in picked.tolist():
            shots = train.with_changes(swept.at(index)).expose(target, settings, **options)
            frames, powers = shots.frames, [shots.power(k) for k in range(len(shots))]
            peak, most = shots.stokes[0].max(), shots.total_power
            for k in range(len(shots)):
                np.testing.assert_allclose(swept.frame(index, k), frames[k], rtol=0, atol=EXACT * peak)
            np.testing.assert_allclose(swept.stokes(index), shots.stokes, rtol=0, atol=EXACT * peak)
            np.testing.assert_allclose(swept.powers[index], powers, rtol=0, atol=EXACT * most)
        return swept

    return run
