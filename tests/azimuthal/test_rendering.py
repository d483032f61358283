"""Pixels: light integrated over each, against closed forms and against a plain sum of many places."""

import numpy as np
import pytest
from scipy.special import erf

from fastaxis.elements import Aperture, FreeSpace, Lens, Polarizer, QPlate
from fastaxis.light import Gaussian, H, L, Raster, elliptical, stokes
from fastaxis.units import deg, mm, um

W = 0.5 * mm


def gaussian_watts(raster):
    def line(x):
        edge = np.sqrt(2) / W
        return (erf((x + raster.pitch / 2) * edge) - erf((x - raster.pitch / 2) * edge)) / 2

    return np.multiply.outer(line(raster.y), line(raster.x))


@pytest.mark.parametrize(
    "raster",
    [
        Raster(10 * um, (64, 65)),
        Raster(40 * um, (40, 33), (0.13 * mm, -0.2 * mm)),
        Raster(300 * um, (8, 9)),
        Raster(2 * mm, (4, 4)),
        Raster(1 * mm, (3, 1), (0.1 * mm, 0)),
    ],
)
def test_a_gaussian_beam_on_pixels_of_any_size(arrive, raster):
    field = arrive(Gaussian(waist=W))
    images = field.stokes_on(raster)
    assert images.shape == (4, *raster.shape)
    # Filters and cells are chosen for 1e-11 of the peak irradiance along a line.
    assert abs(images[0] - gaussian_watts(raster)).max() < 2e-11 * 2 / (np.pi * W**2) * raster.pitch**2
    assert abs(images[1] - images[0]).max() < 1e-13 * images[0].max()


def test_all_stokes_parameters_of_a_detuned_plate_in_focus(arrive):
    parts = [QPlate(q=0.5, retardance=2.4), FreeSpace(0.1), Lens(focal=0.3), FreeSpace(0.3)]
    field = arrive(Gaussian(waist=W), *parts, state=elliptical(0.3, 0.3))
    raster = Raster(20 * um, (24, 22), (15 * um, 0))
    nodes, weights = np.polynomial.legendre.leggauss(10)
    x, y = ((c[:, np.newaxis] + nodes * raster.pitch / 2).ravel() for c in (raster.x, raster.y))
    fine = stokes(field.at(x, y)).reshape(4, 24, 10, 22, 10)
    expected = np.einsum("siajb,a,b->sij", fine, weights, weights) * raster.pitch**2 / 4
    images = field.stokes_on(raster)
    assert abs(images - expected).max() < 2e-11 * expected[0].max()
    # The state of the light is not lost: S3 and S1 of the unconverted share and the rest are both there.
    assert all(abs(image).max() > 1e-3 * images[0].max() for image in images)


def test_rows_run_along_y_and_columns_along_x(arrive):
    """A radial beam: bright along x for an H analyzer."""
    field = arrive(Gaussian(waist=W), QPlate(q=0.5), Lens(focal=0.3), FreeSpace(0.3))
    s0, s1, *_ = field.stokes_on(Raster(15 * um, (21, 31), (0, 0)))
    frame = (s0 + s1) / 2
    assert frame[10, 20] > 100 * frame[20, 15]


def test_no_jump_at_the_pixels_about_the_axis(arrive):
    for shape in ((20, 20), (21, 21), (20, 21)):
        image = arrive(Gaussian(waist=W), state=L).stokes_on(Raster(20 * um, shape))[0]
        assert np.allclose(image, image[::-1, ::-1], rtol=1e-13)
        assert np.allclose(image, gaussian_watts(Raster(20 * um, shape)), rtol=1e-9)


def test_a_hard_rim_on_pixels_keeps_its_power(arrive):
    field = arrive(Gaussian(waist=W), Aperture(radius=0.4 * mm))
    image = field.stokes_on(Raster(25 * um, (40, 40)))[0]
    # Pixels across the rim are cut into cells of a 64th of theirs.
    assert image.sum() == pytest.approx(field.power, rel=1e-4)


@pytest.mark.parametrize("state", [H, L])
def test_one_pixel_wider_than_the_beam_holds_it_all(arrive, state):
    field = arrive(Gaussian(waist=W), QPlate(q=0.5, retardance=2.0), FreeSpace(0.5), state=state)
    assert field.stokes_on(Raster(0.1, (1, 1)))[:, 0, 0] == pytest.approx(field.total_stokes, abs=1e-13)


@pytest.mark.parametrize("side", [0.2 * mm, 0.6 * mm, 1.5 * mm, 3 * mm])
def test_one_pixel_of_any_size(arrive, side):
    raster = Raster(side, (1, 1))
    # Integrated around, then along the radius by 96 and more nodes: no approximation but the panels'.
    assert arrive(Gaussian(waist=W)).stokes_on(raster)[0, 0, 0] == pytest.approx(
        gaussian_watts(raster)[0, 0], abs=1e-12
    )


def test_one_square_pixel_sees_four_lobes_as_they_lie(arrive):
    """q = 1: E turns twice around, S1 ~ cos 4 phi; a square is not a circle, so a little of S1 is left."""
    field = arrive(Gaussian(waist=W), QPlate(q=1), Lens(focal=0.5), FreeSpace(0.3))
    side = 0.5 * mm
    fine = field.stokes_on(Raster(side / 64, (64, 64))).sum(axis=(1, 2))
    one = field.stokes_on(Raster(side, (1, 1)))[:, 0, 0]
    assert abs(one[1]) > 1e-3 * one[0]
    assert one == pytest.approx(fine, abs=1e-9 * one[0])


def test_half_a_turn_saves_half_the_work_and_changes_nothing(arrive):
    """Charges -1 and 1: the lower half of a centred picture is the upper one turned. Each half alone is not centred."""
    field = arrive(Gaussian(waist=W), QPlate(q=0.5), Lens(focal=0.3), FreeSpace(0.25), state=elliptical(0.3, 0.3))
    assert {l % 2 for _, l in field.harmonics.orders} == {1}
    whole = field.stokes_on(Raster(20 * um, (24, 22)))
    halves = [field.stokes_on(Raster(20 * um, (12, 22), (0, side * 120 * um))) for side in (-1, 1)]
    assert abs(whole - np.concatenate(halves, axis=1)).max() < 1e-11 * whole.max()


def test_mixed_charges_have_no_such_symmetry(arrive):
    field = arrive(Gaussian(waist=W), QPlate(q=0.5, retardance=2.0), Lens(focal=0.3), FreeSpace(0.25), state=H)
    s1 = field.stokes_on(Raster(20 * um, (24, 22)))[1]
    assert abs(s1 - s1[::-1, ::-1]).max() > 0.1 * abs(s1).max()


def test_quarters_of_a_picture_are_those_of_the_whole(arrive):
    """Odd and even charges of either sign, on an even and an odd number of places, which have a middle one."""
    field = arrive(
        Gaussian(waist=W), QPlate(q=0.5, retardance=2.0), QPlate(q=1, retardance=1.0), FreeSpace(0.3), state=H
    )
    assert {l % 2 for _, l in field.harmonics.orders} == {0, 1}
    x, y = np.linspace(-0.7, 0.7, 9) * mm, np.linspace(-0.6, 0.6, 8) * mm
    whole = field.at(x, y)
    alone = np.stack([[field.at(x[[i]], y[[j]])[:, 0, 0] for i in range(9)] for j in range(8)])
    # Fields asked at other radii are tabled apart, each to 2e-13 of the peak.
    assert abs(whole - np.moveaxis(alone, -1, 0)).max() < 2e-12 * abs(whole).max()


def test_no_light_gives_dark_pictures(arrive):
    field = arrive(Gaussian(waist=W), Polarizer(axis=90 * deg), QPlate(q=0.5), FreeSpace(0.3), state=H)
    assert abs(field.stokes_on(Raster(20 * um, (24, 22)))).max() < 1e-25
    assert abs(field.at(np.array([0.0, 0.1]) * mm, np.zeros(1))).max() < 1e-10
