"""Files are written whole or not at all."""

import os

import pytest

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


@pytest.mark.skipif(os.name != "posix", reason="permissions by umask")
@pytest.mark.parametrize(("mask", "mode"), [(0o022, 0o644), (0o077, 0o600), (0o002, 0o664)])
def test_the_file_has_the_permissions_of_an_ordinary_one(tmp_path, mask, mode):
    before = os.umask(mask)
    try:
        path = write_whole(tmp_path / "a.bin", lambda file: file.write(b"light"))
    finally:
        os.umask(before)
    assert path.stat().st_mode & 0o777 == mode
