"""Modes on the samples of another arm: the same pictures as read place by place."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.joined.blockwise import blockwise
from fastaxis.engines.joined.sampled import on_samples
from fastaxis.engines.joined.sight import sight
from fastaxis.light import Raster
from fastaxis.units import deg, mm, mrad, um

# The slit is drawn too coarsely for a picture right to 1e-3, in all ways of reading its light alike.
pytestmark = pytest.mark.filterwarnings("ignore:pitch .* a picture:fastaxis.errors.SamplingWarning")

SLIT = [fa.FreeSpace(0.3), fa.Slit(width=0.5 * mm), fa.FreeSpace(0.1)]
WEDGE = fa.Wedge(x=1 * mrad, y=-0.5 * mrad)

OTHERS = {
    "tilted": [WEDGE, fa.FreeSpace(0.2)],
    "turned": [fa.HalfWavePlate(fast=20 * deg), WEDGE],
    "round": [fa.QuarterWavePlate(fast=20 * deg), fa.Lens(focal=5.0)],
}


def both(field, raster):
    parts = (field.arms, field.engines, field.mixtures, field.extent.spreads)
    image = blockwise(sight(field.arms, field.mixtures, 2 * mm), raster, field.extent.spreads)
    return on_samples(*parts, raster), sight(field.arms, field.mixtures, 2 * mm).polarized(image)


@pytest.mark.parametrize("name", OTHERS)
@pytest.mark.parametrize("line", [fa.Monochromatic(), fa.GaussianLine(coherence_length=0.2)])
def test_modes_on_samples_are_seen_as_place_by_place(mach_zehnder, name, line):
    train = mach_zehnder(arm=SLIT, other=OTHERS[name]).with_changes({"laser.line": line})
    (field,) = train.field("out.transmitted")
    assert set(field.engines) == {"grid", "modes"}
    seen, placed = both(field, Raster(25 * um, (90, 100), (0.1 * mm, 0.2 * mm)))
    # A camera is read off samples by a kernel that is good to 1e-10 of the peak or so.
    assert abs(seen - placed).max() < 1e-8 * placed[0].max()
    assert abs(seen[0] - seen[0].mean()).max() > 0.1 * placed[0].max()


def test_the_picture_of_an_exposure_is_read_this_way(mach_zehnder):
    train = mach_zehnder(arm=SLIT, other=OTHERS["tilted"])
    raster = Raster(25 * um, (64, 64))
    (field,) = train.field("out.transmitted")
    assert np.array_equal(field.stokes_on(raster), both(field, raster)[0])


@pytest.mark.parametrize(
    "other",
    [[fa.Wedge(x=40 * mrad)], [fa.Lens(focal=-0.02), fa.FreeSpace(0.2)], [fa.SpiralPlate(charge=1)]],
    ids=["too fine", "too wide", "no mode"],
)
def test_modes_that_do_not_fit_stay_where_they_are(mach_zehnder, other):
    (field,) = mach_zehnder(arm=SLIT, other=other).field("out.transmitted")
    parts = (field.arms, field.engines, field.mixtures, field.extent.spreads)
    assert on_samples(*parts, Raster(25 * um, (16, 16))) is None
