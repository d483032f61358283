"""All benchmarks, one after the other: ``python tests/benchmarks/run.py [name ...]``, as in ``run.py grid memory``.

Each runs in a process of its own, so that none inherits the memory or the caches of another.
"""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

HERE = Path(__file__).parent


def main():
    found = {path.stem.removeprefix("bench_"): path for path in sorted(HERE.glob("bench_*.py"))}
    unknown = set(sys.argv[1:]) - set(found)
    if unknown:
        sys.exit(f"no benchmark is called {', '.join(sorted(unknown))}; there are: {', '.join(found)}")
    failed = []
    for name in sys.argv[1:] or found:
        print(f"== {name}", flush=True)
        if subprocess.run([sys.executable, str(found[name])], check=False).returncode:
            failed.append(name)
    if failed:
        sys.exit(f"failed: {', '.join(failed)}")


if __name__ == "__main__":
    main()
