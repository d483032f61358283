"""Writing figures as PNG and PDF beside matplotlib's own way: ``python tests/benchmarks/bench_figures.py``.

The other way saves each format by itself, so that places are found and tried for each, with the whole DejaVu Sans to be
cut down for each PDF. Both take turns; the best of each counts.
"""

from __future__ import annotations

import runpy
import sys
import tempfile
import time
from contextlib import contextmanager
from pathlib import Path

from fastaxis.report import style
from fastaxis.report.ellipses import draw_ellipses
from fastaxis.report.frames import draw_frames
from fastaxis.report.letters import FAMILIES
from fastaxis.report.save import DPI, FORMATS, save
from fastaxis.report.stokes import draw_stokes

EXAMPLE = Path(__file__).parents[2] / "train_examples" / "tern_yard_two_cameras.py"
TURNS = 4
WANTED = 1.3


@contextmanager
def letters(families):
    style.RULES["font.family"] = families
    try:
        yield
    finally:
        style.RULES["font.family"] = FAMILIES


def theirs(figure, stem):
    with style.rules():
        for kind in FORMATS:
            figure.savefig(f"{stem}.{kind}", dpi=DPI)


def seconds(write, families, shots, folder):
    with letters(families):
        figures = [draw(one) for one in shots for draw in (draw_frames, draw_stokes, draw_ellipses)]
        start = time.perf_counter()
        for number, figure in enumerate(figures):
            write(figure, Path(folder) / str(number))
        return time.perf_counter() - start


def main():
    bench = runpy.run_path(str(EXAMPLE))
    shots = [bench["train"].expose(camera, bench["settings"]) for camera in bench["train"].cameras]
    with tempfile.TemporaryDirectory() as folder:
        both = [
            (seconds(save, FAMILIES, shots, folder), seconds(theirs, ["DejaVu Sans"], shots, folder))
            for _ in range(TURNS)
        ]
    ours, others = (min(times) for times in zip(*both, strict=True))
    print(f"six figures, PNG and PDF: {ours:.2f} s, matplotlib's own way {others:.2f} s, ratio {others / ours:.2f}")
    print(f"wanted: at least {WANTED} times faster")
    return 0 if others >= WANTED * ours else 1


if __name__ == "__main__":
    sys.exit(main())
