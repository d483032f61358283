"""``fastaxis explain``: what the bench is, what will be worked out and how, and where power leaves."""

from __future__ import annotations

from argparse import Namespace
from pathlib import Path

from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.console import say, tell
from fastaxis.cli.safety import caution, port_powers
from fastaxis.cli.targets import targets
from fastaxis.report.bench import draw_bench, reflections_in_words
from fastaxis.report.save import save

__all__ = ["explain"]


def explain(bench: BenchFile, options: Namespace) -> None:
    """Print the parts and the plan of each camera, draw the bench, name open ports and cautions."""
    train = bench.train.with_values(dict(options.symbol)) if options.symbol else bench.train
    say(str(train))
    train.validate()
    if options.cards:
        for element in train.elements.values():
            say()
            say(str(element))
    for target in targets(train, options.camera):
        say()
        say(f"{target}: {reflections_in_words(train, target)}")
        if not train.symbols:
            say(str(train.plan(target, grid=options.grid)))
    powers = {} if train.symbols else port_powers(train)
    out = Path(options.out) if options.out else Path(f"{bench.path.stem}_explained")
    for path in save(
        draw_bench(train, powers=powers, view=options.view), out / "bench", options.format, view=options.view
    ):
        say(f"Drawn in {path}")
    if ports := train.open_ports():
        say(f"Open ports: {', '.join(ports)}")
    if warning := caution(train, powers):
        tell(warning, style="bold yellow")
