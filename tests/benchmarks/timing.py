"""What the benchmarks share: a clock, the line about the machine, tables."""

from __future__ import annotations

import os
import platform
import time
from pathlib import Path

import numpy as np
import scipy


def seconds(work):
    """(time taken, result)."""
    start = time.perf_counter()
    result = work()
    return time.perf_counter() - start, result


def both(work):
    """(time taken, processor time taken by all threads); what the work gives is freed before the next."""
    start, busy = time.perf_counter(), time.process_time()
    result = work()
    took = time.perf_counter() - start, time.process_time() - busy
    del result
    return took


def machine():
    """Processor, load and versions in one line."""
    cpus = Path("/proc/cpuinfo")
    lines = cpus.read_text(encoding="utf-8").splitlines() if cpus.exists() else []
    name = next((line.split(":")[1].strip() for line in lines if line.startswith("model name")), platform.machine())
    threads = os.environ.get("OPENBLAS_NUM_THREADS", "unset")
    return (
        f"{name}, {os.cpu_count()} cores, load {os.getloadavg()[0]:.1f}; Python {platform.python_version()}, "
        f"numpy {np.__version__}, scipy {scipy.__version__}, OPENBLAS_NUM_THREADS={threads}"
    )


def table(title, head, rows):
    """Print a table whose columns are as wide as they need to be."""
    cells = [head, *rows]
    widths = [max(len(str(row[column])) for row in cells) for column in range(len(head))]
    print(title)
    for row in cells:
        first, *rest = (str(cell) for cell in row)
        print("  " + "  ".join([first.ljust(widths[0]), *(c.rjust(w) for c, w in zip(rest, widths[1:], strict=True))]))
    print()
