"""Sixteen-bit pictures on one scale, and back to watts."""

from dataclasses import replace

import numpy as np
import pytest
from PIL import Image

from fastaxis.camera.pictures import read_pictures, save_pngs, save_tiff
from fastaxis.conventions import View
from fastaxis.errors import FileFormatError


def test_a_tiff_gives_back_all_frames_to_half_a_count(shots, tmp_path):
    back = read_pictures(save_tiff(shots, tmp_path / "shots.tiff"))
    np.testing.assert_allclose(back.frames, shots.frames, atol=back.watts_per_count * 0.5000001)
    assert back.labels == shots.labels
    assert (back.pixel, back.stamp) == (shots.pixel, shots.stamp)


def test_pngs_give_back_their_frames_on_the_same_scale(shots, tmp_path):
    paths = save_pngs(shots, tmp_path / "frames")
    assert [path.name for path in paths[:2]] == ["cam-000-H.png", "cam-001-V.png"]
    pages = [read_pictures(path) for path in paths]
    assert len({page.watts_per_count for page in pages}) == 1
    assert tuple(page.labels[0] for page in pages) == shots.labels
    scale = pages[0].watts_per_count
    np.testing.assert_allclose(np.stack([p.frames[0] for p in pages]), shots.frames, atol=scale * 0.5000001)


def test_the_brightest_pixel_of_all_is_full_scale(shots, tmp_path):
    back = read_pictures(save_tiff(shots, tmp_path / "shots.tif"))
    assert back.watts_per_count * 65535 == pytest.approx(shots.frames.max(), rel=1e-15)


def test_a_viewer_shows_the_largest_y_on_top(shots, tmp_path):
    top_lit = np.zeros_like(shots.stokes)
    top_lit[0, -1] = 1.0
    path = save_pngs(replace(shots, stokes=top_lit), tmp_path)[0]
    with Image.open(path) as image:
        rows = np.asarray(image)[:, 0]
    assert rows[0] == 65535
    assert rows[-1] == 0


def test_sixteen_bits_are_written(shots, tmp_path):
    with Image.open(save_pngs(shots, tmp_path)[0]) as image:
        assert np.asarray(image).max() > 255
        assert image.format == "PNG"


def test_a_dark_exposure_stays_dark(shots, tmp_path):
    dark = replace(shots, stokes=0 * shots.stokes)
    assert not read_pictures(save_tiff(dark, tmp_path / "dark.tiff")).frames.any()


def test_the_naming_of_circular_light_is_written_beside(shots, tmp_path):
    other = shots.in_view(View.SOURCE)
    back = read_pictures(save_tiff(other, tmp_path / "shots.tiff"))
    assert back.labels[4:] == ("L", "R")
    assert back.stamp == other.stamp
    assert back.about["view"] == "source"


def test_pages_go_into_tiff_files(shots, tmp_path):
    with pytest.raises(FileFormatError, match=r"shots.jpg: ends in '.jpg'; pages go into a .tif or .tiff"):
        save_tiff(shots, tmp_path / "shots.jpg")


@pytest.mark.parametrize("name", ["plain.png", "plain.tiff"])
def test_pictures_without_a_scale_are_refused(tmp_path, name):
    Image.fromarray(np.zeros((4, 4), np.uint16)).save(tmp_path / name)
    with pytest.raises(FileFormatError, match=rf"{name}: no frame of a .*; watts are read from pictures written with"):
        read_pictures(tmp_path / name)


def test_text_is_no_picture(tmp_path):
    (tmp_path / "notes.png").write_text("not a picture")
    with pytest.raises(FileFormatError, match="notes.png: no frame"):
        read_pictures(tmp_path / "notes.png")
