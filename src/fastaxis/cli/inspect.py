"""``fastaxis inspect``: what is wrong, or may be, with a bench before it is built."""

from __future__ import annotations

from argparse import Namespace
from pathlib import Path

from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.console import say
from fastaxis.cli.letters import with_letters
from fastaxis.inspect import inspect_train

__all__ = ["HIGH_FINDINGS", "inspect"]

HIGH_FINDINGS = 3  # exit code; 1 and 2 are taken by mistakes in the bench file and in the command


def inspect(bench: BenchFile, options: Namespace) -> int:
    """Print the findings, write them to files if asked, and return 3 when one is of high severity, else 0."""
    train = with_letters(bench.train, options)
    inspection = inspect_train(train)
    say(inspection.json() if options.json else inspection.text(notes=not options.brief))
    if options.out:
        folder = Path(options.out)
        for ending in ("txt", "json", "pdf", "png"):
            for path in inspection.save(folder / f"inspection.{ending}"):
                if not options.json:
                    say(f"Written {path}")
    return 0 if inspection.passed else HIGH_FINDINGS
