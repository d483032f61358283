"""Files that are either whole or not there."""

from __future__ import annotations

import os
import tempfile
from collections.abc import Callable
from pathlib import Path
from typing import IO

from fastaxis.errors import MissingFileError

__all__ = ["require", "write_whole"]


def require(path: Path, fix: str) -> Path:
    """The path of a file that is there.

    Raises
    ------
    MissingFileError : no such file; ``fix`` is what writes one.
    """
    if not path.is_file():
        raise MissingFileError("only a file that was written before can be read", got=f"{path}: no such file", fix=fix)
    return path


def write_whole(path: Path, write: Callable[[IO[bytes]], object]) -> Path:
    """Write next to the goal and move it there at the end, so that a broken-off run leaves the old file alone.

    A missing folder is made.

    Raises
    ------
    OSError : the folder cannot be made or lets nobody write; it names the goal.
    """
    try:
        path.parent.mkdir(parents=True, exist_ok=True)
        handle, temporary = tempfile.mkstemp(dir=path.parent, prefix=f".{path.name}.")
    except OSError as error:
        raise OSError(error.errno, error.strerror, str(path)) from error
    try:
        with os.fdopen(handle, "w+b") as file:
            write(file)
        Path(temporary).chmod(_usual_mode())
        Path(temporary).replace(path)
    except BaseException:
        Path(temporary).unlink(missing_ok=True)
        raise
    return path


def _usual_mode() -> int:
    """Permissions an ordinary new file would have; mkstemp makes files for their owner only."""
    mask = os.umask(0o077)
    os.umask(mask)
    return 0o666 & ~mask
