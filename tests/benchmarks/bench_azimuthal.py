"""Azimuthal against grid engine on a centred bench of eight parts: time, error, nodes and growth.

Run: python tests/benchmarks/bench_azimuthal.py
"""

import os
import platform
import time
import warnings

import numpy as np
from rich.console import Console
from rich.table import Table
from scipy.special import ive

from fastaxis.elements import (
    Aperture, Camera, FreeSpace, HalfWavePlate, Laser, Lens, QPlate, QuarterWavePlate, Retarder,
)  # fmt: skip
from fastaxis.engines import propagate
from fastaxis.engines.memory import forget_light
from fastaxis.errors import SamplingWarning
from fastaxis.light import Gaussian, H, Raster, elliptical
from fastaxis.plan import Grid, make_plan
from fastaxis.train import Train
from fastaxis.units import deg, mm, nm, um

WAIST, WAVELENGTH, FOCAL = 0.8 * mm, 532 * nm, 500 * mm
PIXEL = 3.45 * um


def bench(pixels, *, plates=1, knob=20 * deg):
    """Laser, eight parts (three spaces, a lens, a tuned q-plate, three uniform plates), camera in the focus."""
    more = [part for i in range(plates - 1) for part in (QPlate(q=0.5, offset=0.1 * i), FreeSpace(200 * mm))]
    parts = [
        HalfWavePlate(fast=knob), FreeSpace(100 * mm), QPlate(q=0.5), *more, FreeSpace(200 * mm),
        QuarterWavePlate(fast=30 * deg), Lens(focal=FOCAL), FreeSpace(FOCAL), Retarder(fast=0.2, retardance=0.4),
    ]  # fmt: skip
    laser = Laser(mode=Gaussian(waist=WAIST, waist_at=100 * mm), power=5e-3, state=H, name="laser")
    camera = Camera(pixel=PIXEL, shape=(pixels, pixels), name="cam")
    return Train(wavelength=WAVELENGTH).along(laser, *parts, camera)


def median(run, count):
    """Median time [s] of some runs, and the last answer."""
    times = []
    for _ in range(count):
        begin = time.perf_counter()
        answer = run()
        times.append(time.perf_counter() - begin)
    return float(np.median(times)), answer


def closed_form_error(field):
    """Error of the whole field in focus, as a share of its peak.

    Ring of charge 1 behind a waist at the plate: (2/pi)^1/2/w_f sqrt(pi)/2 s exp(-s^2/2)(I_0 - I_1)(s^2/2). The
    state is uniform before and behind the plate, so each harmonic is this times a constant.
    """
    spot = WAVELENGTH * FOCAL / (np.pi * WAIST)
    x = np.linspace(0, 3, 61)[1:] * spot
    half = (x / spot) ** 2 / 2
    ring = np.sqrt(2 * 5e-3 / np.pi) / spot * np.sqrt(np.pi) / 2 * x / spot * (ive(0, half) - ive(1, half))
    total = np.sqrt((abs(field.at(x, np.zeros(1))) ** 2).sum(axis=0)[0])
    return float(abs(total - ring).max() / ring.max())


def frame(train, engine, grid=None):
    """The Stokes images of the camera, from plan to pixels."""
    field = propagate(make_plan(train, "cam", engine=engine, grid=grid))[0]
    camera = train.elements["cam"]
    return field, field.stokes_on(Raster(camera.pixel, camera.shape))


def forgotten():
    """A frame with nothing remembered, neither kernels nor light."""
    forget_light()
    return frame(bench(512), "azimuthal")


def turned(engine, count, grid=None):
    """Median time of a frame when the first plate is turned from one to the next."""
    trains = iter([bench(512, knob=knob) for knob in np.linspace(0, 0.9, count)])
    return median(lambda: frame(next(trains), engine, grid), count)[0]


def engines_table(console):
    train = bench(512)
    begin = time.perf_counter()
    field, exact = frame(train, "azimuthal")
    first = time.perf_counter() - begin
    cold, _ = median(forgotten, 7)
    table = Table(
        "engine", "samples or nodes", "plate turned, ms", "frame error", "field error", "ratio", "ratio, cold",
        title="8 parts, frames of 512^2",
    )  # fmt: skip
    # Turns of each engine in between, so that a busy machine is busy for all.
    grids = [Grid(samples, 12 * mm) for samples in (128, 256, 512, 1024)]
    rounds = [[turned("azimuthal", 5), *(turned("grid", 3, grid) for grid in grids)] for _ in range(3)]
    ours, *theirs = np.median(rounds, axis=0)
    nodes = f"{len(field.harmonics.profile.nodes)} -> {len(field.out_to(1.3 * mm).profile.nodes)}"
    table.add_row("azimuthal", nodes, f"{ours * 1e3:.1f}", "-", f"{closed_form_error(field):.1e}", "1", "1")
    for grid, taken in zip(grids, theirs, strict=True):
        sampled, image = frame(train, "grid", grid)
        error = abs(image - exact).max() / exact[0].max()
        row = [f"{taken * 1e3:.1f}", f"{error:.1e}", f"{closed_form_error(sampled):.1e}"]
        table.add_row("grid", str(grid.samples), *row, f"{taken / ours:.1f}", f"{taken / cold:.1f}")
    console.print(table)
    console.print(f"azimuthal, nothing remembered: {cold * 1e3:.1f} ms; the very first: {first * 1e3:.0f} ms")


def growth_table(console):
    table = Table(
        "pixels", "q-plates", "nodes before the last section", "harmonics", "time, ms", "estimate", title="growth"
    )
    for pixels, plates in ((128, 1), (256, 1), (512, 1), (1024, 1), (2048, 1), (512, 2), (512, 3)):
        train = bench(pixels, plates=plates)
        taken, (field, _) = median(lambda t=train: frame(t, "azimuthal"), 3)
        light = field.harmonics
        row = (
            pixels,
            plates,
            len(light.profile.nodes),
            len(light.orders),
            f"{taken * 1e3:.1f}",
            f"{field.error(1 * mm):.1e}",
        )
        table.add_row(*map(str, row))
    console.print(table)


def handover_table(console):
    """Round about the axis first, then a part beside it: harmonics up to there, against samples all the way."""
    benches = {
        "q-plate, 400 mm, q-plate beside": [QPlate(q=0.5), FreeSpace(0.4), QPlate(q=0.5, centre=(0.1 * mm, 0))],
        "hole, 400 mm, lens beside": [Aperture(radius=0.4 * mm), FreeSpace(0.4), Lens(focal=0.3, centre=(0.1 * mm, 0))],
        "q-plate, 100 mm, lens beside": [QPlate(q=0.5), FreeSpace(0.1), Lens(focal=0.3, centre=(0.1 * mm, 0))],
    }
    table = Table("bench", "engine", "samples", "window, mm", "time, ms", "frame error", title="handed over to samples")
    raster = Raster(15 * um, (128, 128))
    for name, parts in benches.items():
        laser = Laser(mode=Gaussian(waist=0.5 * mm), power=5e-3, state=elliptical(0.2, 0.3), name="laser")
        camera = Camera(pixel=raster.pitch, shape=raster.shape, name="cam")
        train = Train(wavelength=WAVELENGTH).along(laser, *parts, FreeSpace(200 * mm), camera)
        fine = propagate(make_plan(train, "cam", grid=Grid(4096, 16 * mm)))[0].stokes_on(raster)
        for engine in ("auto", "grid"):
            plan = make_plan(train, "cam", engine=engine)
            taken, image = median(lambda p=plan: propagate(p)[0].stokes_on(raster), 3)
            grid, error = plan.sampling.grid, abs(image - fine).max() / fine.max()
            row = (grid.samples, f"{grid.window / mm:.1f}", f"{taken * 1e3:.0f}", f"{error:.1e}")
            table.add_row(name, plan.engine, *map(str, row))
    console.print(table)


def main():
    warnings.simplefilter("ignore", SamplingWarning)  # of the grids set tight on purpose
    console = Console(width=130)
    console.print(
        f"{platform.machine()}, {os.cpu_count()} cores, Python {platform.python_version()}, numpy {np.__version__}"
    )
    engines_table(console)
    growth_table(console)
    handover_table(console)


if __name__ == "__main__":
    main()
