"""Which setting of an exposure is meant."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from fastaxis.camera.settings import Setting, as_setting
from fastaxis.errors import ParameterError
from fastaxis.light.states import State

__all__ = ["chosen"]


def chosen(
    which: int | str | Setting | State, settings: Sequence[Setting], labels: Sequence[str], target: str
) -> Setting:
    """The setting of this label or index; a state or setting stands for itself, exposed or not.

    Raises
    ------
    ParameterError : no setting of this label or index; a label of several that differ.
    """
    if isinstance(which, str):
        return _labelled(which, settings, labels, target)
    if isinstance(which, Setting | State):
        return as_setting(which)
    if isinstance(which, bool) or not hasattr(which, "__index__"):
        raise ParameterError(
            "a frame is asked for by label, index, state or setting",
            got=f"{target}: frame {which!r}",
            fix=f'shots.frame("{labels[0]}")',
        )
    if not -len(settings) <= which < len(settings):
        raise ParameterError(
            f"frames are counted from 0 to {len(settings) - 1}",
            got=f"{target}: frame {which}",
            fix=f"shots.frame({len(settings) - 1})",
        )
    return settings[which]


def _labelled(label: str, settings: Sequence[Setting], labels: Sequence[str], target: str) -> Setting:
    found = [setting for setting, name in zip(settings, labels, strict=True) if name == label]
    if not found:
        shown = ", ".join(labels[:8]) + (" ..." if len(labels) > 8 else "")
        raise ParameterError(
            f"the settings exposed are: {shown}",
            got=f"{target}: no setting is called '{label}'",
            fix=f'shots.frame("{labels[0]}")',
        )
    if any(not np.array_equal(other.weights, found[0].weights) for other in found[1:]):
        raise ParameterError(
            "a label asked for belongs to one setting: give each its own label=",
            got=f"{target}: {len(found)} settings are called '{label}'",
            fix=f"shots.frame({labels.index(label)})",
        )
    return found[0]
