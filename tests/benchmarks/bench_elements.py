"""How the time of a frame grows with the number of parts: ``python tests/benchmarks/bench_elements.py``.

* plates in a row, which the plan makes one matrix of;
* plates and spaces in turn round about the axis, which it sorts into one matrix and one travel;
* q-plates with a space behind each, which nothing merges: on the axis and beside it;
* splitters in a row with a meter at each side, the ledger of them all.

Every exposure is of a bench never seen before, the beam a little wider each time, so that nothing is remembered.
"""

from __future__ import annotations

import itertools

from bench_grid import growth
from timing import machine

import fastaxis as fa
from fastaxis.units import mm, nm, um

TURN = itertools.count()


def start():
    return fa.Laser(waist=(0.8 + 1e-5 * next(TURN)) * mm, state=fa.L, name="laser")


def frame(*parts):
    camera = fa.Camera(pixel=20 * um, shape=(128, 128), name="cam")
    train = fa.Train(wavelength=633 * nm, name="Gannet Stack").along(start(), *parts, camera)
    return train.expose("cam", fa.SIX_STATES).frames


def plates(count):
    return [fa.Retarder(fast=0.1 * k % 3, retardance=1.0) for k in range(count)]


def turns(count, *parts):
    """Plates with some parts behind each."""
    return [part for plate in plates(count) for part in (plate, *parts)]


def singular(count, centre):
    """Turned alternately, so that the charge does not run away."""
    spaces = fa.FreeSpace(200 * mm)
    return [part for k in range(count) for part in (fa.QPlate(q=0.5, offset=0.1 * k % 3, centre=centre), spaces)]


def split(count):
    """Watts on every edge of a row of splitters with a meter at each side."""
    names = [f"split{k}" for k in range(count)]
    train = fa.Train(wavelength=633 * nm, name="Gannet Stack")
    train.along(start(), *(fa.BeamSplitter(reflectance=0.1, name=name) for name in names), fa.Detector(name="end"))
    for name in names:
        train.along(f"{name}.reflected", fa.Detector(name=f"{name} meter"))
    return train.ledger()


CASES = {
    "plates in a row": ((32, 64, 128, 256, 512), lambda count: frame(*plates(count))),
    "plates and spaces in turn": ((16, 32, 64, 128, 256), lambda count: frame(*turns(count, fa.FreeSpace(1 * mm)))),
    "q-plates and spaces, on the axis": ((1, 2, 4, 8), lambda count: frame(*singular(count, (0.0, 0.0)))),
    "q-plates and spaces, beside the axis": ((1, 2, 4, 8), lambda count: frame(*singular(count, (0.1 * mm, 0.0)))),
    "splitters in a row, ledger": ((8, 16, 32, 64), split),
}


def main():
    print(machine())
    for name, (counts, work) in CASES.items():
        growth(name, [(str(count), count, lambda n=count, run=work: run(n)) for count in counts])


if __name__ == "__main__":
    main()
