"""What fastaxis raises and warns: always the rule, what it got, and a fix that can be pasted.

Every class asks for all three parts, so none can be left out. ``str(error)`` is one sentence::

    qp: q = 0.3; q must be a multiple of 1/2: any other value leaves a cut in the plate (fix: q=0.5)
"""

import sys
import warnings
from collections.abc import Iterator
from contextlib import contextmanager
from contextvars import ContextVar
from pathlib import Path


def _sentence(rule: str, got: str, fix: str) -> str:
    return f"{got}; {rule.rstrip('.')} (fix: {fix})"


class FastaxisError(Exception):
    """Base of all errors of this package.

    Parameters
    ----------
    rule : what must hold, as a clause.
    got : the element's name and the offending value.
    fix : code the user can paste.
    """

    def __init__(self, rule: str, *, got: str, fix: str) -> None:
        self.rule, self.got, self.fix = rule, got, fix
        super().__init__(_sentence(rule, got, fix))

    def __reduce__(self) -> tuple[object, ...]:
        # Exceptions with keyword-only arguments do not survive a process pool without help.
        return (_rebuild, (type(self), self.rule, self.got, self.fix))


def _rebuild(kind: type[FastaxisError], rule: str, got: str, fix: str) -> FastaxisError:
    return kind(rule, got=got, fix=fix)


class ParameterError(FastaxisError, ValueError):
    """A parameter of a part, a state or a setting is not possible."""


class WiringError(FastaxisError, ValueError):
    """The parts are not joined in a way light can take."""


class SamplingError(FastaxisError, ValueError):
    """The grid cannot carry the field; the message names the pitch or window needed."""


class SymbolError(FastaxisError, TypeError):
    """A symbol met a numeric question, or a number-only part met a symbolic one."""


class FileFormatError(FastaxisError, ValueError):
    """A file is not what it should be, or cannot hold what it is asked to hold."""


class MissingFileError(FastaxisError, FileNotFoundError):
    """A file is not where it was looked for."""


class FastaxisWarning(UserWarning):
    """Base of all warnings; ``warnings.simplefilter("error", fa.FastaxisWarning)`` makes them errors."""

    def __init__(self, rule: str, *, got: str, fix: str) -> None:
        self.rule, self.got, self.fix = rule, got, fix
        super().__init__(_sentence(rule, got, fix))


class SlipWarning(FastaxisWarning):
    """A value is possible but looks like a slip: a missing unit, a diameter for a radius."""


class SamplingWarning(FastaxisWarning):
    """The grid carries the field, but part of it is close to the edge of the window or of the band."""


class WiringWarning(FastaxisWarning):
    """The train can be answered, but something about its wiring is probably not meant."""


_PACKAGE = str(Path(__file__).parent)

_HELD: ContextVar[list[FastaxisWarning] | None] = ContextVar("cautions held back", default=None)


@contextmanager
def cautions_held() -> Iterator[list[FastaxisWarning]]:
    """Cautions of this thread are put on a list instead of being told; those of other threads are told as ever.

    >>> with cautions_held() as held:
    ...     caution(SlipWarning("a radius is half a diameter", got="radius = 4", fix="radius=2"))
    >>> [warning.fix for warning in held]
    ['radius=2']
    """
    held: list[FastaxisWarning] = []
    token = _HELD.set(held)
    try:
        yield held
    finally:
        _HELD.reset(token)


def caution(warning: FastaxisWarning) -> None:
    """Warn at the user's own line, however deep inside the package the finding was made."""
    held = _HELD.get()
    if held is not None:
        held.append(warning)
        return
    level = 2
    frame = sys._getframe(1)  # noqa: SLF001 - the documented way to find the caller
    while frame.f_back is not None and frame.f_code.co_filename.startswith(_PACKAGE):
        frame, level = frame.f_back, level + 1
    warnings.warn(warning, stacklevel=level)
