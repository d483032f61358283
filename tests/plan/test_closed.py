"""Which arms keep the shape of their light, and what is left of their steps."""

import pytest

import fastaxis as fa
from fastaxis.plan.closed import closed
from fastaxis.plan.displacement import Displacement
from fastaxis.plan.making import unfused
from fastaxis.units import deg, mm, mrad, nm


def kept(*parts, **laser):
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(**laser or {"waist": 1 * mm}), *parts, fa.Detector(name="end"))
    return closed(unfused(train, "end").branches)


def displacement(*parts, **laser):
    (arm,) = kept(*parts, **laser)
    assert arm.engine == "modes"
    found = [step.law for step in arm.steps if isinstance(step.law, Displacement)]
    return found[0] if found else None


def test_a_wedge_is_a_tilt_that_travels_on():
    assert displacement(fa.Wedge(x=1 * mrad, y=-2 * mrad), fa.FreeSpace(0.5)) == Displacement(
        (0.5 * mm, -1 * mm), (1 * mrad, -2 * mrad)
    )
    assert displacement(fa.FreeSpace(0.5), fa.Lens(focal=2.0), fa.HalfWavePlate(fast=10 * deg)) is None


def test_a_lens_beside_the_axis_tilts():
    found = displacement(fa.Lens(focal=0.5, centre=(1 * mm, 0.0)))
    assert (found.offset, found.tilt) == ((0.0, 0.0), pytest.approx((2 * mrad, 0.0)))
    assert found.path == pytest.approx(-((1 * mm) ** 2) / 2 / 0.5)


def test_a_mirror_turns_the_tilt_round():
    assert displacement(fa.Wedge(x=1 * mrad, y=2 * mrad), fa.Mirror()).tilt == (-1 * mrad, 2 * mrad)


def test_a_beam_beside_the_axis_keeps_its_shape():
    assert kept(fa.FreeSpace(0.5), mode=fa.Gaussian(waist=1 * mm, centre=(1 * mm, 0.0)))[0].engine == "modes"


@pytest.mark.parametrize(
    "part", [fa.Aperture(radius=1 * mm), fa.SpiralPlate(charge=1), fa.QPlate(q=0.5), fa.Slit(width=1 * mm)]
)
def test_parts_that_give_light_a_shape_are_for_other_engines(part):
    assert kept(fa.Wedge(x=1 * mrad), part) is None


def test_beams_that_are_no_modes_are_for_other_engines():
    assert kept(fa.Wedge(x=1 * mrad), mode=fa.FlatTop(radius=1 * mm)) is None
