"""Which benches are round about their axis."""

import numpy as np
import pytest

from fastaxis.elements import (
    Aperture,
    FreeSpace,
    HalfWavePlate,
    Lens,
    Mirror,
    Mask,
    QPlate,
    RectangularAperture,
    SpiralPlate,
    Wedge,
)
from fastaxis.errors import ParameterError
from fastaxis.light import FlatTop, Gaussian, HermiteGauss, LaguerreGauss, PlaneWave, SampledMode
from fastaxis.plan import Grid, make_plan
from fastaxis.units import mm, mrad

ROUND = [
    [QPlate(q=0.5), FreeSpace(0.1), Lens(focal=0.3), Aperture(radius=1 * mm), FreeSpace(0.3)],
    [SpiralPlate(charge=2), Mirror(), FreeSpace(0.1)],
    [HalfWavePlate(fast=0.2)],
]
NOT_ROUND = [
    ([QPlate(q=0.5, centre=(0.1 * mm, 0), name="qp")], "qp is off the axis"),
    ([SpiralPlate(charge=1, centre=(0.1 * mm, 0), name="spp")], "spp is off the axis"),
    ([Aperture(radius=1 * mm, centre=(0.1 * mm, 0), name="ap")], "ap is off the axis"),
    ([Wedge(x=1 * mrad, name="wedge")], "wedge tilts the beam"),
    ([RectangularAperture(width=1 * mm, height=2 * mm, name="box")], "box has an edge that is not round"),
    ([Mask(phase=lambda x, y: 1e3 * x, name="mask")], "mask has a pattern"),
    ([Lens(focal=0.3, centre=(0.1 * mm, 0), name="lens")], "lens tilts the beam"),
]


@pytest.mark.parametrize("mode", [Gaussian(waist=0.5 * mm), LaguerreGauss(1, -2, 0.5 * mm), FlatTop(radius=1 * mm)])
@pytest.mark.parametrize("parts", ROUND)
def test_centred_round_parts_go_by_harmonics(bench, parts, mode):
    assert make_plan(bench(*parts, mode=mode), "cam").engine == "azimuthal"


@pytest.mark.parametrize(("parts", "reason"), NOT_ROUND)
def test_anything_else_goes_by_the_grid_and_says_why(bench, parts, reason):
    plan = make_plan(bench(*parts), "cam")
    assert (plan.engine, plan.reason) == ("grid", reason)


def test_modes_that_are_finite_sums_of_harmonics(bench):
    assert make_plan(bench(mode=HermiteGauss(2, 1, 0.5 * mm)), "cam").engine == "azimuthal"
    assert make_plan(bench(mode=Gaussian(waist=0.5 * mm, centre=(0.1 * mm, 0))), "cam").engine == "grid"
    assert make_plan(bench(mode=SampledMode(np.ones((8, 8)), pixel=0.1 * mm)), "cam").engine == "grid"


def test_a_plane_wave_needs_a_hole_first(bench):
    flat = PlaneWave(area=1 * mm**2)
    assert make_plan(bench(FreeSpace(0.1), Aperture(radius=1 * mm), mode=flat), "cam").engine == "azimuthal"
    assert make_plan(bench(QPlate(q=0.5), Aperture(radius=1 * mm), mode=flat), "cam").engine == "grid"


def test_a_grid_set_by_hand_is_used(bench):
    assert make_plan(bench(QPlate(q=0.5)), "cam", grid=Grid(256, 4 * mm)).engine == "grid"


def test_azimuthal_is_refused_off_the_axis(bench):
    train = bench(QPlate(q=0.5, centre=(0.1 * mm, 0), name="qp"))
    with pytest.raises(ParameterError, match=r"engine = 'azimuthal', but qp is off the axis; .*engine=\"grid\""):
        make_plan(train, "cam", engine="azimuthal")
