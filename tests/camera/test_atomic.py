"""Files are written whole or not at all."""

import pytest

from fastaxis.camera.atomic import write_whole


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
