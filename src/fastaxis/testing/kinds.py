"""Kinds of things that an assertion is handed: another kind is told as a slip in the test."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from functools import wraps
from inspect import signature
from typing import Any, ParamSpec

import numpy as np
from numpy.typing import NDArray

from fastaxis.errors import ParameterError
from fastaxis.train import Train

__all__ = ["about_a_train", "an_array", "texts"]

P = ParamSpec("P")


def about_a_train(assertion: Callable[P, None]) -> Callable[P, None]:
    """The assertion, which first looks whether it is handed a train and, if it asks for one, the text of a port."""
    parameters = signature(assertion)
    port = next((name for name in parameters.parameters if name in ("port", "camera", "target")), None)

    @wraps(assertion)
    def looked_at(*args: P.args, **kwargs: P.kwargs) -> None:
        given = parameters.bind(*args, **kwargs).arguments
        _check_train(assertion.__name__, given["train"])
        if port is not None:
            _check_port(assertion.__name__, port, given[port])
        assertion(*args, **kwargs)

    return looked_at


def _check_train(assertion: str, train: object) -> None:
    if not isinstance(train, Train):
        raise ParameterError(
            "an assertion is about a train; that of a file is load_bench(path)",
            got=f"{assertion}: train = {train!r:.60}",
            fix=f"{assertion}(train, ...)",
        )


def _check_port(assertion: str, parameter: str, port: object) -> None:
    if not isinstance(port, str):
        raise ParameterError(
            f"a {parameter} is named by a text",
            got=f"{assertion}: {parameter} = {port!r:.60}",
            fix=f'{assertion}(train, "cam", ...)',
        )


def an_array(assertion: str, parameter: str, value: Any, kind: type, *, fix: str) -> NDArray[Any]:
    """Numbers, real or complex as ``kind`` says."""
    try:
        return np.asarray(value, kind)
    except (TypeError, ValueError):
        raise ParameterError(
            f"{parameter} is an array of numbers", got=f"{assertion}: {parameter} = {value!r:.60}", fix=fix
        ) from None


def texts(assertion: str, parameter: str, value: Iterable[str], *, fix: str) -> frozenset[str]:
    """A list of texts; one text alone would be taken letter by letter."""
    found = tuple(value) if isinstance(value, Iterable) and not isinstance(value, str) else (None,)
    if not all(isinstance(one, str) for one in found):
        raise ParameterError(
            f"{parameter} is a list of texts", got=f"{assertion}: {parameter} = {value!r:.60}", fix=fix
        )
    return frozenset(map(str, found))
