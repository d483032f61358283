import gc
import weakref
from dataclasses import replace

import numpy as np
import pytest

from fastaxis.elements import Aperture, FreeSpace, HalfWavePlate, Lens, Mirror, Obstacle, Polarizer, QPlate, SpiralPlate
from fastaxis.light import FlatTop, Gaussian, H, LaguerreGauss, elliptical
from fastaxis.units import deg, mm

W = 0.5 * mm
BEAM = Gaussian(waist=W)

LOSSLESS = [
    [HalfWavePlate(fast=0.2), QPlate(q=0.5), FreeSpace(0.5), Lens(focal=0.4), FreeSpace(0.4)],
    [QPlate(q=1, retardance=2.0), FreeSpace(0.7), QPlate(q=-0.5), Mirror(), FreeSpace(0.2)],
    [SpiralPlate(charge=1), FreeSpace(0.01), SpiralPlate(charge=-2), FreeSpace(3.0)],
]


@pytest.mark.parametrize("parts", LOSSLESS)
def test_lossless_trains_keep_the_power(arrive, parts):
    field = arrive(BEAM, *parts, state=elliptical(0.3, 0.4), power=0.5)
    assert field.power == pytest.approx(0.5, rel=1e-12)
    assert field.total_stokes[0] == pytest.approx(0.5, rel=1e-12)


def test_what_arrives_is_what_left(arrive):
    """Quadrature in the target's plane, not the power counted before: a smooth beam arrives whole."""
    field = arrive(LaguerreGauss(1, 2, W), Lens(focal=0.4), FreeSpace(0.33))
    assert field.out_to(3 * mm).profile.powers().sum() == pytest.approx(1.0, rel=1e-12)


def test_malus_and_the_circular_share(arrive):
    field = arrive(BEAM, Polarizer(axis=0.4), FreeSpace(0.2), state=H)
    s0, s1, s2, s3 = field.total_stokes
    assert s0 == pytest.approx(np.cos(0.4) ** 2, rel=1e-12)
    assert (s1 / s0, s2 / s0, s3 / s0) == pytest.approx((np.cos(0.8), np.sin(0.8), 0), abs=1e-12)


def test_a_hole_passes_its_share(arrive):
    hole = arrive(BEAM, Aperture(radius=0.3 * mm), FreeSpace(0.2))
    assert hole.power == pytest.approx(1 - np.exp(-2 * 0.36), rel=1e-12)
    disc = arrive(BEAM, Obstacle(radius=0.3 * mm), FreeSpace(0.2))
    assert disc.power == pytest.approx(np.exp(-2 * 0.36), rel=1e-12)


def test_a_disc_of_light_through_its_own_hole_loses_nothing(arrive):
    assert arrive(FlatTop(radius=1 * mm), Aperture(radius=1 * mm), FreeSpace(0.1)).power == pytest.approx(1, rel=1e-12)


def test_the_unconverted_share_of_a_detuned_plate_stays_in_its_hand(arrive):
    """cos^2(85 deg) = 0.76 %: l = 0 in the old hand, the rest with l = 1 in the other."""
    from fastaxis.light import L

    field = arrive(BEAM, QPlate(q=0.5, retardance=170 * deg), FreeSpace(0.1), state=L)
    powers = dict(zip(field.harmonics.orders, field.harmonics.profile.powers(), strict=True))
    assert powers == pytest.approx({(0, 0): np.cos(85 * deg) ** 2, (1, 1): np.sin(85 * deg) ** 2}, rel=1e-12)


def test_the_axis_alone(arrive):
    field = arrive(BEAM, FreeSpace(0.3))
    on_axis = field.at(np.zeros(1), np.zeros(1))[:, 0, 0]
    rayleigh = np.pi * W**2 / field.wavelength
    assert abs(on_axis[0]) == pytest.approx(np.sqrt(2 / np.pi) / W / np.hypot(1, 0.3 / rayleigh), rel=1e-12)
    assert on_axis[1] == pytest.approx(0, abs=1e-9)


def test_the_guard_names_light_outside_a_cut(arrive):
    whole = arrive(BEAM, SpiralPlate(charge=1), FreeSpace(1.0))
    cut = arrive(BEAM, SpiralPlate(charge=1), FreeSpace(1.0), SpiralPlate(charge=1), FreeSpace(1.0))
    assert whole.guard.discarded == 0
    assert 0 < cut.guard.discarded < 1e-3
    assert cut.power == pytest.approx(1, rel=1e-12)


@pytest.mark.parametrize("rows", [1, 2, 7, 8])
@pytest.mark.parametrize("shift", [0.0, 0.1 * mm])
def test_strips_are_the_whole(arrive, monkeypatch, rows, shift):
    from fastaxis.engines.azimuthal import rendering

    field = arrive(BEAM, QPlate(q=0.5, retardance=2.0), FreeSpace(0.3), state=elliptical(0.3, 0.4))
    x, y = np.linspace(-1, 1, 5) * mm, (np.arange(rows) - (rows - 1) / 2) * 0.2 * mm + shift
    whole = field.at(x, y)
    each = np.concatenate([field.at(x, y[i : i + 1]) for i in range(rows)], axis=1)
    # Radii, and with them places in the tables, may differ by a rounding; the field is settled to 1e-13.
    assert abs(whole - each).max() < 1e-12 * abs(whole).max()
    monkeypatch.setattr(rendering, "PLACES", 10)
    assert abs(field.at(x, y) - whole).max() < 1e-14 * abs(whole).max()


def test_threads_that_ask_at_once_read_tables_of_their_own_light(arrive):
    """A table goes by the identity of its light, which therefore has to live as long."""
    field = arrive(Gaussian(waist=0.3 * mm), FreeSpace(0.2))
    lost = replace(field.out_to(1 * mm))
    field._table(lost)
    light = weakref.ref(lost)
    del lost
    gc.collect()
    assert light() is not None
