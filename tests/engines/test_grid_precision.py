"""Samples of single precision: half the memory, six digits."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines import propagate
from fastaxis.errors import ParameterError
from fastaxis.plan import make_plan
from fastaxis.units import deg, mm, nm, um

# Samples set by hand on purpose coarser than edges and vortices want; that they are is said, and tested elsewhere.
coarse = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


def bench(*more):
    return fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=0.6 * mm, power=2e-3, state=fa.H),
        fa.HalfWavePlate(fast=11 * deg),
        fa.FreeSpace(200 * mm),
        fa.QPlate(q=0.5, centre=(0.2 * mm, -0.1 * mm), name="qp"),
        fa.Aperture(radius=1.5 * mm, name="stop"),
        fa.SpiralPlate(charge=2, centre=(0.1 * mm, 0.0)),
        fa.FreeSpace(300 * mm),
        *more,
        fa.Camera(pixel=12 * um, shape=(128, 96), name="cam"),
    )


GRID = fa.Grid(samples=512, window=10 * mm)


@pytest.mark.parametrize("more", [(), (fa.QuarterWavePlate(fast=30 * deg),), (fa.Polarizer(axis=20 * deg),)])
@coarse
def test_frames_of_single_precision_are_right_to_six_digits(more):
    exact, single = (
        bench(*more).expose("cam", fa.SIX_STATES, grid=GRID, precision=name) for name in ("double", "single")
    )
    assert exact.stokes.dtype == np.float64 and single.stokes.dtype == single.frames.dtype == np.float32
    # Some ten products and transforms of log2(512) sums each, rounded to 6e-8 and adding up as their root: 1e-6.
    assert abs(exact.frames - single.frames).max() < 2e-6 * exact.frames.max()
    assert abs(exact.frames - single.frames).max() > 0
    assert "single precision" in single.plan and "precision" not in exact.plan


@coarse
def test_samples_stay_small_on_the_whole_way():
    plan = make_plan(bench(), "cam", grid=GRID).with_precision("single")
    (field,) = propagate(plan)
    assert field.light.samples.dtype == np.complex64
    assert field.power == pytest.approx(propagate(make_plan(bench(), "cam", grid=GRID))[0].power, rel=2e-6)


def test_engines_without_samples_take_no_notice():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm), fa.Camera(pixel=9 * um, shape=(9, 9), name="cam")
    )
    one, other = (train.expose("cam", fa.H, engine="azimuthal", precision=name) for name in ("double", "single"))
    assert np.array_equal(one.stokes, other.stokes)


def test_another_precision_is_refused():
    with pytest.raises(ParameterError, match=r"precision = 'half'.*precision=\"single\""):
        bench().expose("cam", fa.H, grid=GRID, precision="half")
