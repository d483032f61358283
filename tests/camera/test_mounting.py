"""Turned and mirrored pictures: places, ellipses and angles go together."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.camera.mounting import Mounting
from fastaxis.elements.camera import ORIENTATIONS, Camera
from fastaxis.units import deg, mm, nm, um


@pytest.mark.parametrize("name", ORIENTATIONS)
def test_undone_is_the_inverse_of_what_the_camera_does(name):
    camera = Camera(pixel=1 * um, shape=(3, 5), orientation=name)
    picture = np.arange(15.0).reshape(camera.seen)
    assert np.array_equal(Mounting(name).undone(camera.oriented(picture)), picture)


@pytest.mark.parametrize("name", ORIENTATIONS)
def test_places_and_angles_agree(name):
    mounting = Mounting(name)
    for angle in (0.3, 2.0, 4.1):
        u, v = mounting.point(np.cos(angle), np.sin(angle))
        # A sine, an arctangent and a subtraction: some roundings of 2 pi.
        assert mounting.beam_angle(np.arctan2(v, u)) == pytest.approx(angle, abs=1e-14)


def azimuth(stokes):
    return np.arctan2(stokes[2], stokes[1]) / 2


@pytest.mark.parametrize("name", ORIENTATIONS)
@pytest.mark.parametrize(("angle", "chi"), [(20, 10), (-70, -30), (45, 0)])
def test_an_ellipse_turns_with_the_picture(name, angle, chi):
    a, c = 2 * angle * deg, 2 * chi * deg
    seen = Mounting(name).seen_stokes([1, np.cos(c) * np.cos(a), np.cos(c) * np.sin(a), np.sin(c)])
    u, v = Mounting(name).point(np.cos(angle * deg), np.sin(angle * deg))
    assert abs(np.sin(azimuth(seen) - np.arctan2(v, u))) < 1e-14
    assert seen[3] == pytest.approx(np.sin(c) * (-1 if name.startswith("mirrored") else 1), abs=1e-15)


@pytest.mark.parametrize("name", ORIENTATIONS)
def test_the_exposure_of_any_mounting_set_upright_is_that_of_an_upright_camera(name):
    def shots(orientation, shape):
        train = fa.Train(wavelength=532 * nm).along(
            fa.Laser(waist=0.2 * mm, name="laser"),
            fa.Camera(pixel=50 * um, shape=shape, centre=(0.15 * mm, 0.1 * mm), orientation=orientation, name="cam"),
        )
        return train.expose("cam", fa.H)

    turned = shots(name, (8, 12))
    upright = shots("upright", Camera(pixel=1 * um, shape=(8, 12), orientation=name).seen)
    again = turned.upright
    assert again.orientation == "upright"
    np.testing.assert_allclose(again.x, upright.x, atol=1e-18)
    np.testing.assert_allclose(again.y, upright.y, atol=1e-18)
    np.testing.assert_array_equal(again.stokes, upright.stokes)


@pytest.mark.parametrize("name", ORIENTATIONS)
def test_lobe_angles_are_those_of_the_beam_so_that_they_follow_the_analyzer(name):
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=0.5 * mm, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, name="qp"),
        fa.FreeSpace(200 * mm),
        fa.Camera(pixel=50 * um, shape=(48, 48), orientation=name, name="cam"),
    )
    shots = train.expose("cam", [fa.linear(a * deg) for a in (0, 20, 40)])
    # A radial beam has its lobes along the analyzer; the sums over pixels are even in the angle to about 1e-3 rad.
    assert [row.angle / deg for row in shots.table()] == pytest.approx([0, 20, 40], abs=0.1)
    from fastaxis.analysis import turning

    assert turning(shots).rate == pytest.approx(1, abs=0.01)
    if name != "upright":
        assert "angles of lobes in the beam's frame" in str(shots)
