"""Reading a bench file: Python that defines ``train``, and may define ``settings``."""

from __future__ import annotations

import runpy
import sys
import traceback
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from fastaxis.errors import FastaxisError, WiringError
from fastaxis.train import Train

__all__ = ["BenchFile", "BenchFileError", "read_bench"]


class BenchFileError(Exception):
    """What is wrong with a bench file, in one line that starts with file and line."""


@dataclass(frozen=True)
class BenchFile:
    """A bench as declared: its train, and the analyzer settings it asks for, if it does."""

    path: Path
    train: Train
    settings: Any = None


def read_bench(path: Path) -> BenchFile:
    """Run a bench file and take its ``train`` and ``settings``.

    Raises
    ------
    BenchFileError : there is no such file, or it has an error; the message holds the line of it.
    WiringError : it runs, but ``train`` is missing or is no train.
    """
    if not path.is_file():
        raise BenchFileError(f"{path}: there is no such file; a bench is a Python file that defines train")
    names = _run(path)
    train = names.get("train")
    if not isinstance(train, Train):
        got = f"{path.name}: train is {type(train).__name__}" if "train" in names else f"{path.name}: no 'train' in it"
        raise WiringError(
            "a bench file defines train", got=got, fix='train = fa.Train(wavelength=532*nm, name="bench")'
        )
    return BenchFile(path, train, names.get("settings"))


def _run(path: Path) -> dict[str, Any]:
    folder = str(path.parent.resolve())
    sys.path.insert(0, folder)  # a bench may keep its parts in a file beside it
    try:
        return runpy.run_path(str(path), run_name="fastaxis_bench")
    except SyntaxError as error:
        place = f"{error.filename}:{error.lineno}" if error.filename else str(path)  # bytes that are no text have none
        raise BenchFileError(f"{place}: {error.msg}") from error
    except (Exception, SystemExit) as error:
        raise BenchFileError(f"{_place(path, error)}: {_sentence(error)}") from error
    finally:
        sys.path.remove(folder)


def _place(path: Path, error: BaseException) -> str:
    """The last line of the bench file that was running."""
    lines = [frame.lineno for frame in traceback.extract_tb(error.__traceback__) if frame.filename == str(path)]
    return f"{path}:{lines[-1]}" if lines else str(path)


def _sentence(error: BaseException) -> str:
    if isinstance(error, FastaxisError):
        return str(error)
    if isinstance(error, OSError) and error.strerror and error.filename:
        return f"{Path(error.filename).name} cannot be read or written: {error.strerror}"
    return f"{type(error).__name__}: {error}".replace("\n", " ")
