"""``fastaxis predict``: the frame of every setting, the maps, the drawing, and the numbers."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Callable
from functools import partial
from pathlib import Path
from typing import Any

from fastaxis.camera import SIX_STATES, save_tiff
from fastaxis.camera import save as save_bundle
from fastaxis.camera.settings import as_settings
from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.console import progress, say, tell
from fastaxis.cli.letters import typed, with_letters
from fastaxis.cli.safety import caution, port_powers
from fastaxis.cli.tables import exposure_table, remarks, rows_of
from fastaxis.cli.targets import targets
from fastaxis.conventions import stamp
from fastaxis.errors import SymbolError
from fastaxis.report.bench import draw_bench
from fastaxis.report.ellipses import draw_ellipses
from fastaxis.report.frames import draw_frames
from fastaxis.report.save import save
from fastaxis.report.stokes import draw_stokes

__all__ = ["predict"]


def predict(bench: BenchFile, options: Namespace) -> None:
    """Expose the cameras of a bench, write figures and data, and print a table.

    Raises
    ------
    SymbolError : a letter of the bench has no value.
    """
    train = with_letters(bench.train, options)
    if train.symbols:
        letters = sorted(map(str, train.symbols))
        fix = " ".join(f"--symbol {typed(train, letter)}" for letter in letters)
        raise SymbolError(
            "a prediction needs a number for every letter", got=f"{train.name}: {', '.join(letters)} left open", fix=fix
        )
    out = Path(options.out) if options.out else Path(f"{bench.path.stem}_predicted")
    asked = options.settings if options.settings is not None else bench.settings
    settings = as_settings(SIX_STATES if asked is None else asked)
    for target in targets(train, options.camera):
        _predict_one(train, target, settings, out, options)
    powers = port_powers(train)
    _save(draw_bench(train, powers=powers, view=options.view), out / "bench", options)
    say(stamp(options.view))
    say(f"Written to {out}/")
    if warning := caution(train, powers):
        tell(warning, style="bold yellow")


def _predict_one(train: Any, target: str, settings: Any, out: Path, options: Namespace) -> None:
    # The plan closes with the stamp of the default view; the whole answer gets one stamp, of the view asked for.
    say(str(train.plan(target, grid=options.grid, engine=options.engine)).removesuffix(stamp()).rstrip())
    with progress(f"{target}: light", 5 + len(settings)) as move_on:
        shots = train.expose(target, settings, grid=options.grid, engine=options.engine).in_view(options.view)
        move_on(f"{target}: data")
        save_bundle(shots, out / f"{target}.npz")
        save_tiff(shots, out / f"{target}.tif")
        for word, draw in _figures(shots, options).items():
            move_on(f"{target}: {word}")
            _save(draw(shots), out / f"{target}_{word}", options)
        rows = rows_of(shots, lambda: move_on(f"{target}: table"))
    say(exposure_table(shots, rows))
    for line in remarks(shots, rows):
        say(f"  {line}")


def _save(figure: Any, stem: Path, options: Namespace) -> None:
    save(figure, stem, options.format, view=options.view, dpi=options.dpi)


def _figures(shots: Any, options: Namespace) -> dict[str, Callable[[Any], Any]]:
    if shots.pixel is None:
        return {"powers": draw_frames}
    return {"frames": partial(draw_frames, decades=options.decades), "stokes": draw_stokes, "ellipses": draw_ellipses}
