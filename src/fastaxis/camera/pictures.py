"""Frames as 16-bit pictures for other programs: PNG files or one TIFF of several pages, on one scale in watts."""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

import numpy as np
from numpy.typing import NDArray
from PIL import Image, PngImagePlugin, UnidentifiedImageError

from fastaxis.camera.coding import FORMAT, facts, facts_from, to_text
from fastaxis.camera.exposure import Exposure
from fastaxis.camera.room import check_frames
from fastaxis.errors import FileFormatError
from fastaxis.files import write_whole

__all__ = ["Pictures", "read_pictures", "save_pngs", "save_tiff"]

_FULL = 65535
_KEY = "fastaxis"
_DESCRIPTION = 270  # TIFF tag ImageDescription
_TIFF = (".tif", ".tiff")


@dataclass(frozen=True, kw_only=True, eq=False)
class Pictures:
    """Frames read back from picture files.

    Parameters
    ----------
    frames : (n, ny, nx) [W per pixel], rows along +y; each value right to half of ``watts_per_count``.
    labels : of the frames.
    watts_per_count : the common scale [W].
    pixel : side of a pixel [m]; None for a detector.
    stamp : the signs under which they were made.
    about : all that was written beside them.
    """

    frames: NDArray[np.float64] = field(repr=False)
    labels: tuple[str, ...]
    watts_per_count: float
    pixel: float | None
    stamp: str
    about: dict[str, Any] = field(repr=False)


def save_pngs(shots: Exposure, folder: str | Path) -> tuple[Path, ...]:
    """One 16-bit PNG for each setting, all with the same watts per count.

    The brightest pixel of all frames is full scale. The top row is the largest y, so that a viewer shows the picture
    upright; scale, pixel, settings and signs are in the text chunk "fastaxis" as JSON.

    Parameters
    ----------
    shots : the exposure.
    folder : made if it is not there.
    """
    folder = Path(folder)
    scale = _scale(shots)
    return tuple(_save_png(shots, k, scale, folder) for k in range(len(shots)))


def _save_png(shots: Exposure, k: int, scale: float, folder: Path) -> Path:
    text = PngImagePlugin.PngInfo()
    text.add_itxt(_KEY, to_text(_about(shots, scale) | {"frame": k}))
    word = re.sub(r"[^A-Za-z0-9.+-]+", "_", shots.labels[k]).strip("_")
    path = folder / f"{shots.target or 'frame'}-{k:03d}-{word}.png"
    image = _image(shots, k, scale)
    return write_whole(path, lambda file: image.save(file, format="PNG", pnginfo=text))


def save_tiff(shots: Exposure, path: str | Path) -> Path:
    """All frames as the pages of one 16-bit TIFF with the same watts per count.

    Scale, pixel, settings and signs are in the image description as JSON. The top row is the largest y.

    Parameters
    ----------
    shots : the exposure.
    path : ending in .tif or .tiff.

    Raises
    ------
    FileFormatError : another ending.
    ParameterError : more pages than memory holds.
    """
    path = Path(path)
    if path.suffix.lower() not in _TIFF:
        raise FileFormatError(
            "pages go into a .tif or .tiff file",
            got=f"{path.name}: ends in '{path.suffix}'",
            fix=f'"{path.stem or "shots"}.tiff"',
        )
    # Pages are written together: 16 bits a pixel.
    check_frames(shots.target, len(shots), shots.stokes.shape[1:], size=2, fix='shots.save_pngs("frames")')
    scale = _scale(shots)
    first, *rest = (_image(shots, k, scale) for k in range(len(shots)))
    about = {_DESCRIPTION: to_text(_about(shots, scale))}
    return write_whole(
        path, lambda file: first.save(file, format="TIFF", save_all=True, append_images=rest, tiffinfo=about)
    )


def read_pictures(path: str | Path) -> Pictures:
    """Read a PNG or TIFF written here back to watts.

    Raises
    ------
    FileFormatError : no picture, or one without the scale that turns counts into watts.
    FileNotFoundError : no file.
    """
    path = Path(path)
    try:
        with Image.open(path) as image:
            about = facts_from(_text_of(image))
            counts = np.stack([_page(image, k) for k in range(getattr(image, "n_frames", 1))])
        labels = [about["labels"][about["frame"]]] if "frame" in about else about["labels"]
        scale = float(about["watts_per_count"])
        return Pictures(
            frames=counts * scale,
            labels=tuple(labels),
            watts_per_count=scale,
            pixel=about["pixel"],
            stamp=about["stamp"],
            about=about,
        )
    except (UnidentifiedImageError, KeyError, TypeError, ValueError, IndexError, SyntaxError) as problem:
        raise FileFormatError(
            "watts are read from pictures written with their scale",
            got=f"{path.name}: no frame of a '{FORMAT}'",
            fix='fa.camera.save_tiff(shots, "shots.tiff")',
        ) from problem


def _text_of(image: Any) -> str:
    if image.format == "TIFF":
        return str(image.tag_v2[_DESCRIPTION])
    return str(image.info[_KEY])


def _page(image: Any, k: int) -> NDArray[np.float64]:
    image.seek(k)
    return np.asarray(image, dtype=float)[::-1]


def _scale(shots: Exposure) -> float:
    peak = max(float(shots.frame(k).max()) for k in range(len(shots)))
    return peak / _FULL if peak > 0 else 1.0


def _image(shots: Exposure, k: int, scale: float) -> Any:
    counts = np.rint(shots.frame(k) / scale).astype(np.uint16)
    return Image.fromarray(np.ascontiguousarray(counts[::-1]))


def _about(shots: Exposure, scale: float) -> dict[str, Any]:
    return facts(shots) | {"watts_per_count": scale, "rows": "the top row is the largest y"}
