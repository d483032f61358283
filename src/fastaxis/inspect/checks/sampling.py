"""Whether the light at each camera can be worked out on samples at all."""

from __future__ import annotations

import warnings
from collections.abc import Iterator
from typing import Any

from fastaxis.elements.camera import Camera
from fastaxis.errors import FastaxisError, SamplingError, SamplingWarning, WiringError
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity, from_message

__all__ = ["sampling"]


def sampling(bench: Bench) -> Iterator[Finding]:
    """The plan of each lit camera, with its warnings, and why powers are estimates where they are."""
    if bench.obstacle is not None:
        name = bench.train.name
        yield from_message(bench.obstacle, severity=Severity.MEDIUM, check="estimated powers", element=name)
    for name in dict.fromkeys(visit.name for visit in bench.of_kind(Camera)):
        yield from _planned(bench.train, name)


def _planned(train: Any, name: str) -> Iterator[Finding]:
    with warnings.catch_warnings(record=True) as said:
        warnings.simplefilter("always")
        try:
            train.plan(name)
        except SamplingError as error:
            yield from_message(error, severity=Severity.MEDIUM, check="sampling", element=name)
        except WiringError:
            return  # paths that meet: told by the checks of wiring and fringes
        except FastaxisError as error:
            yield from_message(error, severity=Severity.LOW, check="sampling", element=name)
    for message in said:
        if isinstance(message.message, SamplingWarning):
            yield from_message(message.message, severity=Severity.LOW, check="sampling", element=name)
