"""Values and settings as they are asked for: by index, by name, or themselves."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

import numpy as np

from fastaxis.camera.settings import Setting, as_setting
from fastaxis.errors import ParameterError
from fastaxis.light.states import State
from fastaxis.studies.knobs import Knobs

__all__ = ["place_of", "setting_of"]

# Two ways of writing one angle (22.5*deg, pi/8) differ by a few roundings.
SAME = 1e-14


def place_of(knobs: Knobs, which: Any) -> int:
    """The place in a sweep of an index (negative from the end), of the one value swept, or of {parameter: value}.

    Raises
    ------
    ParameterError : it is none of them.
    """
    if isinstance(which, Mapping):
        return _place_of_values(knobs, which)
    if hasattr(which, "__index__") and not isinstance(which, bool):
        if not -len(knobs) <= which < len(knobs):
            raise ParameterError(
                f"values are counted from 0 to {len(knobs) - 1}, or from the end: -1 to {-len(knobs)}",
                got=f"sweep: value {which}",
                fix=f"sweep.at({len(knobs) - 1})",
            )
        return int(which) % len(knobs)
    if len(knobs.values) == 1:
        return _place_of_values(knobs, {knobs.names[0]: which})
    raise ParameterError(
        "a value is asked for by its index or as a dict of all swept parameters",
        got=f"sweep: {which!r}",
        fix=f"sweep.frame({knobs.at(0)!r}, 0)",
    )


def _place_of_values(knobs: Knobs, wanted: Mapping[str, Any]) -> int:
    if set(wanted) != set(knobs.names):
        raise ParameterError(
            f"a value of this sweep names {', '.join(knobs.names)}",
            got=f"sweep: {', '.join(map(str, wanted)) or 'nothing'}",
            fix=f"sweep.frame({knobs.at(0)!r}, 0)",
        )
    steps = [[_same(value, wanted[name]) for value in values] for name, values in knobs.values.items()]
    if knobs.zipped:
        steps = [[all(each) for each in zip(*steps, strict=True)]]
    if not all(any(step) for step in steps):
        raise ParameterError(
            "only values that were swept have frames",
            got="sweep: " + ", ".join(f"{name} = {value}" for name, value in wanted.items()),
            fix="sweep.values",
        )
    return int(np.ravel_multi_index([step.index(True) for step in steps], knobs.shape))


def _same(one: Any, other: Any) -> bool:
    if isinstance(one, int | float) and isinstance(other, int | float):
        return abs(one - other) <= SAME * max(abs(one), abs(other))
    return bool(np.all(one == other))


def setting_of(settings: Sequence[Setting], which: Any, target: str) -> Setting:
    """A setting of a sweep by label or index (negative from the end); or any state or setting.

    Raises
    ------
    ParameterError : no setting has this label or index.
    """
    if isinstance(which, Setting | State):
        return as_setting(which)
    labels = [setting.label for setting in settings]
    if isinstance(which, str) and which in labels:
        return settings[labels.index(which)]
    if isinstance(which, int | np.integer) and not isinstance(which, bool) and -len(settings) <= which < len(settings):
        return settings[int(which)]
    raise ParameterError(
        f"the settings of this sweep are: {', '.join(labels[:8])}{' ...' if len(labels) > 8 else ''}",
        got=f"{target}: no setting {which!r}",
        fix=f'sweep.frame(0, "{labels[0]}")',
    )
