"""A centred camera made on a quarter of its pixels, against the way that serves any camera."""

import math

import numpy as np
import pytest

from fastaxis.elements import Aperture, FreeSpace, HalfWavePlate, Lens, QPlate, Retarder, SpiralPlate
from fastaxis.engines.azimuthal import quarter, smooth
from fastaxis.engines.azimuthal.quarter import centred_images
from fastaxis.engines.azimuthal.rendering import corner
from fastaxis.engines.azimuthal.smooth import smooth_images
from fastaxis.engines.memory import forget_light
from fastaxis.light import Gaussian, HermiteGauss, LaguerreGauss, Raster, elliptical
from fastaxis.units import mm, nm, um

BEAM = Gaussian(waist=0.3 * mm)
STATE = elliptical(0.3, 0.4)
BEAM_BEHIND = 0.3 * mm * math.hypot(1, 0.1 * 632.8 * nm / (math.pi * (0.3 * mm) ** 2))
TRAINS = {
    "no turn": (BEAM, [FreeSpace(0.2)]),
    "one charge": (BEAM, [SpiralPlate(charge=3), FreeSpace(0.4)]),
    "even turns": (BEAM, [QPlate(q=0.5), FreeSpace(0.5), Retarder(fast=0.2, retardance=0.7)]),
    "odd turns": (BEAM, [QPlate(q=0.5, retardance=2.0), FreeSpace(0.5)]),
    "odd l, two shapes": (LaguerreGauss(1, 1, 0.3 * mm), [QPlate(q=1, retardance=1.0), FreeSpace(0.3)]),
    "negative q": (LaguerreGauss(0, -2, 0.3 * mm), [QPlate(q=-1.5, retardance=2.5), FreeSpace(0.3)]),
    "core": (BEAM, [QPlate(q=0.5, retardance=2.0)]),
    "core of even turns": (BEAM, [QPlate(q=1.0, offset=0.4)]),
    "many harmonics": (HermiteGauss(1, 2, 0.3 * mm), [Lens(focal=0.3), FreeSpace(0.2)]),
}


def both_ways(field, raster):
    arrival = field.out_to(corner(raster))
    shapes, table = field._shapes(arrival)
    ours = centred_images(table, shapes, arrival.orders, raster)
    return ours, smooth_images(table, arrival.profile, arrival.orders, raster)


@pytest.mark.parametrize("shape", [(40, 40), (41, 41), (40, 33), (1, 6), (3, 2)])
@pytest.mark.parametrize("name", TRAINS)
def test_a_quarter_mirrored_is_the_whole(arrive, monkeypatch, name, shape):
    monkeypatch.setattr(quarter, "MOST", 100)
    # Either way integrates pixels at a core until they change by less than this, on triangles of its own.
    for way in (quarter, smooth):
        monkeypatch.setattr(way, "SETTLED", 1e-14)
    mode, parts = TRAINS[name]
    field = arrive(mode, *parts, state=STATE)
    ours, whole = both_ways(field, Raster(20 * um, shape))
    assert abs(ours - whole).max() <= 1e-13 * whole[0].max()


def test_light_of_different_pictures_takes_the_general_way(arrive, monkeypatch):
    field = arrive(BEAM, QPlate(q=0.5, retardance=2.0), FreeSpace(0.5), state=STATE)
    raster = Raster(20 * um, (8, 8))
    assert both_ways(field, raster)[0] is not None
    monkeypatch.setattr(quarter, "MOST", 7)
    assert both_ways(field, raster)[0] is None


def test_a_hard_rim_takes_the_general_way(arrive):
    field = arrive(BEAM, Aperture(radius=0.2 * mm), state=STATE)
    ours, _ = both_ways(field, Raster(20 * um, (40, 40)))
    assert ours is None


def test_turning_a_plate_only_mixes_the_pictures_kept(arrive, monkeypatch):
    forget_light()
    raster, made = Raster(20 * um, (40, 40)), []
    means = quarter._means
    monkeypatch.setattr(quarter, "_means", lambda *asked: made.append(asked) or means(*asked))
    for fast in (0.1, 0.5):
        field = arrive(BEAM, HalfWavePlate(fast=fast), QPlate(q=0.5), FreeSpace(0.5), state=STATE)
        images = field.stokes_on(raster)
        # Afresh, from the way that serves any camera.
        arrival = field.out_to(corner(raster))
        whole = smooth_images(field._table(arrival), arrival.profile, arrival.orders, raster)
        assert abs(images - whole).max() <= 1e-13 * whole[0].max()
    assert len(made) == 1


def test_the_whole_camera_adds_up_to_the_power(arrive):
    images = arrive(BEAM, HalfWavePlate(fast=0.2), FreeSpace(0.2), state=STATE).stokes_on(Raster(40 * um, (100, 100)))
    assert images[0].sum() == pytest.approx(1.0, rel=1e-9)
    assert images[0].shape == (100, 100)


@pytest.mark.parametrize("pitch", [1 * mm, 5 * mm, 20 * mm])
@pytest.mark.parametrize("shape", [(2, 2), (3, 3), (1, 2), (2, 3)])
def test_pixels_wider_than_the_light_hold_all_of_it(arrive, pitch, shape):
    images = arrive(BEAM, FreeSpace(0.1)).stokes_on(Raster(pitch, shape))
    ny, nx = shape
    middle = images[0][(ny - 1) // 2 : ny // 2 + 1, (nx - 1) // 2 : nx // 2 + 1]
    exact = [math.erf(math.sqrt(2) * (pitch / 2 if n % 2 else pitch) / BEAM_BEHIND) for n in shape]
    assert middle.sum() == pytest.approx(exact[0] * exact[1], rel=1e-10)
