"""Memory of a train on 4096 x 4096 samples, reading onto a camera of as many pixels included.

``python tests/benchmarks/bench_memory.py``: each case runs in a process of its own; counted are the arrays asked for
(tracemalloc; memory of frames is asked of the system and is not in it) and the largest resident size of the process
above that before the work (resource), which has everything in it.
"""

from __future__ import annotations

import resource
import subprocess
import sys
import tracemalloc

from timing import machine, seconds, table

SAMPLES = 4096
CASES = (("double", 16), ("single", 8))


def measure(precision, samples):
    """Print the peak of arrays, the growth of the process and the time of one exposure."""
    from bench_grid import bench, library, settings

    train, one = bench(samples), settings(6)[:1]
    library(bench(256), one, 256, precision=precision)  # imports are not part of it
    before = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
    tracemalloc.start()
    took, _ = seconds(lambda: library(train, one, samples, precision=precision))
    peak = tracemalloc.get_traced_memory()[1]
    print(peak, (resource.getrusage(resource.RUSAGE_SELF).ru_maxrss - before) * 1024, took)


def main():
    print(machine())
    rows = []
    for precision, size in CASES:
        asked = [sys.executable, __file__, precision, str(SAMPLES)]
        done = subprocess.run(asked, capture_output=True, text=True, check=True)
        arrays, grown, took = map(float, done.stdout.split())
        field = 2 * SAMPLES**2 * size
        rows.append(
            (precision, f"{field / 1e6:.0f}", f"{arrays / field:.2f}", f"{grown / field:.2f}", "< 3.5", f"{took:.1f}")
        )
    head = ("samples", "field MB", "arrays / field", "process / field", "wanted", "s")
    table(f"largest memory, {SAMPLES} x {SAMPLES} samples of two components, as many pixels, one frame", head, rows)


if __name__ == "__main__":
    measure(sys.argv[1], int(sys.argv[2])) if len(sys.argv) > 2 else main()
