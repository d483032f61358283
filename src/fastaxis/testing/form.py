"""A closed form against an expected expression."""

from __future__ import annotations

from typing import Any

import numpy as np

from fastaxis.errors import ParameterError
from fastaxis.testing.failing import BenchError
from fastaxis.testing.kinds import about_a_train

__all__ = ["form_equal"]

POINTS = 12
# Expressions of a few dozen terms near 1 lose a few digits of sixteen; two different ones differ by far more at some
# of twelve random points.
SAME = 1e-9


@about_a_train
def form_equal(train: Any, target: str, expected: Any, *, behind: Any) -> None:
    """The derived frame behind an analyzer, relative to the envelope, equals an expression in the same letters.

    Compared with numbers at random points: a difference shows, whatever the shape both are written in.

    Parameters
    ----------
    train : with letters.
    target : camera, detector or port.
    expected : sympy expression, as for ``train.derive(target).frame(behind)``.
    behind : analyzer angle [rad], state or setting.

    Raises
    ------
    BenchError : it is another.
    ParameterError : what is expected is no expression.
    """
    derived = train.derive(target).frame(behind)
    expected = _expression(derived, expected)
    difference = derived - expected
    letters = sorted(derived.free_symbols | expected.free_symbols, key=str)
    generator = np.random.default_rng(20)
    worst = 0.0
    for _ in range(POINTS):
        values = dict(zip(letters, generator.uniform(0.2, 1.2, len(letters)).tolist(), strict=True))
        size = max(1.0, abs(complex(derived.subs(values))))
        worst = max(worst, abs(complex(difference.subs(values))) / size)
    if not worst <= SAME:
        raise BenchError(
            f"{train.name}: {target}",
            expected=str(expected),
            got=f"{derived}, which differs by up to {worst:.2g} at random points",
            cause=_cause(derived, expected, letters),
        )


def _expression(derived: Any, expected: Any) -> Any:
    """What is expected as an expression; a plain number is one."""
    try:
        return 0 * derived + expected
    except TypeError:
        raise ParameterError(
            "a form is compared with a sympy expression in the letters of the train",
            got=f"form_equal: {expected!r:.60}",
            fix='form_equal(train, "cam", sympy.cos(theta)**2, behind=fa.H)',
        ) from None


def _cause(derived: Any, expected: Any, letters: list[Any]) -> str:
    """Letters whose sign explains the difference."""
    values = {letter: 0.37 + 0.21 * k for k, letter in enumerate(letters)}
    wanted = complex(expected.subs(values)) if letters else complex(expected)
    signs = [
        letter for letter in letters if abs(complex(derived.subs({**values, letter: -values[letter]})) - wanted) <= SAME
    ]
    return f"sign of {' or '.join(map(str, signs))}" if signs else "no letter's sign explains it"
