"""Overlaps of harmonics, by a sum along the radius and by one over the plane."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.azimuthal import overlap
from fastaxis.units import mm


def light(*parts, state=fa.elliptical(0.2, 0.3)):
    laser = fa.Laser(waist=0.6 * mm, state=state, power=0.5)
    train = fa.Train(wavelength=633e-9).along(laser, *parts, fa.Camera(pixel=1e-5, shape=(9, 9), name="cam"))
    (field,) = train.field("cam", engine="azimuthal")
    return field


def test_holes_with_the_same_way_to_go_share_the_light_of_the_smaller():
    radius, plate = 0.4 * mm, 0.3
    one = light(fa.Aperture(radius=radius), fa.FreeSpace(0.3), state=fa.H)
    other = light(fa.Aperture(radius=0.8 * mm), fa.Polarizer(axis=plate), fa.FreeSpace(0.3), state=fa.H)
    found = overlap(one, other, 1 * mm)
    shared = 0.5 * (1 - np.exp(-2 * (radius / (0.6 * mm)) ** 2)) * np.cos(plate)
    # Panels of two holes, settled to 1e-13.
    assert found == pytest.approx(shared * np.array([[np.cos(plate), np.sin(plate)], [0, 0]]), abs=1e-13)
    assert not one._arrivals


OVERLAPS = {
    "a hole": (
        [fa.Aperture(radius=0.5 * mm), fa.FreeSpace(0.3), fa.HalfWavePlate(fast=0.2)],
        [fa.FreeSpace(0.4), fa.Lens(focal=2.0)],
    ),
    "spirals alike": (
        [fa.SpiralPlate(charge=1), fa.FreeSpace(0.3), fa.QuarterWavePlate(fast=0.3)],
        [fa.FreeSpace(0.2), fa.QPlate(q=0.5), fa.FreeSpace(0.1)],
    ),
}


@pytest.mark.parametrize("name", OVERLAPS)
def test_an_overlap_is_the_integral_over_the_plane(name):
    one, other = (light(*parts) for parts in OVERLAPS[name])
    x = (np.arange(1200) - 599.5) * 2.4 * mm / 600
    summed = np.einsum("myx,nyx->mn", one.at(x, x).conj(), other.at(x, x)) * (x[1] - x[0]) ** 2
    found = overlap(one, other, 3.4 * mm)
    assert abs(found).max() > 0.01
    # Beyond the square are tails of charges, and light has fallen to e^-16 there.
    assert abs(found - summed).max() < 1e-6
    assert overlap(other, one, 3.4 * mm) == pytest.approx(found.conj().T, rel=1e-9, abs=1e-14)


def test_charges_that_differ_do_not_overlap_and_take_no_travel():
    one, other = light(fa.SpiralPlate(charge=2), fa.FreeSpace(0.3)), light(fa.FreeSpace(0.1))
    assert abs(overlap(one, other, 1 * mm)).max() == 0
    assert not one._arrivals
