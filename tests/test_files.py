"""Files are written whole or not at all."""

import os
import pickle
from pathlib import Path

import pytest

import fastaxis as fa
from fastaxis.camera.bundle import load
from fastaxis.errors import MissingFileError
from fastaxis.files import write_whole


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


def test_a_folder_that_is_not_there_is_named_and_no_temporary_file():
    with pytest.raises(MissingFileError) as refusal:
        write_whole(Path("/nonexist/x.npz"), lambda file: None)
    assert str(refusal.value) == (
        '/nonexist/x.npz: no folder /nonexist; files are written to a folder that exists (fix: "x.npz")'
    )
    assert isinstance(refusal.value, FileNotFoundError)
    assert pickle.loads(pickle.dumps(refusal.value)).fix == '"x.npz"'


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
