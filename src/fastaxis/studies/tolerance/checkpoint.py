"""What was drawn so far, in a file that is either whole or not there."""

from __future__ import annotations

import hashlib
import zipfile
import zlib
from pathlib import Path
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import FileFormatError
from fastaxis.files import write_whole

__all__ = ["Checkpoint", "fingerprint"]

Reals: TypeAlias = NDArray[np.float64]


# What numpy says of a file that was cut off, overwritten or is of another kind.
DAMAGED = (OSError, ValueError, KeyError, EOFError, zipfile.BadZipFile, zlib.error, SyntaxError, TypeError)


def _contents(path: Path) -> tuple[str, Reals, NDArray[np.bool_]]:
    # Opened here, since numpy leaves a file open that turns out to be cut off.
    with path.open("rb") as file, np.load(file, allow_pickle=False) as kept:
        return str(kept["study"]), kept["values"], kept["done"]


def fingerprint(*things: Any) -> str:
    """A short text that is the same for the same study only."""
    return hashlib.sha256("\n".join(map(str, things)).encode()).hexdigest()


class Checkpoint:
    """Values of finished batches, kept in an .npz file after each of them.

    Parameters
    ----------
    path : of the file; None to keep nothing.
    study : fingerprint; a file of another study is refused.
    shape : (draws, merits).

    Raises
    ------
    FileFormatError : the file is not a checkpoint, or one of another study.
    """

    def __init__(self, path: str | Path | None, study: str, shape: tuple[int, int]) -> None:
        self.path, self.study = None if path is None else Path(path), study
        self.values: Reals = np.full(shape, np.nan)
        self.done = np.zeros(shape[0], dtype=bool)
        if self.path is not None and self.path.exists():
            self._read(self.path)

    def _read(self, path: Path) -> None:
        try:
            study, values, done = _contents(path)
        except DAMAGED as error:
            raise FileFormatError(
                "a checkpoint is an .npz file this study wrote", got=f"{path}: {error}", fix='checkpoint="other.npz"'
            ) from error
        if study != self.study or values.shape != self.values.shape or done.shape != self.done.shape:
            raise FileFormatError(
                "a checkpoint goes on with the same train, errors, figures of merit, seed and number of draws",
                got=f"{path}: written by another study",
                fix='checkpoint="other.npz"',
            )
        self.values, self.done = values, done

    def keep(self, start: int, values: Reals) -> None:
        """Add the values (rows, merits) of a batch, and write the file."""
        rows = slice(start, start + len(values))
        self.values[rows], self.done[rows] = values, True
        if self.path is not None:
            contents = {"study": np.array(self.study), "values": self.values, "done": self.done}
            write_whole(self.path, lambda file: np.savez(file, **contents))  # type: ignore[arg-type]  # plain arrays
