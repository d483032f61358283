"""Where the command line writes: results on stdout; progress, cautions and errors on stderr."""

from __future__ import annotations

import warnings
from collections.abc import Iterator
from contextlib import contextmanager
from typing import Any

from rich.console import Console
from rich.progress import BarColumn, Progress, TextColumn, TimeElapsedColumn

from fastaxis.errors import FastaxisWarning

__all__ = ["cautions", "console", "progress", "say", "tell"]

WIDE = 160  # columns of a file or a pipe: no table is cut there


def console(*, error: bool = False) -> Console:
    """A console on the present stdout or stderr; text is never taken as markup."""
    shown = Console(stderr=error, highlight=False, markup=False, soft_wrap=True)
    if not shown.is_terminal:
        shown.width = WIDE
    return shown


def say(text: Any = "") -> None:
    """Write a result."""
    console().print(text)


def tell(text: str, *, style: str = "") -> None:
    """Write a remark to stderr."""
    console(error=True).print(text, style=style)


@contextmanager
def progress(what: str, total: int) -> Iterator[Any]:
    """A progress bar on a terminal, nothing elsewhere; gives a function that moves it on by one, with a word."""
    columns = (
        TextColumn("{task.description}"),
        BarColumn(),
        TextColumn("{task.completed}/{task.total}"),
        TimeElapsedColumn(),
    )
    shown = console(error=True)
    with Progress(*columns, console=shown, transient=True, disable=not shown.is_terminal) as bar:
        task = bar.add_task(what, total=total)

        def move_on(word: str = "") -> None:
            bar.update(task, advance=1, description=word or what)

        yield move_on


@contextmanager
def cautions() -> Iterator[None]:
    """Show each warning once, as one line; ours are about the bench, others about a library."""
    told: set[str] = set()

    def show(message: Warning | str, *_: Any, **__: Any) -> None:
        if str(message) not in told:
            told.add(str(message))
            kind = "caution" if isinstance(message, FastaxisWarning) else "warning"
            tell(f"{kind}: {message}", style="yellow")

    with warnings.catch_warnings():
        warnings.simplefilter("always")
        warnings.showwarning = show
        yield
