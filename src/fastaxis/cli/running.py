"""From arguments to an exit code, with one sentence for every mistake."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Callable, Sequence

from fastaxis.cli.arguments import parser
from fastaxis.cli.bench_file import BenchFile, BenchFileError, read_bench
from fastaxis.cli.console import cautions, tell
from fastaxis.cli.derive import derive
from fastaxis.cli.explain import explain
from fastaxis.cli.inspect import inspect
from fastaxis.cli.predict import predict
from fastaxis.errors import FastaxisError

__all__ = ["BENCH_ERROR", "OK", "run"]

OK, BENCH_ERROR = 0, 1  # 2, wrong usage, is argparse's

COMMANDS: dict[str, Callable[[BenchFile, Namespace], int | None]] = {
    "predict": predict,
    "derive": derive,
    "explain": explain,
    "inspect": inspect,
}


def run(arguments: Sequence[str] | None = None) -> int:
    """Run a command and return its exit code; Ctrl-C is left to the caller."""
    options = parser().parse_args(arguments)
    try:
        with cautions():
            return COMMANDS[options.command](read_bench(options.bench), options) or OK
    except (FastaxisError, BenchFileError) as error:
        tell(f"fastaxis: {error}", style="red")
    except OSError as error:
        tell(f"fastaxis: {error.filename or 'output'}: {error.strerror}", style="red")
    except MemoryError:
        tell("fastaxis: not memory enough for this; ask for fewer pixels, samples or settings", style="red")
    return BENCH_ERROR
