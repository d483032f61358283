"""Changed copies of the parts: by "name.parameter", and by letter."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.errors import ParameterError, WiringError
from fastaxis.train.ports import Elements, closest, named

__all__ = ["changed_elements", "refuse_unpaired"]


def refuse_unpaired(changes: object) -> None:
    """A ParameterError for changes that are no mapping from names to values."""
    if isinstance(changes, Mapping) and all(isinstance(key, str) for key in changes):
        return
    raise ParameterError(
        'changes are written {"part.parameter": value}',
        got=f"changes = {changes!r:.60}",
        fix='{"wavelength": 633*nm}',
    )


def _known(element: Element) -> list[str]:
    parameters = list(element.parameters())
    return [*parameters, "centre_x", "centre_y"] if "centre" in parameters else parameters


def _read(elements: Elements, key: str) -> tuple[str, str]:
    name, _, parameter = key.partition(".")
    if not parameter:
        _refuse_bare(elements, name)
    known = _known(named(elements, name))
    if parameter not in known:
        kind = type(elements[name]).__name__
        raise ParameterError(
            f"{kind} has the parameters {', '.join(known) or '(none)'}",
            got=f"{name}: no parameter '{parameter}'",
            fix=f'"{name}.{closest(parameter, known) or "name"}"',
        )
    return name, parameter


def _refuse_bare(elements: Elements, name: str) -> None:
    likely = closest(name, [*elements, "wavelength"]) or "wavelength"
    example = next(iter(_known(elements[likely])), "") if likely in elements else ""
    raise WiringError(
        'a change is written "name.parameter", or "wavelength"',
        got=f"'{name}': no parameter named",
        fix=f'"{likely}.{example}"' if example else '"wavelength"',
    )


def changed_elements(elements: Elements, changes: Mapping[str, Any]) -> dict[str, Element]:
    """The parts after changes {"name.parameter": value}; changes of one part are made together."""
    grouped: dict[str, dict[str, Any]] = {}
    for key, value in changes.items():
        name, parameter = _read(elements, key)
        grouped.setdefault(name, {})[parameter] = value
    return {
        name: element.changed(**grouped[name]) if name in grouped else element for name, element in elements.items()
    }
