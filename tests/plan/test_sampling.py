"""Room for light far off the axis or much turned: such a beam leaves window or band as a whole."""

import math
import re

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.errors import SamplingError
from fastaxis.light import Gaussian
from fastaxis.plan import Grid, make_plan
from fastaxis.plan.sampling import follow
from fastaxis.plan.spread import Spread
from fastaxis.units import mm, mrad, nm, um

WAVELENGTH = 633 * nm
GRID = Grid(512, 6 * mm)  # its band ends at 27.0 mrad


def bench(*parts, tilt=0.0, centre=0.0):
    laser = fa.Laser(mode=Gaussian(waist=0.5 * mm, centre=(centre, 0.0)), power=1.0)
    camera = fa.Camera(pixel=20 * um, shape=(8, 8), name="cam")
    return fa.Train(wavelength=WAVELENGTH).along(laser, *parts, fa.Wedge(x=tilt), fa.FreeSpace(50 * mm), camera)


SHAPED = {"smooth": [], "singular": [fa.SpiralPlate(charge=1)], "edged": [fa.Aperture(radius=1 * mm)]}


@pytest.mark.parametrize("tilt", [28 * mrad, 40 * mrad, 60 * mrad, 100 * mrad])
@pytest.mark.parametrize("shape", SHAPED)
def test_light_turned_out_of_the_band_is_refused(shape, tilt):
    """It would come in again at the other side of the band and go another way."""
    train = bench(*SHAPED[shape], tilt=tilt)
    with pytest.raises(SamplingError, match="pitch 11.7 um after .*wedge1; the light there needs") as refusal:
        make_plan(train, "cam", grid=GRID, engine="grid")
    make_plan(train, "cam", grid=_named(refusal), engine="grid")  # a warning here would be an error


def _named(refusal):
    samples, window = re.search(r"Grid\(samples=(\d+), window=([\d.]+)\)", str(refusal.value)).groups()
    return Grid(int(samples), float(window))


@pytest.mark.parametrize("shape", SHAPED)
def test_light_turned_further_than_any_grid_of_our_own_choice_holds_is_refused(shape):
    """The grid that is named then is larger than those taken unasked."""
    train = bench(*SHAPED[shape], tilt=150 * mrad)
    with pytest.raises(SamplingError) as refusal:
        make_plan(train, "cam", engine="grid")
    assert _named(refusal).samples > 4096
    make_plan(train, "cam", grid=_named(refusal), engine="grid")


@pytest.mark.parametrize("shape", SHAPED)
def test_light_turned_within_the_band_is_taken(shape):
    sampling = make_plan(bench(*SHAPED[shape], tilt=15 * mrad), "cam", grid=GRID, engine="grid").sampling
    assert sampling.worst.margin > 0.55


def test_margins_are_those_about_the_beam_itself():
    """Half a window of 3 mm, a beam 0.5 mm wide at 2 mm: 1 mm of the 6 radii it needs; 0.6 of it in the band."""
    # 2 rms are the radius w = 0.1 mm and the far angle wavelength/(pi w).
    spread = Spread(0.05 * mm, 0.0, WAVELENGTH / (4 * math.pi * 0.05 * mm), offset=(2 * mm, 0.0), slope=(0.0, -0.02))
    (plane,) = follow((), spread, GRID, WAVELENGTH)
    highest, spreads = 512 * WAVELENGTH / (2 * 6 * mm), 6 * WAVELENGTH / (math.pi * 0.1 * mm)
    assert plane.beside == pytest.approx((3 - 2) / 0.6)
    assert plane.leaning == pytest.approx((highest - 0.02) / spreads)
    assert plane.margin == pytest.approx(min(3 / 2.6, plane.leaning))


@settings(max_examples=50, deadline=None)
@given(st.floats(0.05, 1.0), st.floats(0, 4), st.floats(0, 0.05), st.sampled_from([64, 256, 1024]))
def test_what_is_held_is_held_however_far_off_the_axis(waist, off, slope, samples):
    """Margins about the beam and about the axis agree on 1, where nothing is missing."""
    size = waist * mm / 2
    spread = Spread(size, 0.0, WAVELENGTH / (4 * math.pi * size), offset=(off * mm, 0.0), slope=(slope, 0.0))
    (plane,) = follow((), spread, Grid(samples, 8 * mm), WAVELENGTH)
    assert (plane.margin >= 1) == (min(plane.room, plane.band) >= 1)


@pytest.mark.parametrize(("slope", "left"), [(0.01, math.inf), (0.03, 0.0)])
def test_a_plane_wave_needs_its_direction_in_the_band_and_nothing_else(slope, left):
    spread = Spread(math.inf, 0.0, 0.0, slope=(slope, 0.0))
    (plane,) = follow((), spread, GRID, WAVELENGTH)
    assert (plane.beside, plane.leaning) == (math.inf, left)
