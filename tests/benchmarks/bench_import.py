"""Time to import the package beside numpy alone: ``python tests/benchmarks/bench_import.py``."""

from __future__ import annotations

import statistics
import subprocess
import sys

from timing import machine, table

ROUNDS = 11
NAMES = ("numpy", "fastaxis")
HEAVY = ("sympy", "matplotlib", "scipy.optimize")


def once(name):
    """Seconds a fresh interpreter takes for one import."""
    code = f"import time; s = time.perf_counter(); import {name}; print(time.perf_counter() - s)"
    return float(subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True).stdout)


def loaded():
    """Heavy libraries that come with the import."""
    code = f"import sys, fastaxis; print(*[name for name in {HEAVY} if name in sys.modules])"
    return subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True).stdout.strip()


def main():
    print(machine())
    times = {name: [] for name in NAMES}
    for _ in range(ROUNDS):
        for name in NAMES:
            times[name].append(once(name))
    medians = {name: statistics.median(some) for name, some in times.items()}
    rows = [(name, f"{took * 1e3:.0f}", f"{took / medians['numpy']:.2f}") for name, took in medians.items()]
    table(f"import, medians of {ROUNDS} in turn; wanted: at most 1.50", ("", "ms", "over numpy"), rows)
    print(f"loaded of {', '.join(HEAVY)}: {loaded() or 'none'}")


if __name__ == "__main__":
    main()
