"""``fastaxis predict``: the frame of every setting, the maps, the drawing, and the numbers."""

from __future__ import annotations

from argparse import Namespace
from pathlib import Path
from typing import Any

from fastaxis.camera import SIX_STATES
from fastaxis.camera.bundle import save as save_bundle
from fastaxis.camera.pictures import save_tiff
from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.console import progress, say, tell
from fastaxis.cli.safety import caution, port_powers
from fastaxis.cli.tables import exposure_table
from fastaxis.cli.targets import targets
from fastaxis.report.bench import draw_bench
from fastaxis.report.ellipses import draw_ellipses
from fastaxis.report.frames import draw_frames
from fastaxis.report.save import save
from fastaxis.report.stokes import draw_stokes

__all__ = ["predict"]


def predict(bench: BenchFile, options: Namespace) -> None:
    """Expose the cameras of a bench, write figures and data, and print a table."""
    train = bench.train.with_values(dict(options.symbol)) if options.symbol else bench.train
    out = Path(options.out) if options.out else Path(f"{bench.path.stem}_predicted")
    settings = options.settings or bench.settings or SIX_STATES
    for target in targets(train, options.camera):
        _predict_one(train, target, settings, out, options)
    powers = port_powers(train)
    save(draw_bench(train, powers=powers, view=options.view), out / "bench", options.format, view=options.view)
    if warning := caution(train, powers):
        tell(warning, style="bold yellow")
    say(f"Written to {out}/")


def _predict_one(train: Any, target: str, settings: Any, out: Path, options: Namespace) -> None:
    plan = train.plan(target, grid=options.grid)
    say(str(plan))
    with progress(target, 6) as move_on:
        move_on(f"{target}: light")
        shots = train.expose(target, settings, grid=options.grid).in_view(options.view)
        move_on(f"{target}: data")
        out.mkdir(parents=True, exist_ok=True)
        save_bundle(shots, out / f"{target}.npz")
        save_tiff(shots, out / f"{target}.tif")
        for word, draw in _figures(shots).items():
            move_on(f"{target}: {word}")
            save(draw(shots), out / f"{target}_{word}", options.format, view=options.view)
    say(exposure_table(shots))
    say(shots.stamp)


def _figures(shots: Any) -> dict[str, Any]:
    if shots.pixel is None:
        return {"powers": draw_frames}
    return {"frames": draw_frames, "stokes": draw_stokes, "ellipses": draw_ellipses}
