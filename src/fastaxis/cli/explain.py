"""``fastaxis explain``: what the bench is, what will be worked out and how, and where power leaves."""

from __future__ import annotations

from argparse import Namespace
from pathlib import Path
from typing import Any

from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.console import say, tell
from fastaxis.cli.letters import with_letters
from fastaxis.cli.safety import caution, port_powers, watts
from fastaxis.cli.targets import sensors
from fastaxis.conventions import View, stamp
from fastaxis.report.bench import draw_bench, reflections_in_words
from fastaxis.report.card import card
from fastaxis.report.save import save

__all__ = ["explain"]


def explain(bench: BenchFile, options: Namespace) -> None:
    """Print the parts and the plan of each camera, draw the bench, name open ports and cautions.

    The drawing comes before the wiring is checked: a wrong joint is found most quickly on it.
    """
    train = with_letters(bench.train, options)
    say(str(train))
    if options.view is not View.RECEIVER:
        say("(in this listing R and L are named by the receiver; below, by the source)")
    powers = port_powers(train)
    _draw(train, powers, bench, options)
    train.validate()
    for element in train.elements.values() if options.cards else ():
        say(f"\n{card(element, options.view)}")
    for target in [options.camera] if options.camera else sensors(train):
        _explain_target(train, target, options)
    say()
    most = max(powers.values(), default=0.0)
    for port in train.open_ports():
        say(f"open: {port}" + (f", {watts(powers[port], most)}" if port in powers else ""))
    _say_ledger(train)
    say(stamp(options.view))
    if warning := caution(train, powers):
        tell(warning, style="bold yellow")


def _say_ledger(train: Any) -> None:
    """Where all the watts go; letters leave that open."""
    if train.symbols:
        return
    say(str(train.ledger()).removesuffix(stamp()).rstrip())


def _draw(train: Any, powers: dict[str, float], bench: BenchFile, options: Namespace) -> None:
    out = Path(options.out) if options.out else Path(f"{bench.path.stem}_explained")
    figure = draw_bench(train, powers=powers, view=options.view)
    for path in save(figure, out / "bench", options.format, view=options.view, dpi=options.dpi):
        say(f"Drawn in {path}")


def _explain_target(train: Any, target: str, options: Namespace) -> None:
    say(f"\n{target}: {reflections_in_words(train, target)}")
    if not train.symbols:
        say(str(train.plan(target, grid=options.grid, engine=options.engine)).removesuffix(stamp()).rstrip())
