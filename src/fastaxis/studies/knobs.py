"""What is swept: parameters and their values, every combination of them or side by side."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import ParameterError, SymbolError
from fastaxis.maths import free_symbols

__all__ = ["Knobs", "read_knobs"]

EXAMPLE = 'train.sweep({"hwp.fast": [k * 5*deg for k in range(36)]}, "cam", fa.SIX_STATES)'


@dataclass(frozen=True, eq=False)
class Knobs:
    """Parameters and the values they take.

    Parameters
    ----------
    values : parameter -> its values, in the order given.
    zipped : whether the parameters are changed together, one value of each at a time; else every combination
        is taken, the last parameter running fastest.
    """

    values: dict[str, tuple[Any, ...]]
    zipped: bool = False

    @property
    def names(self) -> tuple[str, ...]:
        """The parameters."""
        return tuple(self.values)

    @property
    def shape(self) -> tuple[int, ...]:
        """Number of values along each parameter; one number if they go together."""
        lengths = tuple(len(values) for values in self.values.values())
        return lengths[:1] if self.zipped else lengths

    def __len__(self) -> int:
        return math.prod(self.shape)

    def at(self, index: int) -> dict[str, Any]:
        """The value of each parameter at one place of the sweep."""
        places = np.unravel_index(index, self.shape)
        steps = places * len(self.values) if self.zipped else places
        return {name: values[step] for (name, values), step in zip(self.values.items(), steps, strict=True)}

    def groups(self) -> list[tuple[str, ...]]:
        """Parameters that must be looked at together: those of one part, or all that are zipped."""
        if self.zipped:
            return [self.names]
        parts: dict[str, tuple[str, ...]] = {}
        for name in self.names:
            part = name.partition(".")[0]
            parts[part] = (*parts.get(part, ()), name)
        return list(parts.values())

    def only(self, group: tuple[str, ...]) -> Knobs:
        """Some of the parameters."""
        return Knobs({name: self.values[name] for name in group}, self.zipped)

    def places(self, group: tuple[str, ...]) -> NDArray[np.intp]:
        """For each place of the sweep, its place in the sweep over some of the parameters alone."""
        everywhere = np.arange(len(self))
        if self.zipped:
            return everywhere
        steps = dict(zip(self.names, np.unravel_index(everywhere, self.shape), strict=True))
        own = self.only(group)
        return np.ravel_multi_index([steps[name] for name in own.names], own.shape)


def read_knobs(values: Mapping[str, Any], *, zipped: bool) -> Knobs:
    """The parameters of a sweep, checked.

    Raises
    ------
    ParameterError : no parameters, no values, values that are no list, or zipped lists of different lengths.
    SymbolError : a letter among the values.
    """
    if not isinstance(values, Mapping) or not values:
        raise ParameterError(
            'a sweep names at least one parameter as "name.parameter" and its values',
            got=f"sweep: {values!r}",
            fix=EXAMPLE,
        )
    knobs = Knobs({name: _listed(name, some) for name, some in values.items()}, zipped)
    lengths = {name: len(some) for name, some in knobs.values.items()}
    if zipped and len(set(lengths.values())) > 1:
        raise ParameterError(
            "parameters changed together have equally many values",
            got="sweep: " + ", ".join(f"{name} has {count}" for name, count in lengths.items()),
            fix="zipped=False",
        )
    return knobs


def _listed(name: str, values: Any) -> tuple[Any, ...]:
    if isinstance(values, str | bytes) or not hasattr(values, "__iter__"):
        raise ParameterError(
            "the values of a parameter are a list or an array", got=f"sweep: {name} = {values!r}", fix=EXAMPLE
        )
    listed = tuple(values.tolist() if isinstance(values, np.ndarray) and values.ndim == 1 else values)
    if not listed:
        raise ParameterError("a parameter is given at least one value", got=f"sweep: {name} has none", fix=EXAMPLE)
    letters = sorted(map(str, free_symbols(listed)))
    if letters:
        raise SymbolError(
            "a sweep goes through numbers; letters are for train.derive",
            got=f"sweep: {name} has the letter {letters[0]} among its values",
            fix=EXAMPLE,
        )
    return listed
