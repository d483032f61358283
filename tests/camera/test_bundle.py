"""An exposure survives its file, bit by bit."""

import json
from dataclasses import replace

import numpy as np
import pytest

from fastaxis.camera import no_analyzer, plate_then_polarizer
from fastaxis.camera.arrival import Arrival
from fastaxis.camera.bundle import load, save
from fastaxis.camera.settings import Setting
from fastaxis.conventions import View
from fastaxis.engines.field import Guard
from fastaxis.errors import FileFormatError
from fastaxis.laws import Amplitude, CircularLaw, ScalarLaw
from fastaxis.light.states import H, L


@pytest.fixture
def rich(shots):
    other = (
        no_analyzer(),
        plate_then_polarizer(fast=0.3, retardance=1.2, axis=-0.4, extinction=77.0, transmission=0.9, label="plate é"),
        Setting("turned", (ScalarLaw(Amplitude(0.5)), CircularLaw(Amplitude(1.0, -0.1), Amplitude(1.0, 0.1)))),
    )
    return replace(
        shots,
        settings=shots.settings + other,
        guard=Guard(1e-9, 0.25, 1e-12),
        orientation="turned 90",
        sent=3.0,
        arrival=Arrival(2.5),
    )


def test_everything_comes_back(rich, tmp_path):
    back = load(save(rich, tmp_path / "shots.npz"))
    for name in ("stokes", "x", "y", "frames", "weights"):
        np.testing.assert_array_equal(getattr(back, name), getattr(rich, name))
    for name in (
        "settings",
        "labels",
        "pixel",
        "wavelength",
        "name",
        "target",
        "orientation",
        "view",
        "guard",
        "plan",
        "sent",
        "arrived",
    ):
        assert getattr(back, name) == getattr(rich, name), name
    assert back.stamp == rich.stamp


def test_the_naming_of_circular_light_comes_back_as_a_whole(shots, tmp_path):
    other = shots.in_view(View.SOURCE)
    back = load(save(other, tmp_path / "shots.npz"))
    assert back.view is View.SOURCE
    assert back.labels == other.labels
    np.testing.assert_array_equal(back.stokes, other.stokes)
    np.testing.assert_array_equal(back.frame(L), shots.frame(L))


def test_a_detector_without_a_guard_comes_back(shots, tmp_path):
    one = replace(shots, stokes=shots.stokes[:, :1, :1], x=np.zeros(1), y=np.zeros(1), pixel=None)
    back = load(save(one, tmp_path / "one.npz"))
    assert back.pixel is None
    assert back.guard is None
    assert back.power(H) == one.power(H)


def test_the_file_can_be_read_without_this_package(rich, tmp_path):
    with np.load(save(rich, tmp_path / "shots.npz"), allow_pickle=False) as arrays:
        about = json.loads(str(arrays["about"]))
    assert about["stamp"] == rich.stamp
    assert about["settings"][7]["laws"][0]["angle"] == 0.3


def test_exact_numbers_of_a_symbol_library_are_saved_as_floats(shots, tmp_path):
    import sympy

    exact = replace(shots, settings=(plate_then_polarizer(fast=sympy.pi / 8),))
    back = load(save(exact, tmp_path / "shots.npz"))
    np.testing.assert_allclose(back.weights, exact.weights, atol=1e-15)


@pytest.mark.parametrize("write", [save, lambda _shots, path: load(path)])
def test_only_npz_files_hold_exposures(shots, tmp_path, write):
    with pytest.raises(FileFormatError, match=r"shots.txt: ends in '.txt'; .*fix: \"shots.npz\""):
        write(shots, tmp_path / "shots.txt")


def other_arrays(path):
    np.savez(path, picture=np.ones(3))


def other_format(path):
    np.savez(path, about=np.array(json.dumps({"format": "something else"})))


def text(path):
    path.write_text("no archive at all")


def pickled(path):
    np.savez(path, about=np.array([{"format": "x"}], dtype=object))


def nothing(path):
    path.write_bytes(b"")


@pytest.mark.parametrize("wrong", [other_arrays, other_format, text, pickled, nothing])
def test_wrong_files_are_refused(tmp_path, wrong):
    path = tmp_path / "shots.npz"
    wrong(path)
    with pytest.raises(FileFormatError, match=r"shots.npz: not a whole 'fastaxis exposure 1' file; .*fix: fa.camera"):
        load(path)


def test_half_a_file_is_refused(shots, tmp_path):
    path = save(shots, tmp_path / "shots.npz")
    path.write_bytes(path.read_bytes()[:-200])
    with pytest.raises(FileFormatError, match="not a whole"):
        load(path)


def test_a_setting_of_an_unknown_kind_is_refused(shots, tmp_path):
    path = save(shots, tmp_path / "shots.npz")
    with np.load(path) as arrays:
        kept = dict(arrays)
    about = json.loads(str(kept["about"]))
    about["settings"][0] = {"kind": "Amplitude", "power": 1.0}
    np.savez(path, **(kept | {"about": np.array(json.dumps(about))}))
    with pytest.raises(FileFormatError, match="not a whole"):
        load(path)


def test_a_file_that_is_not_there_is_a_missing_file(tmp_path):
    with pytest.raises(FileNotFoundError):
        load(tmp_path / "none.npz")
