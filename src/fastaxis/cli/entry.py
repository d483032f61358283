"""Where the command line starts: Ctrl-C is caught from here on, also while the libraries load."""

from __future__ import annotations

import sys

TYPE_CHECKING = False  # nothing loads before main is called that can wait
if TYPE_CHECKING:
    from collections.abc import Sequence

__all__ = ["INTERRUPTED", "main"]

INTERRUPTED = 130


def main(arguments: Sequence[str] | None = None) -> int:
    """Run a command and return its exit code.

    0 done, 1 a mistake in the bench, 2 wrong usage, 3 an inspection with findings of high severity, 4 a formula that
    numbers don't confirm, 130 stopped with Ctrl-C.
    """
    try:
        from fastaxis.cli.running import run  # noqa: PLC0415 - loads numpy and more, for a noticeable time

        return run(arguments)
    except KeyboardInterrupt:
        sys.stderr.write("fastaxis: stopped; files already written are whole and stay where they are.\n")
        return INTERRUPTED
