"""Wiring: no laser, loops, doubly fed or impossible ports, cameras without light, parts nothing reaches."""

from __future__ import annotations

import warnings
from collections.abc import Iterator
from typing import Any

from fastaxis.errors import FastaxisWarning, WiringError, WiringWarning
from fastaxis.inspect.finding import Finding, Severity, from_message

__all__ = ["wiring"]


def wiring(train: Any) -> Iterator[Finding]:
    """Findings about joints. One of high severity from an error means that no light can be followed at all."""
    with warnings.catch_warnings(record=True) as said:
        warnings.simplefilter("always")
        try:
            train.validate()
        except WiringError as error:
            yield from_message(error, severity=Severity.HIGH, check="wiring", element=_named(train, error.got))
            return
    for message in said:
        if isinstance(message.message, WiringWarning):
            yield _dark(train, message.message)


def _dark(train: Any, warning: FastaxisWarning) -> Finding:
    name = _named(train, warning.got)
    ends = name in train.elements and train.elements[name].exit is None
    return from_message(warning, severity=Severity.HIGH if ends else Severity.MEDIUM, check="wiring", element=name)


def _named(train: Any, got: str) -> str:
    """The part a message begins with."""
    return str(max((name for name in train.elements if got.startswith(name)), key=len, default=train.name))
