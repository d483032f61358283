"""A sweep beside exposing every value again: ``python tests/benchmarks/bench_sweep.py [--all]``.

360 angles of a plate in mid-train, six settings, frames of 512 x 512 pixels. The sweep is timed whole, every frame
made. The other way is timed on 6 of the angles spread over the range and multiplied by 60, which is fair since each
angle takes the same work (light of earlier ones is forgotten); ``--all`` times all 360 instead. Tables at the end show
how the time of a sweep grows with its length and with the number of settings.
"""

from __future__ import annotations

import os
import platform
import statistics
import sys
import time

import numpy as np
from bench_grid import growth

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

SUBSET = 6
ROUNDS = 3


def bench(*, off_axis):
    """A plate between two q-plates, three spaces."""
    return fa.Train(wavelength=633 * nm, name="Low Quay").along(
        fa.Laser(waist=1 * mm, power=2 * mW, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, centre=(0.1 * mm if off_axis else 0.0, 0.0), name="first"),
        fa.FreeSpace(distance=0.3, name="arm"),
        fa.Retarder(fast=0, retardance=80 * deg, name="plate"),
        fa.FreeSpace(distance=0.3, name="leg"),
        fa.QPlate(q=0.5, name="second"),
        fa.FreeSpace(distance=0.3, name="end"),
        fa.Camera(pixel=10 * um, shape=(512, 512), name="cam"),
    )


def seconds(work):
    start = time.perf_counter()
    result = work()
    return time.perf_counter() - start, result


def swept(train, angles, settings=6):
    fa.forget_light()
    analyzers = fa.SIX_STATES if settings == 6 else fa.rotating_plate(settings)
    sweep = train.sweep({"plate.fast": angles}, "cam", analyzers)
    count = sum(len(frames) for setting in range(settings) for _, frames in sweep.chunks(setting))
    assert count == settings * len(angles)
    return sweep


def again(train, angles):
    for angle in angles:
        fa.forget_light()
        shots = train.with_changes({"plate.fast": angle}).expose("cam", fa.SIX_STATES)
        frames = [shots.frame(setting) for setting in range(6)]
    return frames


def compared(name, train, count=360, *, whole=False):
    """One line of the table; the two ways take turns, so that a busy machine slows both."""
    angles = np.radians(np.linspace(0, 180, count, endpoint=False))
    few = angles if whole else angles[:: count // SUBSET]
    fast, slow = [], []
    for _ in range(1 if whole else ROUNDS):
        slow.append(seconds(lambda: again(train, few))[0] * count / len(few))
        took, sweep = seconds(lambda: swept(train, angles))
        fast.append(took)
    last = again(train, few[-1:])
    peak = max(frame.max() for frame in last)
    error = max(abs(sweep.frame({"plate.fast": few[-1]}, k) - last[k]).max() for k in range(6)) / peak
    quick, long = statistics.median(fast), statistics.median(slow)
    note = "measured" if whole else f"from {len(few)}"
    print(
        f"{name:<28}{count:>6}{sweep.propagations:>6}{quick:>10.2f}{long:>10.1f} {note:<9}{long / quick:>7.0f}{error:>10.0e}"
    )
    return long / quick


def main():
    whole = "--all" in sys.argv
    print(f"{platform.processor() or platform.machine()}, {os.cpu_count()} cores, load {os.getloadavg()[0]:.1f}; "
          f"Python {platform.python_version()}, numpy {np.__version__}, "
          f"OPENBLAS_NUM_THREADS={os.environ.get('OPENBLAS_NUM_THREADS', 'unset')}")  # fmt: skip
    print(f"medians of {1 if whole else ROUNDS} rounds; six settings, 512 x 512 pixels, every frame made")
    print(f"{'bench':<28}{'angles':>6}{'prop.':>6}{'sweep s':>10}{'again s':>10} {'':<9}{'ratio':>7}{'error':>10}")
    ratio = compared("grid, 1024 x 1024", bench(off_axis=True), whole=whole)
    compared("azimuthal", bench(off_axis=False), whole=whole)
    print()
    for name, train in (("grid", bench(off_axis=True)), ("azimuthal", bench(off_axis=False))):
        growth(f"{name}: angles of a sweep, six settings, every frame made", [
            (f"{count} angles", count, lambda t=train, n=count: swept(t, np.radians(np.arange(n) * 180 / n)))
            for count in (36, 72, 144, 288, 576)
        ])  # fmt: skip
    growth("grid: settings, a sweep of 36 angles", [
        (f"{count} settings", count, lambda n=count: swept(bench(off_axis=True), np.radians(np.arange(36) * 5), n))
        for count in (6, 12, 24, 48, 96)
    ])  # fmt: skip
    print(f"wanted: at least 50 for 360 angles on the grid; found {ratio:.0f}")
    return 0 if ratio >= 50 else 1


if __name__ == "__main__":
    raise SystemExit(main())
