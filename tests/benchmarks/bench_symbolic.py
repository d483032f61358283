"""Times of forms beside the plain way: ``python tests/benchmarks/bench_symbolic.py [--plain]``.

Without ``--plain`` the slow side (the sympy matrix product with simplify; 120 s for three plates) is left out.
"""

from __future__ import annotations

import multiprocessing
import sys
import time

import sympy as sp

import fastaxis as fa
from fastaxis.engines.symbolic import derive
from fastaxis.engines.symbolic.ring import ExactMaths, Ring

THETA = sp.Symbol("theta", real=True)


def seconds(work):
    start = time.perf_counter()
    work()
    return time.perf_counter() - start


def bench(*parts):
    train = fa.Train(wavelength=532e-9)
    return train.along(fa.Laser(waist=0.8e-3), *parts, fa.Camera(pixel=5e-6, shape=(8, 8), name="cam"))


def eight_plates(prefix):
    """Six half-wave plates and two q-plates, every angle a letter."""
    axes = sp.symbols(f"{prefix}0:8", real=True)
    q1, q2 = sp.symbols(f"{prefix}q1 {prefix}q2", real=True)
    parts = [fa.HalfWavePlate(fast=axis) for axis in axes[:6]]
    return [*parts[:3], fa.QPlate(q=q1, offset=axes[6]), *parts[3:], fa.QPlate(q=q2, offset=axes[7])]


def retarders(count, prefix):
    letters = sp.symbols(f"{prefix}0:{2 * count}", real=True)
    return [fa.Retarder(fast=letters[2 * n], retardance=letters[2 * n + 1]) for n in range(count)]


def everything(parts):
    form = derive(bench(*parts), "cam")
    return form.jones(), form.stokes, form.frame(THETA)


def frame_only(parts):
    """The frame, written short: what the plain way works out."""
    return derive(bench(*parts), "cam").frame(THETA)


def in_the_ring(parts):
    """Field, Stokes parameters and frame without writing them as sympy expressions."""
    form = derive(bench(*parts), "cam")
    return form.pairs, form.stokes_polys(), form.frame_poly(THETA)


def plainly(count):
    """The frame of general retarders by sympy matrices, expanded and simplified as one would by hand."""
    field = sp.Matrix([1, 0])
    for plate in retarders(count, "x"):
        d, a = plate.retardance, plate.fast
        turn = sp.Matrix([[sp.cos(2 * a), sp.sin(2 * a)], [sp.sin(2 * a), -sp.cos(2 * a)]])
        field = (sp.cos(d / 2) * sp.eye(2) - sp.I * sp.sin(d / 2) * turn) * field
    passed = sp.cos(THETA) * field[0] + sp.sin(THETA) * field[1]
    sp.simplify(sp.expand(passed * sp.conjugate(passed)))


def plain_seconds(count, limit=120.0):
    """Time of the plain way, or None where it was stopped at the limit."""
    process = multiprocessing.get_context("spawn").Process(target=plainly, args=(count,))
    start = time.perf_counter()
    process.start()
    process.join(limit)
    if process.is_alive():
        process.terminate()
        process.join()
        return None
    return time.perf_counter() - start


def products(size=400):
    """Nanoseconds a term product of the ring takes."""
    maths, letters = ExactMaths(Ring()), sp.symbols("y0:10", real=True)
    polys = []
    for offset in (0, 1):
        total = maths.ring.zero
        for n in range(size):
            digits = [(n * 7919 + offset * 104729) // 3**k % 3 - 1 for k in range(10)]
            total = total + maths.phasor(sum(d * x for d, x in zip(digits, letters, strict=True)))
        polys.append(total)
    return 1e9 * seconds(lambda: polys[0] * polys[1]) / (len(polys[0]) * len(polys[1]))


def main():
    everything(eight_plates("warm"))  # imports and sympy's own tables
    print(f"6 half-wave plates + 2 q-plates: {seconds(lambda: everything(eight_plates('a'))):.3f} s")
    print(f"one product of terms: {products():.0f} ns")
    print("general retarders | in the ring | frame, short | field, Stokes and frame, short | frame by plain sympy")
    for count in (1, 2, 3, 4):
        ring = seconds(lambda: in_the_ring(retarders(count, f"b{count}_")))  # noqa: B023  # called at once
        short = seconds(lambda: frame_only(retarders(count, f"c{count}_")))  # noqa: B023  # called at once
        whole = seconds(lambda: everything(retarders(count, f"d{count}_")))  # noqa: B023  # called at once
        text = f"{count:17d} | {ring:9.3f} s | {short:10.3f} s | {whole:28.3f} s"
        if "--plain" in sys.argv and count <= 3:
            plain = plain_seconds(count)
            text += " | > 120 s" if plain is None else f" | {plain:.1f} s, {plain / short:.0f} times slower"
        print(text, flush=True)


if __name__ == "__main__":
    main()
