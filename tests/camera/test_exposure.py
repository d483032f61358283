"""Frames, views and the table of an exposure."""

from dataclasses import replace

import numpy as np
import pytest

from fastaxis.camera import load, no_analyzer, plate_then_polarizer, read_pictures
from fastaxis.camera.exposure import Exposure
from fastaxis.conventions import View, stamp
from fastaxis.errors import ParameterError
from fastaxis.light import A, D, H, L, R, V, linear
from fastaxis.units import deg

EPS = np.finfo(float).eps


def test_frames_are_the_weighted_sums_of_the_stokes_images(shots):
    s0, s1, s2, s3 = shots.stokes
    expected = [(s0 + s1) / 2, (s0 - s1) / 2, (s0 + s2) / 2, (s0 - s2) / 2, (s0 + s3) / 2, (s0 - s3) / 2]
    # Sums of four terms below the peak, and zero where a rounding would go below it.
    np.testing.assert_allclose(shots.frames, expected, atol=4 * EPS * s0.max())


def test_a_frame_has_many_names(shots):
    for same in ("R", 4, -2, np.int64(4), R, shots.settings[4]):
        np.testing.assert_array_equal(shots.frame(same), shots.frames[4])


def test_a_setting_that_was_not_exposed_can_still_be_asked_for(shots):
    np.testing.assert_array_equal(shots.frame(no_analyzer()), shots.stokes[0])
    turned = shots.frame(linear(22.5 * deg))
    expected = (shots.stokes[0] + (shots.stokes[1] + shots.stokes[2]) / np.sqrt(2)) / 2
    np.testing.assert_allclose(turned, expected, atol=8 * EPS * shots.stokes[0].max())


def test_no_frame_is_negative_though_roundings_would_be(shots):
    dark = Exposure(
        stokes=np.array([1.0, -1.0 - EPS * 2, 0.0, 0.0]).reshape(4, 1, 1),
        settings=shots.settings,
        x=np.zeros(1),
        y=np.zeros(1),
        pixel=None,
        wavelength=633e-9,
    )
    assert dark.frame("H")[0, 0] == 0.0
    assert dark.power(V) >= 1.0


def test_powers_of_crossed_settings_add_up(shots):
    for one, other in ((H, V), (D, A), (R, L)):
        # Sums over 143 pixels.
        assert shots.power(one) + shots.power(other) == pytest.approx(shots.total_power, rel=143 * EPS)


class TestView:
    def test_the_frames_stay_as_they_are(self, shots):
        np.testing.assert_array_equal(shots.in_view(View.SOURCE).frames, shots.frames)

    def test_r_and_l_change_places(self, shots):
        assert shots.labels == ("H", "V", "D", "A", "R", "L")
        other = shots.in_view(View.SOURCE)
        assert other.labels == ("H", "V", "D", "A", "L", "R")
        np.testing.assert_array_equal(other.frame("L"), shots.frame("R"))

    def test_a_state_is_the_same_light_under_either_name(self, shots):
        np.testing.assert_array_equal(shots.in_view(View.SOURCE).frame(R), shots.frame(R))

    def test_s3_and_its_weight_change_sign_and_stay_the_difference_of_r_and_l(self, shots):
        other = shots.in_view(View.SOURCE)
        np.testing.assert_array_equal(other.stokes[3], -shots.stokes[3])
        np.testing.assert_array_equal(other.weights[:, 3], -shots.weights[:, 3])
        difference = other.frame("R") - other.frame("L")
        np.testing.assert_allclose(difference, other.stokes[3], atol=4 * EPS * shots.stokes[0].max())

    def test_the_stamp_says_which(self, shots):
        assert shots.stamp == stamp(View.RECEIVER)
        assert shots.in_view(View.SOURCE).stamp == stamp(View.SOURCE) != shots.stamp

    def test_there_and_back_is_the_same(self, shots):
        back = shots.in_view(View.SOURCE).in_view(View.RECEIVER)
        np.testing.assert_array_equal(back.stokes, shots.stokes)
        assert shots.in_view(View.RECEIVER) is shots


def test_the_table_has_a_row_for_each_setting(shots):
    rows = shots.table()
    assert [row.label for row in rows] == list(shots.labels)
    assert [row.power for row in rows] == [shots.power(k) for k in range(6)]
    assert rows[0].peak == pytest.approx(shots.frame(0).max() / 1e-10, rel=4 * EPS)


def test_a_detector_has_rows_without_lobes(shots):
    one = Exposure(
        stokes=np.array([1.0, 1.0, 0.0, 0.0]).reshape(4, 1, 1),
        settings=shots.settings,
        x=np.zeros(1),
        y=np.zeros(1),
        pixel=None,
        wavelength=633e-9,
    )
    assert (one.table()[0].power, one.table()[0].peak, one.table()[0].lobes) == (1.0, 1.0, 0)


@pytest.mark.parametrize(
    ("which", "message"),
    [
        ("Q", r"cam: no setting is called 'Q'; the settings exposed are: H, V, D, A, R, L \(fix: shots.frame\(\"H\"\)"),
        (6, r"cam: frame 6; frames are counted from 0 to 5 \(fix: shots.frame\(5\)\)"),
        (-7, "cam: frame -7; frames are counted from 0 to 5"),
        (1.5, "cam: frame 1.5; a frame is asked for by label, index, state or setting"),
        (True, "cam: frame True; a frame is asked for"),
    ],
)
def test_a_frame_that_is_not_there_is_refused(shots, which, message):
    with pytest.raises(ParameterError, match=message):
        shots.frame(which)


def test_a_label_that_two_settings_share_is_refused(shots):
    both = (plate_then_polarizer(fast=0.1, label="plate"), plate_then_polarizer(fast=0.2, label="plate"))
    twice = Exposure(stokes=shots.stokes, settings=both, x=shots.x, y=shots.y, pixel=1e-5, wavelength=633e-9)
    with pytest.raises(
        ParameterError, match=r"2 settings are called 'plate'; a label asked for belongs to one.*frame\(0"
    ):
        twice.frame("plate")


def test_the_same_setting_twice_is_no_riddle(shots):
    twice = Exposure(
        stokes=shots.stokes, settings=shots.settings[:1] * 2, x=shots.x, y=shots.y, pixel=1e-5, wavelength=633e-9
    )
    np.testing.assert_array_equal(twice.frame("H"), shots.frame("H"))


def test_the_axis_outside_the_sensor_leaves_the_table_without_lobes(shots):
    aside = replace(shots, x=shots.x + 1e-3)
    assert [(row.lobes, row.power) for row in aside.table()] == [(0, shots.power(k)) for k in range(6)]


def test_a_line_camera_has_a_table(shots):
    line = replace(shots, stokes=shots.stokes[:, :1], y=np.zeros(1))
    assert line.table()[0].lobes == 0


def test_saving_by_name(shots, tmp_path):
    np.testing.assert_array_equal(load(shots.save(tmp_path / "run.npz")).frames, shots.frames)
    assert read_pictures(shots.save_tiff(tmp_path / "run.tiff")).labels == shots.labels
    assert len(shots.save_pngs(tmp_path / "run")) == 6
