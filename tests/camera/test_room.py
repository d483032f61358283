"""Sensors too large for the computer are refused before light is sent."""

import pytest

import fastaxis as fa
from fastaxis.camera import room
from fastaxis.units import mm, nm, um


def train(shape):
    return fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"), fa.Camera(pixel=5 * um, shape=shape, name="cam")
    )


def test_a_sensor_of_ten_thousand_million_pixels_is_refused_at_once():
    with pytest.raises(fa.ParameterError, match=r"cam: about 640 GB .* GB there; .* \(fix: shape=\("):
        train((100_000, 100_000)).expose("cam", fa.H)


def test_the_limit_is_the_memory_there_is(monkeypatch):
    needed = 8 * room.IMAGES * 100 * 100
    monkeypatch.setattr(room, "memory", lambda: needed)
    room.check_room("cam", [(100, 100)])
    with pytest.raises(fa.ParameterError):
        room.check_room("cam and more", [(100, 100), (1, 1)])


def test_where_the_system_tells_no_memory_nothing_is_refused(monkeypatch):
    monkeypatch.setattr(room, "memory", lambda: None)
    room.check_room("cam", [(10**6, 10**6)])


def test_more_frames_at_a_time_than_fit_are_refused_and_one_at_a_time_is_offered(shots, monkeypatch, tmp_path):
    needed = len(shots) * 8 * shots.stokes[0].size
    monkeypatch.setattr(room, "memory", lambda: needed)
    assert len(shots.frames) == len(shots)
    monkeypatch.setattr(room, "memory", lambda: needed - 1)
    with pytest.raises(fa.ParameterError, match=r"cam: 6 frames of .* shots.frame\(k\)"):
        _ = shots.frames
    monkeypatch.setattr(room, "memory", lambda: needed // 4 - 1)
    with pytest.raises(fa.ParameterError, match="save_pngs"):
        shots.save_tiff(tmp_path / "shots.tiff")
