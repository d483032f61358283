"""Cinder Lane, a radial and azimuthal switch, from the laser to the lobes.

532 nm, w = 0.80 mm; half-wave plate, q-plate q = 1/2 of offset 0, lens f = 500 mm, camera of 3.45 um at its focus. The lobes follow from
the state behind the q-plate, linear at phi - 2 fast; the ring radius 89.4 um from the transform of a Gaussian with one turn of phase
(0.8442 times the focal radius of the Gaussian, independent calculation).
"""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.analysis import polarization_index, ring_radius, turning
from fastaxis.units import deg, mm, mW, nm, um

GRID = fa.Grid(samples=512, window=9.6 * mm)
ANALYZERS = [fa.linear(a * deg) for a in range(0, 180, 20)]
# The grid's promise for a phase singularity on 1024 samples a side.
SINGULAR = 1e-3


def bench(fast=0.0, retardance=180 * deg, behind=()):
    train = fa.Train(wavelength=532 * nm, name="Cinder Lane")
    train.along(
        fa.Laser(waist=0.80 * mm, power=5 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=fast, name="hwp"),
        fa.QPlate(q=0.5, offset=0 * deg, retardance=retardance, name="qp"),
        *behind,
        fa.FreeSpace(500 * mm),
        fa.Lens(focal=500 * mm),
        fa.FreeSpace(500 * mm),
        fa.Camera(pixel=3.45 * um, shape=(200, 200), name="cam"),
    )
    return train


@pytest.fixture(scope="module")
def radial():
    return bench().expose("cam", [*fa.SIX_STATES, *ANALYZERS], grid=GRID)


def test_the_ring_has_its_radius_at_the_focus(radial):
    # Three digits are stated.
    assert ring_radius(radial.stokes[0], x=radial.x, y=radial.y) == pytest.approx(89.4 * um, abs=0.05 * um)


@pytest.mark.parametrize(("label", "angle"), [("H", 0), ("V", 90), ("D", 45), ("A", 135)])
def test_a_radial_beam_has_its_two_lobes_along_the_analyzer(radial, label, angle):
    row = radial.table()[radial.labels.index(label)]
    assert row.lobes == 2
    off = (row.angle - angle * deg + np.pi / 2) % np.pi - np.pi / 2
    assert off == pytest.approx(0, abs=SINGULAR)


def test_circular_analyzers_see_round_rings(radial):
    rows = radial.table()
    assert [rows[k].lobes for k in (4, 5)] == [0, 0]


def test_the_lobes_turn_one_to_one_with_the_analyzer(radial):
    found = turning(radial)
    assert (found.rate, found.lobes) == (pytest.approx(1, abs=SINGULAR), 2)
    assert polarization_index(radial.stokes, x=radial.x, y=radial.y, radius=90 * um) == 1


def test_with_the_plate_at_45_deg_the_lobes_stand_across():
    row = bench(fast=45 * deg).expose("cam", fa.H, grid=GRID).table()[0]
    assert (row.lobes, row.angle) == (2, pytest.approx(90 * deg, abs=SINGULAR))


def test_a_half_wave_plate_left_behind_makes_them_turn_against_it():
    shots = bench(behind=(fa.HalfWavePlate(fast=10 * deg, name="left in"),)).expose("cam", ANALYZERS, grid=GRID)
    assert turning(shots).rate == pytest.approx(-1, abs=SINGULAR)
    assert polarization_index(shots.stokes, x=shots.x, y=shots.y, radius=90 * um) == -1


def test_a_detuned_q_plate_leaves_a_spot_that_the_analyzer_can_put_out():
    shots = bench(retardance=170 * deg).expose("cam", fa.SIX_STATES, grid=GRID)
    middle = np.s_[99:101, 99:101]
    along, across = shots.frame("H")[middle].sum(), shots.frame("V")[middle].sum()
    # Both see the same of the ring's dark middle, by the symmetry of four pixels; what they differ by is the unconverted share
    # cos^2(85 deg) = 0.76 %, a focused Gaussian of radius f lambda / (pi w) = 106 um.
    focal = 500 * mm * 532 * nm / (np.pi * 0.80 * mm)
    spot = 5 * mW * np.cos(85 * deg) ** 2 * 2 / (np.pi * focal**2) * (2 * 3.45 * um) ** 2
    assert along - across == pytest.approx(
        spot, rel=0.01
    )  # the Gaussian falls by 2 (3.45/106)^2 = 0.2 % over the pixels
    assert along > 20 * across
