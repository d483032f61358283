"""Files are written whole or not at all."""

import os
import pickle

import pytest

import fastaxis as fa
from fastaxis.camera.bundle import load
from fastaxis.errors import MissingFileError
from fastaxis.files import write_whole
from fastaxis.studies.tolerance import normal, power_at
from fastaxis.units import deg, mW, mm, nm, um


def test_the_file_holds_what_was_written(tmp_path):
    write_whole(tmp_path / "a.bin", lambda file: file.write(b"light"))
    assert (tmp_path / "a.bin").read_bytes() == b"light"


def test_a_broken_off_write_leaves_the_old_file_and_no_rubbish(tmp_path):
    goal = tmp_path / "a.bin"
    goal.write_bytes(b"old")

    def fail(file):
        file.write(b"half of")
        raise RuntimeError

    with pytest.raises(RuntimeError):
        write_whole(goal, fail)
    assert goal.read_bytes() == b"old"
    assert list(tmp_path.iterdir()) == [goal]


def bench():
    return fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=0.1 * mm, power=1 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.Camera(pixel=50 * um, shape=(8, 8), name="cam"),
    )


WRITERS = {
    "bench.json": lambda path: bench().save(path),
    "shots.npz": lambda path: bench().expose("cam", fa.H).save(path),
    "shots.tiff": lambda path: bench().expose("cam", fa.H).save_tiff(path),
    "frames": lambda path: bench().expose("cam", fa.H).save_pngs(path),
    **dict.fromkeys(("sheet.csv", "sheet.txt", "sheet.pdf"), lambda path: bench().set_sheet().save(path)),
    **dict.fromkeys(("found.json", "found.txt", "found.png"), lambda path: bench().inspect().save(path)),
    **dict.fromkeys(
        ("study.txt", "study.pdf"),
        lambda path: bench().tolerance({"hwp.fast": normal(1 * deg)}, {"P": power_at("hwp")}, draws=10).save(path),
    ),
}


@pytest.mark.parametrize("name", WRITERS)
def test_a_missing_folder_is_made_whatever_is_written(tmp_path, name):
    goal = tmp_path / "new" / "deep" / name
    WRITERS[name](goal)
    written = [path for path in goal.parent.rglob("*") if path.is_file()]
    assert written
    assert all(path.stat().st_size for path in written)


def test_a_file_in_the_place_of_the_folder_is_told_with_the_goal(tmp_path):
    (tmp_path / "run").write_bytes(b"a file")
    with pytest.raises(OSError, match="exists|directory") as caught:
        write_whole(tmp_path / "run" / "x.npz", lambda file: None)
    assert caught.value.filename == str(tmp_path / "run" / "x.npz")


def test_a_message_about_a_file_survives_a_process_pool(tmp_path):
    with pytest.raises(MissingFileError) as refusal:
        fa.Train.load(tmp_path / "bench.json")
    assert isinstance(refusal.value, FileNotFoundError)
    assert pickle.loads(pickle.dumps(refusal.value)).fix == refusal.value.fix


@pytest.mark.parametrize("read", [load, fa.Train.load])
def test_a_file_that_is_not_there_is_told_in_a_sentence(read):
    with pytest.raises(MissingFileError, match=r"^/nonexist/x.npz: no such file; .*fix: .*save\("):
        read("/nonexist/x.npz")


@pytest.mark.skipif(os.name != "posix", reason="permissions by umask")
@pytest.mark.parametrize(("mask", "mode"), [(0o022, 0o644), (0o077, 0o600), (0o002, 0o664)])
def test_the_file_has_the_permissions_of_an_ordinary_one(tmp_path, mask, mode):
    before = os.umask(mask)
    try:
        path = write_whole(tmp_path / "a.bin", lambda file: file.write(b"light"))
    finally:
        os.umask(before)
    assert path.stat().st_mode & 0o777 == mode


def test_a_folder_that_lets_nobody_write_names_the_goal(tmp_path, monkeypatch):
    def refuse(dir, prefix):
        raise PermissionError(13, "Permission denied", f"{dir}/{prefix}x1y2z3")

    monkeypatch.setattr("fastaxis.files.tempfile.mkstemp", refuse)
    with pytest.raises(PermissionError) as caught:
        write_whole(tmp_path / "a.bin", lambda file: file.write(b"light"))
    assert caught.value.filename == str(tmp_path / "a.bin")
