"""Pixels about the axis behind a q-plate, against closed forms and against finer pixels."""

import numpy as np
import pytest

from fastaxis.elements import FreeSpace, QPlate
from fastaxis.engines.azimuthal.core import core_means, near_axis
from fastaxis.engines.azimuthal.smooth import smooth_images
from fastaxis.light import Gaussian, H, L, Raster
from fastaxis.units import mm, um

W = 0.5 * mm
SETTLED = 1e-12


def turning(places):
    """1, cos 2 phi, sin 2 phi."""
    phi = np.angle(places)
    return np.stack([np.ones_like(phi), np.cos(2 * phi), np.sin(2 * phi)])


def turning_means(x, y, pitch):
    """From their integrals x^2 atan(y/x) - y^2 atan(x/y) and r^2 ln(r^2)/2."""
    columns, rows = (np.append(side - pitch / 2, side[-1] + pitch / 2) for side in (x, y))
    x, y = columns[None], rows[:, None]
    r2 = np.maximum(x**2 + y**2, 1e-300)
    with np.errstate(divide="ignore", invalid="ignore"):
        one = np.where(x == 0, 0, x**2 * np.arctan(y / x)) - np.where(y == 0, 0, y**2 * np.arctan(x / y))
    integrals = np.stack([x * y, one, r2 * np.log(r2) / 2])
    return np.diff(np.diff(integrals, axis=1), axis=2) / pitch**2


@pytest.mark.parametrize("axis", [(0.0, 0.0), (0.5, 0.5), (0.5, 0.0), (0.3, -0.2), (0.4999999, 0.1), (1e-13, 0.49)])
def test_a_turning_pattern_in_closed_form(axis):
    pitch = 2.0
    x, y = (np.arange(-1, 2) - axis[0]) * pitch, (np.arange(-1, 2) - axis[1]) * pitch
    means = core_means(turning, x, y, pitch, SETTLED)
    # Nodes are settled to 1e-12; the closed form takes differences of numbers of order ten.
    assert means == pytest.approx(turning_means(x, y, pitch), abs=1e-11)


def test_what_never_settles_is_given_up():
    assert core_means(lambda r: np.cos(1e4 * abs(r))[None], np.zeros(1), np.zeros(1), 1.0, SETTLED) is None


def test_pixels_near_the_axis_wherever_it_is():
    assert near_axis(Raster(1 * um, (4, 5))) == (slice(1, 3), slice(1, 4))
    assert near_axis(Raster(1 * um, (4, 4), (2 * um, 0))) == (slice(1, 3), slice(0, 1))
    assert near_axis(Raster(1 * um, (4, 4), (9 * um, 0))) is None


@pytest.mark.parametrize("centre", [(0, 0), (3.3 * um, -41 * um), (100 * um, 0), (155 * um, 2 * um)])
@pytest.mark.parametrize("shape", [(20, 30), (21, 30), (2, 2)])
def test_a_core_anywhere_in_a_pixel_is_that_of_finer_pixels(arrive, centre, shape):
    field = arrive(Gaussian(waist=W), QPlate(q=0.5, retardance=2.4), state=H)
    raster = Raster(10 * um, shape, centre)
    fine = field.stokes_on(Raster(10 / 3 * um, (3 * shape[0], 3 * shape[1]), centre))
    expected = fine.reshape(4, shape[0], 3, shape[1], 3).sum(axis=(2, 4))
    # Polynomials are settled to 3e-12 of the peak, on either picture.
    assert field.stokes_on(raster) == pytest.approx(expected, abs=2e-11 * 2 / (np.pi * W**2) * raster.pitch**2)


@pytest.mark.parametrize("parts", [[QPlate(q=0.5)], [QPlate(q=1, retardance=2.0)], [QPlate(q=0.5), FreeSpace(0.1)]])
def test_no_camera_behind_a_plate_needs_cells(arrive, parts):
    field = arrive(Gaussian(waist=W), *parts, state=L if len(parts) > 1 else H)
    raster = Raster(10 * um, (40, 40), (33 * um, 21.7 * um))
    arrival = field.out_to(1 * mm)
    assert smooth_images(field._table(arrival), arrival.profile, arrival.orders, raster) is not None
