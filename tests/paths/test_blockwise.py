"""Pictures of tilted modes joined to harmonics: pixels against integrals of the field that was read, and against samples."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.joined import blockwise as room
from fastaxis.engines.joined.sight import sight
from fastaxis.light import Raster, stokes
from fastaxis.light.gauss import gauss_legendre
from fastaxis.units import deg, mm, mrad, um


def pixel_integrals(field, raster, rows, columns, nodes=12):
    """S0 .. S3 of some pixels, by a product rule inside each."""
    t, weights = gauss_legendre(nodes)
    x, y = ((p[:, np.newaxis] + t * raster.pitch / 2).ravel() for p in (raster.x[columns], raster.y[rows]))
    values = stokes(field.at(x, y)).reshape(4, len(rows), nodes, len(columns), nodes)
    return np.einsum("kiajb,a,b->kij", values, weights, weights) * raster.pitch**2 / 4


def blockwise(field, raster):
    seen = sight(field.arms, field.mixtures, 3 * mm)
    image = room.blockwise(seen, raster, field.extent.spreads)
    return None if image is None else seen.polarized(image)


ARMS = {
    "fork": [fa.SpiralPlate(charge=2), fa.FreeSpace(0.2)],
    "hole": [fa.Aperture(radius=0.4 * mm), fa.FreeSpace(0.1)],
    "vector": [fa.QPlate(q=0.5), fa.QuarterWavePlate(fast=20 * deg), fa.FreeSpace(0.3)],
}


@pytest.mark.parametrize("name", ARMS)
def test_pixels_hold_the_integral_of_what_is_there(mach_zehnder, name):
    train = mach_zehnder(arm=ARMS[name], other=[fa.Wedge(x=2 * mrad, y=0.5 * mrad), fa.FreeSpace(0.4)])
    (field,) = train.field("out.transmitted")
    assert set(field.engines) == {"azimuthal", "modes"}
    raster = Raster(20 * um, (90, 120), (0.1 * mm, -0.05 * mm))
    seen = blockwise(field, raster)
    # Out to another radius the harmonics are worked out on other panels.
    assert abs(seen - field.stokes_on(raster)).max() < 1e-11 * seen[0].max()
    rows, columns = np.array([0, 17, 44, 45, 89]), np.array([0, 31, 55, 60, 118])
    # Blocks are settled to 3e-12 of the peak on the lines that are tried, and their neighbours to a few times that.
    expected = pixel_integrals(field, raster, rows, columns)
    assert abs(seen[:, rows[:, None], columns] - expected).max() < 2e-11 * seen[0].max()


def test_a_narrow_beam_between_the_lines_is_not_overlooked(mach_zehnder):
    place = (0.83 * mm, -0.57 * mm)
    spot = fa.Laser(mode=fa.Gaussian(waist=0.05 * mm, centre=place), power=0.5, name="laser")
    train = mach_zehnder(spot, arm=[fa.Wedge(x=2 * mrad)])
    (arms,) = train.field("out.transmitted")
    raster = Raster(10 * um, (200, 200))
    seen = blockwise(arms, raster)
    assert seen[0].sum() == pytest.approx(arms.power, abs=1e-11)
    rows, columns = np.array([43, 42, 99]), np.array([183, 185, 99])
    expected = pixel_integrals(arms, raster, rows, columns)
    assert abs(seen[:, rows[:, None], columns] - expected).max() < 2e-11 * seen[0].max()


@pytest.mark.parametrize("part", [fa.Aperture(radius=0.4 * mm), fa.SpiralPlate(charge=2)])
def test_what_is_no_polynomial_is_read_in_another_way(mach_zehnder, part):
    train = mach_zehnder(arm=[part], other=[fa.Wedge(x=2 * mrad)])
    (field,) = train.field("out.transmitted")
    raster = Raster(50 * um, (120, 120))
    assert blockwise(field, raster) is None
    # A hard rim is seen as finely as places inside each pixel tell, some 1e-2 of a pixel that it cuts.
    assert field.stokes_on(raster)[0].sum() == pytest.approx(field.power, rel=1e-3)


def test_a_large_picture_is_read_in_parts(mach_zehnder, monkeypatch):
    (field,) = mach_zehnder(arm=ARMS["hole"], other=[fa.Wedge(x=2 * mrad)]).field("out.transmitted")
    raster = Raster(20 * um, (100, 90))
    whole = blockwise(field, raster)
    monkeypatch.setattr(room, "AT_ONCE", 10_000)
    # Rows that lose their mirror images are summed in another order.
    assert abs(blockwise(field, raster) - whole).max() < 1e-14 * whole[0].max()


ROUND = {
    "even": ([fa.SpiralPlate(charge=2), fa.FreeSpace(0.2)], [fa.Aperture(radius=0.5 * mm), fa.FreeSpace(0.1)]),
    "odd": ([fa.SpiralPlate(charge=2), fa.FreeSpace(0.2)], [fa.SpiralPlate(charge=-1), fa.FreeSpace(0.1)]),
    "vector": ([fa.QPlate(q=0.5), fa.FreeSpace(0.2)], [fa.HalfWavePlate(fast=0.2), fa.FreeSpace(0.1)]),
}


@pytest.mark.parametrize("name", ROUND)
def test_round_arms_look_the_same_after_half_a_turn_if_their_charges_are_alike(mach_zehnder, name):
    arm, other = ROUND[name]
    (field,) = mach_zehnder(arm=arm, other=other).field("out.transmitted")
    assert set(field.engines) == {"azimuthal"}
    raster = Raster(30 * um, (64, 80))
    image, harmonics = blockwise(field, raster), field._by_harmonics(raster)
    # The harmonics' own sum, which is read on panels of its own.
    assert abs(image - harmonics).max() < 1e-10 * image[0].max()
    turned = abs(image - image[:, ::-1, ::-1]).max() / image[0].max()
    assert turned == 0 if name == "even" else turned > 0.1


@pytest.mark.parametrize("power", [1e-24, 1e-16, 1e-8])
def test_a_dark_port_is_not_looked_at_for_ever(mach_zehnder, power, monkeypatch):
    """What two like holes leave at the dark port is roundings, or as much as a phase lets through."""
    parts = ([fa.FreeSpace(0.1), fa.FreeSpace(0.1)], [fa.FreeSpace(0.2)])
    hole = [fa.Aperture(radius=0.5 * mm), fa.FreeSpace(0.3)]
    train = mach_zehnder(arm=[*parts[0], *hole], other=[*parts[1], *hole])
    (field,) = train.with_changes({"phase.phase": 2 * np.sqrt(power)}).field("out.transmitted")
    seen, places = sight(field.arms, field.mixtures, 2 * mm), []
    monkeypatch.setattr(
        type(seen),
        "images",
        lambda self, x, y, images=type(seen).images: places.append(len(x) * len(y)) or images(self, x, y),
    )
    image = room.blockwise(seen, Raster(20 * um, (128, 128)), field.extent.spreads)
    assert sum(places) < 1e6
    assert image is not None
    # Both fields are right to 1e-13 of their peaks.
    expected = power * (1 - np.exp(-0.5))
    assert seen.polarized(image)[0].sum() == pytest.approx(expected, rel=0.05, abs=1e-24)


def test_fork_and_samples_agree(mach_zehnder):
    train = mach_zehnder(
        arm=[fa.SpiralPlate(charge=2), fa.FreeSpace(0.3)], other=[fa.FreeSpace(0.2), fa.Wedge(x=2 * mrad)]
    )
    train.along("out.transmitted", fa.FreeSpace(0.1), fa.Camera(pixel=25 * um, shape=(64, 64), name="cam"))
    quick, sampled = train.expose("cam", fa.H), train.expose("cam", fa.H, engine="grid")
    # Samples of light behind a singularity hold it to some 1e-5 of the peak.
    assert abs(quick.frame(0) - sampled.frame(0)).max() < 1e-4 * quick.frame(0).max()
