"""The set sheet: what to dial on each mount, where each part stands, and what light to expect behind it."""

from __future__ import annotations

import csv
import io
import math
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from os import PathLike
from pathlib import Path
from typing import Any

from fastaxis import checks
from fastaxis.camera import SIX_STATES
from fastaxis.camera.exposing import expose
from fastaxis.camera.settings import as_settings
from fastaxis.conventions import stamp
from fastaxis.elements.camera import Camera
from fastaxis.elements.free_space import FreeSpace
from fastaxis.errors import FastaxisError, FileFormatError, ParameterError
from fastaxis.files import write_whole
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.laser_safety import DEFERS, laser_cautions
from fastaxis.inspect.mount import Mount
from fastaxis.inspect.strands import state_in_words
from fastaxis.inspect.surveying import survey
from fastaxis.inspect.turning import Turn, turn_of
from fastaxis.inspect.words import degrees, length, watts
from fastaxis.loader import late
from fastaxis.plan.binding import refuse_letters

__all__ = ["HEADINGS", "Row", "SetSheet", "set_sheet"]

HEADINGS = ("part", "kind", "leaves by", "position [mm]", "height [mm]", "angle", "dial", "same at", "w [mm]",
            "power", "state behind it", "picture")  # fmt: skip
FARTHEST = 10.0  # [m]; rails and beam heights beyond it are millimetres whose unit is missing


@dataclass(frozen=True)
class Row:
    """One part as the light meets it.

    Parameters
    ----------
    name, kind : of the part.
    face : the light leaves by; "" where it ends.
    position : along the beam [m], rail start included.
    height : of the beam [m], if it was given.
    turn : how the part is turned, for one that can be.
    dial : reading of its mount [rad], if the mount was given.
    listed : whether the part stands further up already, so that it has been set.
    again : whether the light meets it once more, rather than leaving it by another face.
    branch : whether the row before is not the part upstream.
    radius : of the beam where it meets the part [m], w of a Gaussian.
    power : that leaves, or arrives where the light ends [W].
    state : of that light, in words.
    mirrored : whether the picture is mirrored there.
    origin : port the light comes from.
    """

    name: str
    kind: str
    face: str
    position: float
    height: float | None
    turn: Turn | None
    dial: float | None
    listed: bool
    again: bool
    branch: bool
    radius: float
    power: float
    state: str
    mirrored: bool
    origin: str

    def cells(self) -> tuple[str, ...]:
        """The row under ``HEADINGS``."""
        turn, dial = (None, None) if self.listed else (self.turn, self.dial)
        return (
            f"{self.name} (again)" if self.again else self.name,
            self.kind,
            self.face or "ends here",
            f"{self.position * 1e3:.1f}",
            "" if self.height is None else f"{self.height * 1e3:.1f}",
            f"{turn.parameter} {degrees(turn.declared)}" if turn else "",
            "" if dial is None else degrees(dial),
            "" if dial is None or turn is None else _other_readings(dial, turn.period),
            "" if math.isinf(self.radius) else f"{self.radius * 1e3:.3g}",
            watts(self.power),
            self.state,
            "mirrored" if self.mirrored else "upright",
        )


def _other_readings(dial: float, period: float) -> str:
    """The next reading at which the part stands the same; nothing where that takes a whole turn."""
    return "" if 2 * math.pi - period < 1e-9 else degrees((dial + period) % (2 * math.pi))


@dataclass(frozen=True, eq=False)
class SetSheet:
    """What one takes to the bench. ``print(sheet)``, ``sheet.csv()``, ``sheet.save("sheet.pdf")``.

    Parameters
    ----------
    name, wavelength : of the train.
    rows : parts in the order the light meets them; a splitter has a row for each way out.
    shots : {camera: exposure} of the frames to expect.
    remarks : frames that could not be predicted, and laser cautions.
    """

    name: str
    wavelength: float
    rows: tuple[Row, ...]
    shots: Mapping[str, Any] = field(default_factory=dict)
    remarks: tuple[str, ...] = ()

    def __str__(self) -> str:
        return self.text()

    def text(self) -> str:
        """The sheet as a table in plain text."""
        cells = [HEADINGS, *(row.cells() for row in self.rows)]
        # A column that says nothing, such as heights that were not given, is left out.
        used = [k for k in range(len(HEADINGS)) if any(row[k] for row in cells[1:])]
        widths = {k: max(len(row[k]) for row in cells) for k in used}
        lines = ["  ".join(row[k].ljust(widths[k]) for k in used).rstrip() for row in cells]
        for place, row in reversed(list(enumerate(self.rows, start=1))):
            if row.branch:
                lines.insert(place, f"from {row.origin}")
        head = f"{self.name}, {length(self.wavelength)}: angles counter-clockwise facing the source"
        return "\n".join([head, *lines, *self.remarks, stamp()])

    def csv(self) -> str:
        """The rows as comma-separated values, one head line."""
        out = io.StringIO()
        writer = csv.writer(out, lineterminator="\n")
        writer.writerow([*HEADINGS, "comes from"])
        writer.writerows([*row.cells(), row.origin] for row in self.rows)
        return out.getvalue()

    def figures(self) -> Any:
        """The sheet as matplotlib figures of A4 size, frames included."""
        return late("report.set_sheet", "draw_set_sheet")(self)

    def save(self, path: str | PathLike[str]) -> tuple[Path, ...]:
        """Write the sheet as .pdf (all pages), .png (a file a page), .csv or .txt.

        Raises
        ------
        FileFormatError : another ending.
        """
        path = Path(path)
        written = {".csv": self.csv, ".txt": self.text}
        if path.suffix in written:
            text = written[path.suffix]().encode()
            return (write_whole(path, lambda file: file.write(text)),)
        if path.suffix in (".pdf", ".png"):
            pages: tuple[Path, ...] = late("report.paper", "save_pages")(self.figures(), path)
            return pages
        raise FileFormatError("a set sheet is written as pdf, png, csv or txt", got=str(path), fix='"set_sheet.pdf"')


def set_sheet(
    train: Any,
    *,
    mounts: Mapping[str, Mount],
    rail_start: float,
    heights: Mapping[str, float] | float | None,
    settings: Iterable[Any] | None,
) -> SetSheet:
    """The set sheet of a train; see ``Train.set_sheet``.

    Raises
    ------
    ParameterError : a mount for a part that is not there, or that does nothing when it is turned; a bare angle for one;
        a rail start or a height without its unit; a height of a part that is not there; settings that are none.
    SymbolError : a letter without a value.
    WiringError : light cannot be followed.
    """
    for name, element in train.elements.items():
        refuse_letters(name, element.parameters())
    _check_mounts(train, mounts)
    _check_place("rail_start", rail_start, "rail_start={}")
    _check_heights(train, heights)
    analyzers = as_settings(SIX_STATES if settings is None else settings)
    train.validate()
    bench = survey(train)
    shots, remarks = _frames(train, analyzers)
    cautions = [f"Laser caution: {caution.got}." for caution in laser_cautions(bench)]
    deferring = [f"Laser cautions are no clearance: {DEFERS}."] if cautions else []
    rows = tuple(_rows(bench, mounts, rail_start, heights))
    return SetSheet(train.name, bench.wavelength, rows, shots, (*remarks, *cautions, *deferring))


def _check_place(parameter: str, value: Any, fix: str) -> None:
    """A length of either sign, in metres."""
    millimetres = f"{value:g}*mm" if isinstance(value, int | float) and math.isfinite(value) else "75*mm"
    fix = fix.format(millimetres)
    place = checks.number("set_sheet", parameter, value, fix=fix)
    checks.length("set_sheet", parameter, abs(place), zero=True, most=FARTHEST, fix=fix)


def _check_heights(train: Any, heights: Any) -> None:
    if not isinstance(heights, Mapping):
        if heights is not None:
            _check_place("heights", heights, "heights={}")
        return
    for name, height in heights.items():
        if name not in train.elements:
            raise ParameterError(
                f"heights are those of the parts {', '.join(train.elements)}",
                got=f"set_sheet: height of '{name}'",
                fix=f'heights={{"{next(iter(train.elements))}": 75*mm}}',
            )
        _check_place(f"height of {name}", height, f'heights={{{{"{name}": {{}}}}}}')


def _check_mounts(train: Any, mounts: Any) -> None:
    if not isinstance(mounts, Mapping):
        raise ParameterError(
            "mounts are given by the name of the part they turn",
            got=f"set_sheet: mounts = {mounts!r}",
            fix="mounts={}",
        )
    turning = [name for name, element in train.elements.items() if turn_of(element) is not None]
    for name, mount in mounts.items():
        if name not in turning:
            raise ParameterError(
                f"mounts turn the parts {', '.join(turning)}"
                if turning
                else "no part of this train is turned in a mount",
                got=f"mount for '{name}'",
                fix=f'mounts={{"{(turning or ["hwp"])[0]}": fa.Mount(zero=0*deg)}}',
            )
        _check_mount(name, mount)


def _check_mount(name: str, mount: Any) -> None:
    if isinstance(mount, Mount):
        return
    zero = f"{math.degrees(mount):g}" if isinstance(mount, int | float) else "0"
    raise ParameterError(
        "a mount is given by the reading at which the part's axis is along x: fa.Mount(zero=...)",
        got=f"mount for '{name}': {mount!r}",
        fix=f'mounts={{"{name}": fa.Mount(zero={zero}*deg)}}',
    )


def _rows(
    bench: Bench, mounts: Mapping[str, Mount], rail_start: float, heights: Mapping[str, float] | float | None
) -> Iterator[Row]:
    told: dict[str, Visit | None] = {}
    above: Visit | None = None
    for visit in bench.visits:
        if isinstance(visit.element, FreeSpace) or not bench.lit(visit):
            continue
        upstream = _part_upstream(visit)
        turn = turn_of(visit.element)
        yield Row(
            visit.name,
            type(visit.element).__name__,
            visit.left,
            visit.distance + rail_start,
            heights.get(visit.name) if isinstance(heights, Mapping) else heights,
            turn,
            mounts[visit.name].scale(turn.angle) if turn and visit.name in mounts else None,
            visit.name in told,
            visit.name in told and told[visit.name] is not visit.previous,
            upstream is not above,
            visit.radius,
            bench.leaving(visit) if visit.left else bench.arriving(visit),
            state_in_words(visit.after or visit.before),
            sum(visit.flips) % 2 == 1 if not visit.left else _flipped_behind(visit),
            f"{upstream.name}.{upstream.left}" if upstream else visit.source,
        )
        told.setdefault(visit.name, visit.previous)
        above = visit


def _flipped_behind(visit: Visit) -> bool:
    own = sum(type(law).__name__ == "Flip" for law in visit.laws)
    return (sum(visit.flips) + own) % 2 == 1


def _part_upstream(visit: Visit) -> Visit | None:
    before = visit.previous
    while before is not None and isinstance(before.element, FreeSpace):
        before = before.previous
    return before


def _frames(train: Any, settings: tuple[Any, ...]) -> tuple[dict[str, Any], tuple[str, ...]]:
    """Exposures of the cameras that light reaches, and a word on those that cannot be worked out."""
    shots: dict[str, Any] = {}
    remarks = []
    for name, element in train.elements.items():
        if isinstance(element, Camera) and f"{name}.in" in train.lit:
            try:
                shots[name] = expose(train, name, settings)
            except FastaxisError as error:
                remarks.append(f"No frames of {name}: {error}.")
    return shots, tuple(remarks)
