"""An exposure in one file, with everything needed to go on working with it: .npz, no pickles."""

from __future__ import annotations

from pathlib import Path
from typing import Any
from zipfile import BadZipFile

import numpy as np

from fastaxis.camera.arrival import Arrival
from fastaxis.camera.coding import FORMAT, facts, facts_from, sensor_from_json, setting_from_json, to_text, view_from
from fastaxis.camera.exposure import Exposure
from fastaxis.engines.field import Guard
from fastaxis.errors import FileFormatError
from fastaxis.files import require, write_whole

__all__ = ["load", "save"]


def save(shots: Exposure, path: str | Path) -> Path:
    """Write an exposure to an .npz file: stokes, x, y as arrays, all else as JSON text under "about".

    Parameters
    ----------
    shots : the exposure.
    path : ending in .npz; an older file of that name is replaced once the new one is whole.

    Raises
    ------
    FileFormatError : another ending.
    """
    path = Path(path)
    _check_ending(path)
    about = np.array(to_text(facts(shots)))
    return write_whole(
        path, lambda file: np.savez_compressed(file, stokes=shots.stokes, x=shots.x, y=shots.y, about=about)
    )


def load(path: str | Path) -> Exposure:
    """Read what :func:`save` wrote.

    Raises
    ------
    FileFormatError : not such a file, or a damaged one.
    MissingFileError : no file.

    Examples
    --------
    >>> from pathlib import Path
    >>> load(Path("shots.txt"))
    Traceback (most recent call last):
        ...
    fastaxis.errors.FileFormatError: shots.txt: ends in '.txt'; an exposure is kept in an .npz file (fix: "shots.npz")
    """
    path = Path(path)
    _check_ending(path)
    require(path, 'fa.camera.save(shots, "shots.npz")')
    try:
        with path.open("rb") as file, np.load(file, allow_pickle=False) as arrays:
            about = facts_from(str(arrays["about"]))
            return _exposure(about, {name: arrays[name] for name in ("stokes", "x", "y")})
    except (BadZipFile, EOFError, KeyError, TypeError, ValueError) as problem:
        raise FileFormatError(
            "an exposure is read from the .npz file it was saved to",
            got=f"{path.name}: not a whole '{FORMAT}' file",
            fix='fa.camera.save(shots, "shots.npz")',
        ) from problem


def _exposure(about: dict[str, Any], arrays: dict[str, Any]) -> Exposure:
    guard, arrived = about["guard"], about.get("arrived")  # older files have less
    return Exposure(
        **arrays,
        settings=tuple(setting_from_json(data) for data in about["settings"]),
        view=view_from(about),
        guard=None if guard is None else Guard(**guard),
        sent=about.get("sent"),
        arrival=None if arrived is None else Arrival(arrived),
        sensor=sensor_from_json(about.get("sensor")),
        exposure_time=about.get("exposure_time"),
        **{name: about[name] for name in ("pixel", "wavelength", "name", "target", "orientation", "plan")},
    )


def _check_ending(path: Path) -> None:
    if path.suffix != ".npz":
        raise FileFormatError(
            "an exposure is kept in an .npz file",
            got=f"{path.name}: ends in '{path.suffix}'",
            fix=f'"{path.stem or "shots"}.npz"',
        )
