import numpy as np
import pytest

from fastaxis.light.raster import Raster
from fastaxis.report.shots import bright_crop, heading, short_labels, whole


def spot(exposure, row, column, shape=(60, 80)):
    stokes = np.zeros((4, *shape))
    stokes[0, row, column] = 1e-6
    return exposure(stokes, Raster(10e-6, shape))


def test_the_crop_holds_the_light_and_little_else(exposure):
    shots = spot(exposure, 20, 50)
    crop = bright_crop(shots)
    assert crop.of(shots.stokes)[0].sum() == shots.total_power
    assert crop.of(shots.stokes).shape[1:] == (10, 10)


def test_the_crop_stays_inside_at_an_edge(exposure):
    crop = bright_crop(spot(exposure, 0, 79))
    assert crop.rows[0] == 0
    assert crop.columns[1] == 80


def test_extent_runs_to_the_outer_edges_of_the_pixels_in_millimetres(exposure):
    crop = whole(spot(exposure, 0, 0))
    assert crop.extent == pytest.approx((-0.4, 0.4, -0.3, 0.3))
    assert crop.aspect == 0.75


def test_a_dark_picture_is_shown_whole(exposure):
    shots = exposure(np.zeros((4, 6, 8)), Raster(1e-5, (6, 8)))
    assert bright_crop(shots).rows == (0, 6)


def test_heading_names_train_and_camera_unless_told(six_shots):
    assert heading(six_shots, None) == "Saltpan, cam"
    assert heading(six_shots, "") == ""


@pytest.mark.parametrize(
    ("labels", "short", "common"),
    [
        (("H", "V"), ("H", "V"), ""),
        (("only one",), ("only one",), ""),
        (("polarizer 0°", "polarizer 10°"), ("0°", "10°"), "polarizer …"),
        (("a b, c", "a d, c"), ("b", "d"), "a …, c"),
        (("a", "a b"), ("a", "a b"), ""),
        (("same", "same"), ("same", "same"), ""),
    ],
)
def test_common_words_are_said_once(labels, short, common):
    assert short_labels(labels) == (short, common)
