"""How much light there is in the plane of a sensor, on it and beside it."""

from __future__ import annotations

import warnings
from collections.abc import Callable, Sequence
from typing import Any

from fastaxis.errors import SamplingWarning
from fastaxis.loader import late

__all__ = ["Arrival", "arrival"]

COMPLEX = 16  # bytes


class Arrival:
    """Power in the plane of a sensor [W]: a number, or a question that is asked once, when somebody wants to know.

    >>> Arrival(2).power, Arrival(lambda: 0.5).power
    (2.0, 0.5)
    """

    def __init__(self, power: float | Callable[[], float]) -> None:
        self._power = power

    @property
    def power(self) -> float:
        """[W]."""
        asked = self._power  # by several threads, perhaps
        if callable(asked):
            self._power = asked = asked()  # what the question held is let go
        return float(asked)

    def __reduce__(self) -> tuple[type[Arrival], tuple[float]]:
        """Only the answer goes to another process: a question holds whole planes of light."""
        return Arrival, (self.power,)


def arrival(plan: Any, fields: Sequence[Any], room: int) -> Arrival:
    """The power of mutually incoherent fields in the plane of the target of a plan.

    Of light that came by one way engines know it as they go, but for pictures of light that was scattered in an unknown
    state. Where several arms meet it is an integral over the whole plane, which takes as long as a picture: that is
    left until it is asked for. Fields with more samples than ``room`` [bytes] are not kept so long, the plan is
    followed again.
    """
    if not plan.joined:
        powers = [field.power for field in fields]
        return Arrival((lambda: _again(plan)) if None in powers else float(sum(powers)))
    if not all(hasattr(field, "at") for field in fields):  # pictures of earlier light
        return Arrival(lambda: _again(plan))
    samples = sum(branch.sampling.grid.samples**2 for branch in plan.branches if branch.sampling)
    if 2 * COMPLEX * samples <= room:  # two components
        return Arrival(lambda: _total(fields))
    return Arrival(lambda: _again(plan))


def _again(plan: Any) -> float:
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", SamplingWarning)  # it was said when the light was followed first
        return _total(late("engines", "propagate")(plan))


def _total(fields: Sequence[Any]) -> float:
    return float(sum(field.power for field in fields))
