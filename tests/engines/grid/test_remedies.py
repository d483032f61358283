"""Grids too coarse, too narrow or beside the light: told or refused, and the grid that the message names is a cure.

Held against the centred engine, which has no samples, or against the same light met on the axis: a thin wedge, a lens
beside the axis and a source beside it move a picture and do not change it.
"""

import math
import re
import warnings

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.errors import SamplingError, SamplingWarning
from fastaxis.units import mm, mrad, nm, um

PIXEL, SHAPE = 40 * um, (48, 48)
VISIBLE = 1e-3  # of the peak: what the messages promise to be about


def bench(*parts, waist=0.5 * mm, beside=0.0, at=0.0, mode=None, pixel=PIXEL):
    """A beam of 1 W that starts ``beside`` the axis, seen by a camera ``at`` a place along x."""
    laser = fa.Laser(mode=mode or fa.Gaussian(waist=waist, centre=(beside, 0.0)), power=1.0, name="laser")
    camera = fa.Camera(pixel=pixel, shape=SHAPE, centre=(at, 0.0), name="cam")
    return fa.Train(wavelength=633 * nm, name="Saltpan").along(laser, *parts, camera)


def told(train, grid, **options):
    """(Stokes images, None where refused; what was said)."""
    with warnings.catch_warnings(record=True) as caught:
        warnings.simplefilter("always", SamplingWarning)
        try:
            images = train.expose("cam", fa.H, grid=grid, engine="grid", **options).stokes
        except SamplingError as refusal:
            return None, [str(refusal)]
    return images, [str(one.message) for one in caught]


def exact(train):
    return train.expose("cam", fa.H, engine="azimuthal").stokes


def wrong(images, best):
    return abs(images - best).max() / best[0].max()


def named(said):
    """The largest grid of some messages."""
    found = re.findall(r"Grid\(samples=(\d+), window=([\d.e-]+)\)", " ".join(said))
    return max((fa.Grid(int(samples), float(window)) for samples, window in found), key=lambda grid: grid.samples)


# A bench, the same picture by light that stays on the axis, a grid that does not hold it.
AT_ONCE = {
    "pitch": (bench(fa.FreeSpace(0.1)), bench(fa.FreeSpace(0.1)), fa.Grid(32, 8 * mm)),
    "narrow": (bench(fa.FreeSpace(0.1)), bench(fa.FreeSpace(0.1)), fa.Grid(256, 2 * mm)),
    "narrower": (bench(fa.FreeSpace(0.1)), bench(fa.FreeSpace(0.1)), fa.Grid(256, 1.5 * mm)),
    "narrow after travel": (bench(fa.FreeSpace(3.0)), bench(fa.FreeSpace(3.0)), fa.Grid(256, 2.5 * mm)),
    "source near the edge": (
        bench(fa.FreeSpace(0.1), waist=0.3 * mm, beside=2.8 * mm, at=2.8 * mm),
        bench(fa.FreeSpace(0.1), waist=0.3 * mm),
        fa.Grid(512, 6 * mm),
    ),
    "source beyond the edge": (
        bench(fa.FreeSpace(0.1), waist=0.3 * mm, beside=3.5 * mm, at=3.5 * mm),
        bench(fa.FreeSpace(0.1), waist=0.3 * mm),
        fa.Grid(512, 6 * mm),
    ),
    "wedge at the band": (
        bench(fa.Wedge(x=27 * mrad), fa.FreeSpace(0.05), at=1.35 * mm),
        bench(fa.FreeSpace(0.05)),
        fa.Grid(512, 6 * mm),
    ),
    "wedge far beyond the band": (
        bench(fa.Wedge(x=60 * mrad), fa.FreeSpace(0.05), waist=0.2 * mm, at=3 * mm),
        bench(fa.FreeSpace(0.05), waist=0.2 * mm),
        fa.Grid(256, 3 * mm),
    ),
    "wedge not far beyond the band": (
        bench(fa.Wedge(x=35 * mrad), fa.FreeSpace(0.05), at=1.75 * mm),
        bench(fa.FreeSpace(0.05)),
        fa.Grid(512, 6 * mm),
    ),
    "lens further beside the axis": (
        bench(fa.Lens(focal=0.02, centre=(0.7 * mm, 0.0)), fa.FreeSpace(0.01), waist=0.2 * mm, at=0.35 * mm),
        bench(fa.Lens(focal=0.02), fa.FreeSpace(0.01), waist=0.2 * mm),
        fa.Grid(512, 6 * mm),
    ),
    "lens beside the axis": (
        bench(fa.Lens(focal=0.02, centre=(0.6 * mm, 0.0)), fa.FreeSpace(0.01), waist=0.2 * mm, at=0.3 * mm),
        bench(fa.Lens(focal=0.02), fa.FreeSpace(0.01), waist=0.2 * mm),
        fa.Grid(512, 6 * mm),
    ),
    "rings of a mode": (
        bench(fa.FreeSpace(0.3), mode=fa.LaguerreGauss(3, 2, 0.3 * mm)),
        bench(fa.FreeSpace(0.3), mode=fa.LaguerreGauss(3, 2, 0.3 * mm)),
        fa.Grid(40, 5 * mm),
    ),
}


@pytest.mark.parametrize("case", AT_ONCE)
def test_the_grid_that_is_named_cures_smooth_light_at_once(case):
    train, centred, grid = AT_ONCE[case]
    best = exact(centred)
    images, said = told(train, grid)
    assert said
    # Not all that is told is visible yet, but none of these is as good as what the cure gives.
    assert images is None or wrong(images, best) > 1e-5
    cured, left = told(train, named(said))
    assert not left
    # The tightest cure is twice a window of four radii: a Gaussian field ends there at exp(-16) = 1e-7.
    assert wrong(cured, best) < 1e-6


ROUGH = {
    "singularity": (bench(fa.SpiralPlate(charge=1), fa.FreeSpace(0.3)), fa.Grid(64, 6 * mm)),
    "q-plate": (bench(fa.QPlate(q=1, retardance=2.0), fa.FreeSpace(0.3)), fa.Grid(64, 6 * mm)),
    "q-plate, diverging lens": (bench(fa.QPlate(q=0.5), fa.Lens(focal=-0.3), fa.FreeSpace(0.2)), fa.Grid(128, 6 * mm)),
    "hole": (bench(fa.Aperture(radius=0.4 * mm), fa.FreeSpace(0.05)), fa.Grid(128, 4 * mm)),
    "hole on the way to a focus": (
        bench(fa.Aperture(radius=0.5 * mm), fa.Lens(focal=0.1), fa.FreeSpace(0.05)),
        fa.Grid(256, 4 * mm),
    ),
}


@pytest.mark.parametrize("case", ROUGH)
def test_grids_named_one_after_another_lead_to_a_right_picture(case):
    """How far slow tails reach is not known before they are met, so a cure may take a few steps, each of them better."""
    train, grid = ROUGH[case]
    best, errors = exact(train), []
    for _ in range(6):
        images, said = told(train, grid)
        errors.append(wrong(images, best) if images is not None else 1.0)
        if not said:
            break
        grid = named(said)
    assert not said and errors[0] > VISIBLE > errors[-1]


WIDER, FINER = True, False
# What is met behind an odd number of single transforms, where window and band have changed places: the light of a
# q-plate is too fine for its samples there, that of an edge too wide for the window.
TURNED = {
    "q-plate near a focus": (
        bench(
            fa.Aperture(radius=0.5 * mm), fa.Lens(focal=0.3), fa.FreeSpace(0.27), fa.QPlate(q=0.5), fa.FreeSpace(0.03)
        ),
        fa.Grid(512, 6 * mm),
        WIDER,
    ),
    "q-plate after travel": (
        bench(fa.FreeSpace(0.5), fa.QPlate(q=0.5), fa.FreeSpace(0.1)),
        fa.Grid(512, 6 * mm),
        WIDER,
    ),
    "edge in focus": (
        bench(fa.Lens(focal=0.3), fa.FreeSpace(0.3), mode=fa.FlatTop(radius=1 * mm), pixel=5 * um),
        fa.Grid(512, 8 * mm),
        FINER,
    ),
}


@pytest.mark.parametrize("case", TURNED)
def test_the_grid_that_is_named_is_better_also_where_window_and_band_have_changed_places(case):
    train, grid, wider = TURNED[case]
    best = exact(train)
    images, said = told(train, grid)
    better = named(said)
    assert better.samples > grid.samples
    assert (better.window > 1.3 * grid.window) == wider
    # Errors go at least as the pitch at the part that is badly sampled; so the other remedy would leave them alone.
    assert wrong(told(train, better)[0], best) < wrong(images, best) / 1.5


SMOOTH = [fa.Gaussian(waist=0.5 * mm), fa.LaguerreGauss(1, 1, 0.4 * mm)]
BEHIND = {
    "space": [fa.FreeSpace(0.2)],
    "focus": [fa.Lens(focal=0.3), fa.FreeSpace(0.3)],
    "singularity": [fa.SpiralPlate(charge=1), fa.FreeSpace(0.2)],
    "two plates": [fa.QPlate(q=0.5), fa.FreeSpace(0.2), fa.QPlate(q=0.5), fa.FreeSpace(0.2)],
}


@pytest.mark.parametrize("window", [2 * mm, 8 * mm])
@pytest.mark.parametrize("parts", BEHIND)
def test_what_is_visibly_wrong_is_told_whatever_the_grid(parts, window):
    seen = {True: 0, False: 0}
    for mode in SMOOTH:
        train = bench(*BEHIND[parts], mode=mode)
        best = exact(train)
        for samples in (32, 64, 128, 256):
            images, said = told(train, fa.Grid(samples, window))
            right = images is not None and wrong(images, best) < VISIBLE
            assert right or said, f"{mode}, {samples} samples"
            seen[right] += 1
    assert seen[False]  # some of these grids are too coarse or too narrow


@pytest.mark.parametrize("distance", [1.0, 10.0, 100.0])
def test_long_travel_does_not_come_round_the_edge(distance):
    """A beam that outgrows its first window by far: the samples grow with it."""
    width = 0.5 * mm * math.hypot(1, distance * 633 * nm / (math.pi * (0.5 * mm) ** 2))
    camera = fa.Camera(pixel=width / 8, shape=SHAPE, name="cam")
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=0.5 * mm, power=1.0), fa.FreeSpace(distance), camera)
    images, said = told(train, fa.Grid(256, 6 * mm))
    assert not said
    assert wrong(images, exact(train)) < 1e-11  # some hundred roundings of the transforms
    # The four middle pixels hold a quarter each of the power within w/8 of either axis.
    assert images[0].max() == pytest.approx((math.erf(math.sqrt(2) / 8) / 2) ** 2, rel=1e-11)


def test_pixels_beyond_the_window_are_dark_and_the_others_right():
    near = bench(fa.SpiralPlate(charge=1), fa.FreeSpace(0.2))
    wide = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm, power=1.0), fa.SpiralPlate(charge=1), fa.FreeSpace(0.2),
        fa.Camera(pixel=PIXEL, shape=(512, 512), name="cam"),
    )  # fmt: skip
    grid = fa.Grid(1024, 8 * mm)
    (images, said), (inner, _) = told(wide, grid), told(near, grid)
    assert not said
    # At the camera the window is wavelength distance / pitch = 16.2 mm wide: pixels 53 to 458 of 512.
    assert max(abs(images[:, :53]).max(), abs(images[:, :, 459:]).max()) < 1e-15 * images.max()
    assert np.allclose(images[:, 232:280, 232:280], inner, atol=1e-12 * inner.max())


@pytest.mark.parametrize("grid", [fa.Grid(32, 8 * mm), fa.Grid(256, 1.5 * mm), fa.Grid(256, 8 * mm)])
def test_single_precision_is_told_as_double_is(grid):
    train = bench(fa.FreeSpace(0.1))
    (one, said), (other, single) = told(train, grid), told(train, grid, precision="single")
    assert [bool(said), one is None] == [bool(single), other is None]
    # Six digits of either picture.
    assert one is None or wrong(other, one) < 2e-6
