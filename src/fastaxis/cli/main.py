"""The entry of the command line: arguments in, an exit code out, one sentence for every mistake."""

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

__all__ = ["BENCH_ERROR", "INTERRUPTED", "OK", "main"]

OK, BENCH_ERROR, INTERRUPTED = 0, 1, 130  # 2, wrong usage, is argparse's

COMMANDS: dict[str, Callable[[BenchFile, Namespace], int | None]] = {
    "predict": predict,
    "derive": derive,
    "explain": explain,
    "inspect": inspect,
}


def main(arguments: Sequence[str] | None = None) -> int:
    """Run a command and return its exit code.

    0 done, 1 a mistake in the bench, 2 wrong usage, 3 an inspection with findings of high severity, 130 stopped.
    """
    options = parser().parse_args(arguments)
    try:
        with cautions():
            return COMMANDS[options.command](read_bench(options.bench), options) or OK
    except (FastaxisError, BenchFileError) as error:
        tell(f"fastaxis: {error}", style="red")
        return BENCH_ERROR
    except OSError as error:
        tell(f"fastaxis: {error.filename or 'output'}: {error.strerror}", style="red")
        return BENCH_ERROR
    except KeyboardInterrupt:
        tell("fastaxis: stopped; files already written are whole and stay where they are.")
        return INTERRUPTED
