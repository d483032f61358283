"""``fastaxis derive``: the light at a camera as formulas."""

from __future__ import annotations

from argparse import Namespace
from typing import Any

from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.console import say
from fastaxis.cli.targets import targets

__all__ = ["derive"]


def derive(bench: BenchFile, options: Namespace) -> None:
    """Print the field, the Stokes parameters and, where asked, a frame, each as a formula."""
    train = bench.train.with_values(dict(options.symbol)) if options.symbol else bench.train
    for target in targets(train, options.camera):
        form: Any = train.derive(target)
        say(form.latex() if options.latex else str(form))
