"""Frames, views and the table of an exposure."""

from dataclasses import replace

import numpy as np
import pytest

from fastaxis.camera import load, read_pictures
from fastaxis.camera.exposure import Exposure
from fastaxis.conventions import View, stamp
from fastaxis.light import A, D, H, L, R, V

EPS = np.finfo(float).eps


def test_frames_are_the_weighted_sums_of_the_stokes_images(shots):
    s0, s1, s2, s3 = shots.stokes
    expected = [(s0 + s1) / 2, (s0 - s1) / 2, (s0 + s2) / 2, (s0 - s2) / 2, (s0 + s3) / 2, (s0 - s3) / 2]
    # Sums of four terms below the peak, and zero where a rounding would go below it.
    np.testing.assert_allclose(shots.frames, expected, atol=4 * EPS * s0.max())


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
