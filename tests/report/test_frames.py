from dataclasses import replace

import numpy as np
import pytest

from fastaxis.camera.sets import rotating_plate
from fastaxis.camera.settings import as_settings
from fastaxis.conventions import View
from fastaxis.light import H, V, linear
from fastaxis.light.raster import Raster
from fastaxis.report.frames import draw_frames, layout
from fastaxis.report.save import save


def pictures(figure):
    return [axes for axes in figure.axes if axes.images and axes.get_xlabel()]


@pytest.mark.parametrize("count", [1, 2, 5, 7, 20])
def test_a_layout_has_room_for_all(count):
    rows, columns = layout(count)
    assert rows * columns >= count
    assert rows <= columns


def test_all_pictures_share_one_scale_that_starts_at_zero(six_shots):
    axes = pictures(draw_frames(six_shots))
    limits = {one.images[0].get_clim() for one in axes}
    assert len(axes) == 6
    assert len(limits) == 1
    low, high = limits.pop()
    assert low == 0
    # The scale is in microwatts a pixel and ends at the brightest pixel of all frames.
    assert high == pytest.approx(six_shots.frames.max() * 1e6)


def test_each_picture_has_its_setting_and_the_power_of_the_whole_camera(six_shots):
    axes = pictures(draw_frames(six_shots))
    assert [one.get_title() for one in axes] == ["H", "V", "D", "A", "R", "L"]
    assert all(one.get_xlabel().startswith("2.00 mW") for one in axes)


def test_the_picture_is_the_frame_with_y_up(six_shots):
    axes = pictures(draw_frames(six_shots, full=True))
    image = axes[2].images[0]
    assert image.origin == "lower"
    assert np.allclose(image.get_array(), six_shots.frame("D") * 1e6)


def test_r_and_l_are_named_as_the_exposure_names_them(six_shots):
    turned = pictures(draw_frames(six_shots.in_view(View.SOURCE)))
    assert [one.get_title() for one in turned][4:] == ["L", "R"]


@pytest.mark.parametrize("count", [1, 4, 6, 16])
def test_no_text_lies_on_another_or_outside(poincare_shots, assert_nothing_collides, count):
    assert_nothing_collides(draw_frames(poincare_shots([linear(k * np.pi / count) for k in range(count)])))


def test_places_without_a_picture_stay_empty_and_the_axes_above_them_are_numbered(poincare_shots):
    figure = draw_frames(poincare_shots([linear(k * np.pi / 5) for k in range(5)]))
    axes = pictures(figure)
    assert len(axes) == 5
    assert [one.get_xlabel().endswith("x [mm]") for one in axes] == [False, False, True, True, True]


@pytest.mark.parametrize("count", [1, 4, 6])
def test_lines_of_text_above_each_other_are_an_eighth_of_a_line_apart_or_more(poincare_shots, tmp_path, count):
    figure = draw_frames(poincare_shots([linear(k * np.pi / count) for k in range(count)]))
    save(figure, tmp_path / "frames", ["png"], dpi=figure.dpi)
    grid = [axes for axes in figure.axes if axes.images]
    high = grid[0].title.get_window_extent()
    assert figure._suptitle.get_window_extent().y0 - high.y1 > 0.125 * high.height
    below = [axes for axes in grid if axes.title.get_window_extent().y1 < grid[0].get_window_extent().y0]
    if below:
        assert grid[0].xaxis.label.get_window_extent().y0 - below[0].title.get_window_extent().y1 > 0.125 * high.height


def test_64_long_names_fit(poincare_shots, assert_nothing_collides):
    figure = draw_frames(poincare_shots(rotating_plate(64)))
    assert_nothing_collides(figure)
    assert figure._suptitle.get_text() == "Saltpan, cam: plate fast …, polarizer 0°"


def test_no_light_is_drawn_without_a_complaint(exposure):
    figure = draw_frames(exposure(np.zeros((4, 6, 8)), Raster(1e-5, (6, 8))))
    assert [text.get_text() for text in figure.axes[0].texts] == ["dark"]
    assert len(figure.axes) == 1  # no colour bar of nothing


def test_roundings_are_called_dark_and_are_not_drawn_as_light(six_shots):
    s0 = six_shots.stokes[0]
    crossed = replace(six_shots, stokes=np.stack([s0, s0 * (1 - 2e-16), 0 * s0, 0 * s0]), settings=as_settings([V]))
    figure = draw_frames(crossed)
    assert [text.get_text() for text in figure.axes[0].texts] == ["dark"]
    beside_light = draw_frames(replace(crossed, settings=as_settings([H, V])))
    assert [one.get_xlabel().split("\n")[0] for one in pictures(beside_light)] == ["4.00 mW", "dark"]


def test_a_logarithmic_scale_reaches_so_many_decades_down_and_shows_where_they_are(six_shots):
    plain, deep = draw_frames(six_shots), draw_frames(six_shots, decades=4)
    low, high = pictures(deep)[0].images[0].get_clim()
    assert high / low == pytest.approx(1e4)
    width = [np.ptp(pictures(one)[0].get_xlim()) for one in (plain, deep)]
    assert width[1] > width[0]


def test_of_a_thousand_settings_a_hundred_are_shown_and_the_foot_says_so(poincare_shots):
    shots = poincare_shots([linear(0.003 * k) for k in range(130)], shape=(12, 12), pitch=2e-4)
    figure = draw_frames(shots)
    assert len(pictures(figure)) == 65
    assert figure.texts[-1].get_text().startswith("65 of 130 settings are shown.")
