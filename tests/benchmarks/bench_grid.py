"""The grid engine beside what one would write by hand: ``python tests/benchmarks/bench_grid.py``.

Eight parts, three spaces, a q-plate off the axis; 1024 x 1024 samples in double precision, a camera of 1024 x 1024
pixels, 72 settings of a turning plate before a polarizer. All ways take turns, so that a busy machine slows all, and
what each gives is freed before the next; the library forgets the light of earlier rounds. Seconds are those of a clock
and those of the processor, all threads together: where other work keeps the cores busy only the second are worth
comparing, and threads get nothing for what they cost.

* careful: numpy, both components, one propagation, transfer functions made once, each setting by its 2 x 2 matrix on
  the field, its frame put into one array; a frame is irradiance in the middles of the pixels;
* naive: the same, but the whole bench again for each setting; timed for 4 of the 72 and multiplied by 18;
* floor: the transforms the plan cannot do without, by scipy, and writing 72 new frames, each from an image in memory,
  on all cores as the library does;
* floor, frames in place: the same, but the frames of the round before are overwritten. Other ways ask for new memory
  each round, as numpy does; the library's frames take the memory of earlier ones that nobody holds any more.
"""

from __future__ import annotations

import statistics
import time
import warnings

import numpy as np
from scipy import fft
from timing import both, machine, seconds, table

import fastaxis as fa
from fastaxis.engines.memory import MEMORIES
from fastaxis.engines.grid.workers import WORKERS, together
from fastaxis.units import deg, mm, mW, nm, um

ROUNDS, SUBSET = 7, 4
SAMPLES, PIXEL, WAVELENGTH, WAIST, POWER = 1024, 10 * um, 633 * nm, 0.8 * mm, 5 * mW
CENTRE = (0.2 * mm, -0.1 * mm)
ANGLES = np.arange(72) * 5 * deg


def bench(samples=SAMPLES):
    return fa.Train(wavelength=WAVELENGTH, name="Cinder Lane").along(
        fa.Laser(waist=WAIST, power=POWER, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=11 * deg, name="hwp"),
        fa.FreeSpace(200 * mm),
        fa.QPlate(q=0.5, centre=CENTRE, name="qp"),
        fa.FreeSpace(300 * mm),
        fa.Lens(focal=500 * mm),
        fa.QuarterWavePlate(fast=30 * deg),
        fa.FreeSpace(150 * mm),
        fa.Camera(pixel=PIXEL * SAMPLES / samples, shape=(samples, samples), name="cam"),
    )


def settings(count=72):
    return [fa.plate_then_polarizer(fast=k * 360 * deg / count, label=f"plate {k}") for k in range(count)]


def library(train, analyzers, samples=SAMPLES, **options):
    grid = fa.Grid(samples=samples, window=SAMPLES * PIXEL)
    for memory in MEMORIES:  # the light of the round before; the memory of its frames is used again
        memory.clear()
    return train.expose("cam", analyzers, grid=grid, engine="grid", **options).frames


def retarder(fast, retardance):
    turn = np.array([[np.cos(fast), np.sin(fast)], [-np.sin(fast), np.cos(fast)]])
    return turn.T @ np.diag(np.exp([-0.5j * retardance, 0.5j * retardance])) @ turn


def transfer(distance):
    """The transfer function of free space, cut off where it is no longer sampled."""
    f = np.fft.fftfreq(SAMPLES, PIXEL)
    limit = 1 / (WAVELENGTH * np.hypot(2 * distance / (SAMPLES * PIXEL), 1))
    factor = np.where(abs(f) < limit, np.exp(-1j * np.pi * WAVELENGTH * distance * f**2), 0)
    return factor[:, None] * factor


def by_hand(transfers):
    """(Ex, Ey) at the camera, as a careful script has it."""
    x = (np.arange(SAMPLES) - (SAMPLES - 1) / 2) * PIXEL
    r2 = x**2 + x[:, None] ** 2
    spot = np.sqrt(2 * POWER / np.pi) / WAIST * np.exp(-r2 / WAIST**2)
    ex, ey = (number * spot for number in retarder(11 * deg, np.pi)[:, 0])
    ex, ey = (np.fft.ifft2(np.fft.fft2(part) * transfers[0]) for part in (ex, ey))
    twice = np.arctan2(x[:, None] - CENTRE[1], x - CENTRE[0])
    cosine, sine = -1j * np.cos(twice), -1j * np.sin(twice)
    ex, ey = cosine * ex + sine * ey, sine * ex - cosine * ey
    ex, ey = (np.fft.ifft2(np.fft.fft2(part) * transfers[1]) for part in (ex, ey))
    lens = np.exp(-1j * np.pi / (WAVELENGTH * 500 * mm) * r2)
    (a, b), (c, d) = retarder(30 * deg, np.pi / 2)
    ex, ey = lens * (a * ex + b * ey), lens * (c * ex + d * ey)
    return [np.fft.ifft2(np.fft.fft2(part) * transfers[2]) for part in (ex, ey)]


def frame_of(ex, ey, angle):
    (a, b), (c, d) = np.diag([1, 0]) @ retarder(angle, np.pi / 2)
    return (abs(a * ex + b * ey) ** 2 + abs(c * ex + d * ey) ** 2) * PIXEL**2


def careful():
    ex, ey = by_hand([transfer(distance) for distance in (200 * mm, 300 * mm, 150 * mm)])
    frames = np.empty((len(ANGLES), SAMPLES, SAMPLES))
    for frame, angle in zip(frames, ANGLES, strict=True):
        frame[:] = frame_of(ex, ey, angle)
    return frames


def naive():
    transfers = [transfer(distance) for distance in (200 * mm, 300 * mm, 150 * mm)]
    return np.array([frame_of(*by_hand(transfers), angle) for angle in ANGLES[:: len(ANGLES) // SUBSET]])


def transforms(train):
    """Transforms of one component that the plan asks for."""
    plan = train.plan("cam", grid=fa.Grid(samples=SAMPLES, window=SAMPLES * PIXEL), engine="grid")
    number, components = 0, 1
    for index, step in enumerate(plan.steps):
        hop = plan.sampling.hop(index)
        components = 2 if "qp" in step.names else components
        number += components * {None: 0, "single": 1, "scaled": 2}[hop and hop.kernel]
    return number


def floor(number, samples, image, frames=None):
    for _ in range(number):
        samples = fft.fft2(samples, overwrite_x=True, workers=WORKERS)
    frames = np.empty((len(ANGLES), *image.shape)) if frames is None else frames
    together(lambda frame: np.multiply(image, 0.5, out=frame), frames)
    return frames


def taken(ways):
    """Medians of the times of some ways that take turns: of a clock, of the processor."""
    times = {name: [] for name in ways}
    for _ in range(ROUNDS):
        for name, work in ways.items():
            times[name].append(both(work))
    naive_times = len(ANGLES) // SUBSET
    return tuple(
        {
            n: statistics.median(t[kind] for t in some) * (naive_times if "naive" in n else 1)
            for n, some in times.items()
        }
        for kind in (0, 1)
    )


def over(times, name):
    return f"{times[name]:.3f}", f"{times[name] / times['library']:.2f}"


def growth(name, cases):
    """Times of several sizes of one question, with the growth from one to the next."""
    rows, before = [], None
    for label, size, work in cases:
        work()
        took = statistics.median(seconds(work)[0] for _ in range(3))
        grown = "" if before is None else f"{took / before[1]:.2f} for {size / before[0]:.2f}"
        rows.append((label, f"{took:.3f}", grown))
        before = size, took
    table(name, ("", "s", "growth"), rows)


def spaces(count):
    """Parts in turn that can't be merged: q-plates off the axis, with a space behind each."""
    parts = [part for k in range(count) for part in (fa.QPlate(q=0.5, centre=CENTRE), fa.FreeSpace(50 * mm))]
    laser = fa.Laser(waist=WAIST, power=POWER, state=fa.H)
    camera = fa.Camera(pixel=PIXEL, shape=(SAMPLES, SAMPLES), name="cam")
    return fa.Train(wavelength=WAVELENGTH).along(laser, *parts, camera)


def main():
    print(machine())
    train, analyzers = bench(), settings()
    number, image, frames = transforms(train), np.ones((SAMPLES, SAMPLES)), np.zeros((len(ANGLES), SAMPLES, SAMPLES))
    ways = {
        "library": lambda: library(train, analyzers),
        "careful script": careful,
        "naive script": naive,
        "floor": lambda: floor(number, np.ones((SAMPLES, SAMPLES), complex), image),
        "floor, frames in place": lambda: floor(number, np.ones((SAMPLES, SAMPLES), complex), image, frames),
    }
    ours, theirs = library(train, analyzers), careful()  # plans of the transforms are made once
    apart = abs(ours - theirs).max() / ours.max()
    del ours, theirs
    clock, busy = taken(ways)
    wanted = dict(zip(ways, ("", ">= 10", ">= 100", ">= 0.5", ""), strict=True))
    table(
        f"72 frames of {SAMPLES} x {SAMPLES}, medians of {ROUNDS} rounds in turn; the floor has {number} transforms",
        ("way", "s", "over library", "processor s", "over library", "wanted"),
        [(name, *over(clock, name), *over(busy, name), wanted[name]) for name in ways],
    )
    print(f"  library and careful script differ by {apart:.1e} of the peak (means over pixels against their middles)\n")
    # Grids of any size are timed below, some of them too coarse for their light.
    warnings.simplefilter("ignore", fa.SamplingWarning)
    growth("samples and pixels, 6 settings", [
        (f"{n} x {n}", n * n, lambda n=n: library(bench(n), settings(6), n)) for n in (256, 512, 1024, 2048)
    ])  # fmt: skip
    growth("parts that can't be merged, 6 settings", [
        (f"{2 * n} parts", n, lambda n=n: library(spaces(n), settings(6))) for n in (2, 4, 8)
    ])  # fmt: skip
    growth("settings", [
        (f"{n} settings", n, lambda n=n: library(train, settings(n))) for n in (9, 18, 36, 72, 144)
    ])  # fmt: skip


if __name__ == "__main__":
    start = time.perf_counter()
    main()
    print(f"took {time.perf_counter() - start:.0f} s")
