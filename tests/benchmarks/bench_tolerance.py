"""A tolerance study beside propagating its draws: ``python tests/benchmarks/bench_tolerance.py [draws]``.

Twelve parameters, 10 000 draws. On a centred train a distance and a waist are among them, on the grid the place of a
q-plate as well. The other way is timed on a few of the same draws and multiplied up, which is fair since each draw takes
the same work; those draws also say how far the response surface is off. The last line is a polarimeter of 64 settings
and five figures of merit, all of them exact.
"""

from __future__ import annotations

import os
import platform
import runpy
import sys
import time
from pathlib import Path

import numpy as np

import fastaxis as fa
from fastaxis.studies.tolerance import measured, normal, power_at, ring_radius, uniform
from fastaxis.units import deg, mm, mW, nm, um

EXAMPLE = Path(__file__).parents[2] / "train_examples" / "teasel_bank_twelve_knobs.py"
FEW = 12
PLATES = (
    "hwp.fast", "hwp.retardance", "q1.fast", "q1.retardance", "qp.offset", "qp.retardance", "h2.fast", "q2.fast",
    "pol.axis",
)  # fmt: skip


def shaped():
    """Plates, a q-plate and a polarizer in front of a camera."""
    return runpy.run_path(str(EXAMPLE))["train"]


def polarimeter():
    """A turned quarter-wave plate in front of a polarizer."""
    return fa.Train(wavelength=633 * nm, name="Low Quay").along(
        fa.Laser(waist=0.5 * mm, power=1 * mW, state=fa.elliptical(20 * deg, 15 * deg), name="laser"),
        fa.QuarterWavePlate(fast=0 * deg, name="plate"),
        fa.Polarizer(axis=0 * deg, name="analyzer"),
        fa.Detector(name="meter"),
    )


def seconds(work):
    start = time.perf_counter()
    result = work()
    return time.perf_counter() - start, result


def compared(name, train, errors, merits, draws):
    """One line of the table."""
    took, found = seconds(lambda: train.tolerance(errors, merits, draws=draws))
    few, exact = seconds(lambda: train.tolerance(errors, merits, draws=FEW, accuracy=0).values)
    off = np.abs(found.values[:FEW] - exact).max(axis=0) / found.values.std(axis=0)
    used = [found.surfaces[merit].used if merit in found.surfaces else True for merit in merits]
    print(f"{name:<22}{draws:>7}{took:>10.2f}{few * draws / FEW:>12.0f}{few * draws / FEW / took:>8.0f}"
          f"{off.max():>10.1e}  {'' if all(used) else 'propagated'}")  # fmt: skip
    return few * draws / FEW / took


def main():
    draws = int(sys.argv[1]) if len(sys.argv) > 1 else 10_000
    print(f"{platform.processor() or platform.machine()}, {os.cpu_count()} cores, load {os.getloadavg()[0]:.1f}; "
          f"Python {platform.python_version()}, numpy {np.__version__}")  # fmt: skip
    print(f"{'bench':<22}{'draws':>7}{'study s':>10}{'one by one s':>12}{'ratio':>8}{'off/sigma':>10}")
    merits = {"behind H": power_at("cam", fa.H), "ring": ring_radius("cam")}
    shape = {"space.distance": normal(5 * mm), "laser.waist": normal(0.02 * mm)}
    plates = {name: normal(0.5 * deg) for name in PLATES}
    centred = {**plates, "q2.retardance": normal(0.5 * deg), **shape}
    ratios = [
        compared("centred", shaped(), centred, merits, draws),
        compared("grid, off the axis", shaped(), {**plates, **shape, "qp.centre_x": uniform(50 * um)}, merits, draws),
    ]
    settings = fa.rotating_plate(64, span=360 * deg)
    read = {
        one: measured("meter", one, knob="plate.fast", settings=settings)
        for one in ("s1", "s2", "s3", "azimuth", "ellipticity")
    }
    errors = {"plate.retardance": normal(1 * deg), "plate.fast": normal(0.5 * deg), "analyzer.axis": normal(0.2 * deg)}
    took, _ = seconds(lambda: polarimeter().tolerance(errors, read, draws=draws))
    print(f"{'polarimeter, 64 angles':<22}{draws:>7}{took:>10.2f}")
    print(f"wanted: at least 10 times faster than one by one; found {min(ratios):.0f}")
    return 0 if min(ratios) >= 10 else 1


if __name__ == "__main__":
    raise SystemExit(main())
