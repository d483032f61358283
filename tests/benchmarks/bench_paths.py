"""Two arms beside the arms by themselves: ``python tests/benchmarks/bench_paths.py``.

A bench of two arms is to cost at most 1.2 times the sum of its arms. Every exposure is of a bench never seen before
(the beam a little wider each time), so that nothing is remembered; medians of three rounds in turn.
"""

from __future__ import annotations

import statistics

from timing import machine, seconds, table

import fastaxis as fa
from fastaxis.units import deg, mm, mrad, nm

ROUNDS = 3
SLIT = fa.Slit(width=0.6 * mm, name="slit")
SPIRAL, HOLE = fa.SpiralPlate(charge=2, name="spiral"), fa.Aperture(radius=0.7 * mm, name="hole")
CASES = {
    "like arms": ([], []),
    "lens": ([fa.Lens(focal=1.0, name="lens")], []),
    "tilt": ([], [fa.Wedge(x=1 * mrad, name="wedge")]),
    "lens, tilt": ([fa.Lens(focal=1.0, name="lens")], [fa.Wedge(x=1 * mrad, name="wedge")]),
    "spiral": ([SPIRAL], []),
    "two spirals": ([SPIRAL], [fa.SpiralPlate(charge=-2, name="other")]),
    "spiral, tilt": ([SPIRAL], [fa.Wedge(x=2 * mrad, name="wedge")]),
    "hole, tilt": ([HOLE], [fa.Wedge(x=1 * mrad, name="wedge")]),
    "hole": ([HOLE], []),
    "hole, plate, tilt": ([HOLE, fa.HalfWavePlate(fast=20 * deg, name="hwp")], [fa.Wedge(x=1 * mrad, name="wedge")]),
    "slit, tilt": ([SLIT], [fa.Wedge(x=1 * mrad, name="wedge")]),
    "slit, hole": ([SLIT], [HOLE]),
}


def start(turn):
    return fa.Train(wavelength=632.8 * nm).along(fa.Laser(waist=(1 + 1e-4 * turn) * mm, name="laser"))


def camera(pixels):
    return fa.FreeSpace(0.1, name="end"), fa.Camera(pixel=3.2 * mm / pixels, shape=(pixels, pixels), name="cam")


def two(arm, other, pixels, turn):
    train = start(turn).along(
        "laser", fa.BeamSplitter(name="in"), fa.FreeSpace(0.3, name="a"), *arm, fa.Mirror(name="m1"),
        fa.BeamSplitter(name="out"), *camera(pixels),
    )  # fmt: skip
    return train.along("in.reflected", fa.FreeSpace(0.25, name="b"), fa.Mirror(name="m2"), *other, "out.side")


def one(parts, length, pixels, turn):
    return start(turn).along("laser", fa.FreeSpace(length, name="a"), *parts, fa.Mirror(name="m1"), *camera(pixels))


def main():
    print(machine())
    rows, turn = [], 0
    for name, (arm, other) in CASES.items():
        for pixels in (256, 1024):
            took = []
            for _ in range(ROUNDS):
                turn += 1
                benches = (
                    one(arm, 0.3, pixels, turn),
                    one(other, 0.25, pixels, turn + 0.5),
                    two(arm, other, pixels, turn + 0.25),
                )
                took.append([seconds(lambda bench=bench: bench.expose("cam", fa.H).frame(0))[0] for bench in benches])
            a, b, both = (statistics.median(times) for times in zip(*took, strict=True))
            engines = "+".join(branch.engine for branch in benches[2].plan("cam").branches)
            rows.append((name, pixels, engines, f"{a:.3f}", f"{b:.3f}", f"{both:.3f}", f"{both / (a + b):.2f}"))
    table("one frame, seconds", ("arms differ by", "pixels", "engines", "one", "other", "both", "ratio"), rows)
    return 0


if __name__ == "__main__":
    raise SystemExit(main())
