"""A knob turned live: an exposure with nothing remembered beside one after some turns of the same knob.

Run: python tests/benchmarks/bench_remembered.py

Clock and processor time are medians; fresh and remembered ones take turns.
"""

from __future__ import annotations

import statistics

from timing import both, machine, table

import fastaxis as fa
from fastaxis.units import mm, mW, nm, um

SAMPLES, TURNS = 1024, 7


def bench(*last, centred=False):
    """Two plates, two spaces each, and a third plate before the camera, perhaps with something behind it."""
    place = (0.0, 0.0) if centred else (0.2 * mm, -0.1 * mm)
    return fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, centre=place, name="first"),
        fa.FreeSpace(300 * mm),
        fa.QPlate(q=1, retardance=2.0, centre=place, name="middle"),
        fa.FreeSpace(300 * mm),
        fa.Lens(focal=500 * mm),
        fa.FreeSpace(300 * mm),
        fa.QuarterWavePlate(fast=0.1, name="late"),
        *last,
        fa.Camera(pixel=10 * um, shape=(512, 512), name="cam"),
    )


def turned(train, knob, engine):
    """(fresh, remembered): medians of clock and processor time of an exposure."""
    options = {"grid": fa.Grid(SAMPLES, 10 * mm), "engine": engine} if engine == "grid" else {"engine": engine}
    trains = [train.with_changes({knob: 0.3 + 0.05 * i}) for i in range(2 * TURNS)]
    fresh, known = [], []
    for cold, *warm in zip(trains[:TURNS], trains[TURNS:], trains[TURNS - 1 :: -1], strict=True):
        fa.forget_light()
        fresh.append(both(lambda one=cold: one.expose("cam", fa.SIX_STATES, **options)))
        for one in warm:
            one.expose("cam", fa.SIX_STATES, **options)
        known.append(both(lambda one=cold: one.expose("cam", fa.SIX_STATES, **options)))
    return [[statistics.median(times) * 1e3 for times in zip(*some, strict=True)] for some in (fresh, known)]


def main():
    print(machine())
    rows = []
    polarizer = fa.Polarizer(axis=0.0, name="polarizer")
    for engine, knob, *last in (
        ("grid", "laser.power"), ("grid", "middle.offset"), ("grid", "late.fast"), ("grid", "polarizer.axis", polarizer),
        ("grid", "cam.exposure_time"), ("azimuthal", "middle.offset"), ("azimuthal", "late.fast"),
    ):  # fmt: skip
        train = bench(*last, centred=engine == "azimuthal")
        (clock, busy), (kept_clock, kept_busy) = turned(train, knob, engine)
        times = [f"{value:.1f}" for value in (clock, kept_clock, busy, kept_busy)]
        rows.append((f"{engine}: {knob}", *times, f"{busy / kept_busy:.1f}"))
    head = ("knob turned", "fresh, ms", "remembered", "fresh, processor ms", "remembered", "ratio")
    table(f"exposures of 512 x 512 pixels; the grid has {SAMPLES} x {SAMPLES} samples", head, rows)


if __name__ == "__main__":
    main()
