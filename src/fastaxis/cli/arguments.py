"""What can be typed after ``fastaxis``."""

from __future__ import annotations

from argparse import ArgumentParser, ArgumentTypeError
from collections.abc import Callable
from pathlib import Path
from typing import Any, NoReturn

from fastaxis import __version__
from fastaxis.cli import choices
from fastaxis.cli.quantities import assignment
from fastaxis.conventions import View
from fastaxis.errors import FastaxisError
from fastaxis.plan.choose import ENGINES

__all__ = ["parser"]

_EXIT_CODES = (
    "exit codes: 0 done, 1 a mistake in the bench, 2 wrong usage, 3 (inspect) a finding of high severity, "
    "4 (derive) a formula that numbers don't confirm, 130 stopped with Ctrl-C"
)


class _Parser(ArgumentParser):
    """A parser whose complaints are one line."""

    def error(self, message: str) -> NoReturn:
        self.exit(2, f"{self.prog}: {message} (see {self.prog} --help)\n")


def _typed(read: Callable[[str], Any]) -> Callable[[str], Any]:
    """A reader whose complaints are complaints about usage."""

    def reader(text: str) -> Any:
        try:
            return read(text)
        except FastaxisError as error:
            raise ArgumentTypeError(str(error)) from error

    return reader


def _bench(text: str) -> Path:
    path = Path(text)
    if not path.is_file():
        raise ArgumentTypeError(f"there is no file {text}")
    return path


def _folder(text: str) -> str:
    # Told before the work is done, not when its results are to be written.
    if Path(text).exists() and not Path(text).is_dir():
        raise ArgumentTypeError(f"{text} is a file; results are written to a folder (fix: --out {text}_results)")
    return text


def _decades(text: str) -> float:
    if not text.isdecimal() or not 1 <= int(text) <= 12:
        raise ArgumentTypeError(f"decades are a whole number from 1 to 12, not '{text}'")
    return float(text)


def _dots(text: str) -> int:
    if not text.isdecimal() or not 20 <= int(text) <= 1200:
        raise ArgumentTypeError(f"dots an inch are a whole number from 20 to 1200, not '{text}'")
    return int(text)


def _setting(text: str) -> str:
    choices.one_setting(text)  # complains about what is no setting
    return text


def _view(text: str) -> View:
    try:
        return View(text)
    except ValueError:
        raise ArgumentTypeError(f"a view is {' or '.join(view.value for view in View)}, not '{text}'") from None


def _of_bench(commands: Any, name: str, does: str) -> ArgumentParser:
    """A command on a whole bench."""
    command: ArgumentParser = commands.add_parser(name, help=does, description=does, epilog=_EXIT_CODES)
    command.add_argument("bench", type=_bench, metavar="BENCH.py", help="Python file that defines train")
    command.add_argument("--symbol", action="append", default=[], type=_typed(assignment), metavar="LETTER=VALUE",
                         help="value of a letter in the bench, e.g. theta=22.5deg; may be repeated")  # fmt: skip
    return command


def _command(commands: Any, name: str, does: str) -> ArgumentParser:
    """A command on the cameras of a bench."""
    command = _of_bench(commands, name, does)
    command.add_argument("--camera", metavar="NAME", help="camera, detector or port; all cameras if left out")
    command.add_argument("--view", type=_view, default=View.RECEIVER, metavar="receiver|source",
                         help="whose names R and L are (receiver: R is clockwise facing the source)")  # fmt: skip
    return command


def _writes_figures(command: ArgumentParser) -> None:
    told = f"how the light is worked out: {', '.join(ENGINES)}; auto takes the quickest that can"
    command.add_argument("--engine", choices=("auto", *ENGINES), default="auto", metavar="NAME", help=told)
    command.add_argument("--out", type=_folder, metavar="DIR", help="folder to write to; made if it is not there")
    command.add_argument("--grid", type=_typed(choices.grid), metavar="SAMPLES,WINDOW",
                         help="samples at the laser, e.g. 1024,8mm; chosen from the bench if left out")  # fmt: skip
    command.add_argument("--format", type=_typed(choices.formats), default=("png", "pdf"), metavar="png,pdf",
                         help="of the figures")  # fmt: skip
    command.add_argument("--dpi", type=_dots, default=160, metavar="N", help="dots an inch of the png figures")


def parser() -> ArgumentParser:
    """The parser of all commands."""
    top = _Parser(prog="fastaxis", description="Predict and explain an optical bench.", epilog=_EXIT_CODES)
    top.add_argument("--version", action="version", version=f"fastaxis {__version__}")
    commands = top.add_subparsers(dest="command", required=True, metavar="COMMAND")
    predict = _command(commands, "predict", "Camera frames for every analyzer setting, maps, drawing and a table.")
    predict.add_argument("--settings", type=_typed(choices.settings), metavar="six|four|linear:N|plate:N",
                         help="analyzer settings; the bench's own settings, or six, if left out")  # fmt: skip
    predict.add_argument("--decades", type=_decades, metavar="N",
                         help="frames on a logarithmic scale, N powers of ten deep: shows faint rings")  # fmt: skip
    _writes_figures(predict)
    derive = _command(commands, "derive", "The light at a camera as a formula, letters left as letters.")
    derive.add_argument("--setting", type=_typed(_setting), metavar="H|..|ANGLE|LETTER",
                        help="also the frame behind this analyzer: a state, an angle, or a letter for it")  # fmt: skip
    derive.add_argument("--latex", action="store_true", help="write the formulas for LaTeX")
    explain = _command(commands, "explain", "The parts, the plan, the drawing, open ports and cautions.")
    explain.add_argument("--cards", action="store_true", help="also the card of every part: matrix, H, D, R, losses")
    _writes_figures(explain)
    inspect = _of_bench(commands, "inspect", "What may be wrong with a bench before it is built; laser cautions.")
    inspect.add_argument("--json", action="store_true", help="write the findings as JSON")
    inspect.add_argument("--brief", action="store_true", help="leave out notes")
    inspect.add_argument("--out", type=_folder, metavar="DIR", help="folder for inspection.txt, .json, .pdf and .png")
    return top
