"""Values of parts as plain JSON data, and back: numbers, letters, arrays, states, modes, patterns."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from dataclasses import MISSING, fields, is_dataclass
from difflib import get_close_matches
from typing import Any

import numpy as np

from fastaxis.errors import FastaxisError, FileFormatError
from fastaxis.maths import is_symbolic
from fastaxis.train.ports import closest
from fastaxis.train.text_expressions import read_expression, write_expression

__all__ = ["Kinds", "build", "known_kind", "read_value", "refused", "write_fields", "write_value"]

Kinds = Mapping[str, type]


def refused(rule: str, got: str, fix: str) -> FileFormatError:
    return FileFormatError(rule, got=got, fix=fix)


def write_value(value: Any, where: str, kinds: Kinds) -> Any:
    """JSON data for one value; ``where`` names it in messages."""
    if is_symbolic(value):
        return write_expression(value)
    if isinstance(value, np.ndarray):
        return _write_array(value, where)
    value = value.item() if isinstance(value, np.generic) else value
    if isinstance(value, int | float | complex):
        return _write_number(value)
    if isinstance(value, tuple | list):
        return [write_value(item, where, kinds) for item in value]
    return value if value is None or isinstance(value, str) else _write_object(value, where, kinds)


def _write_number(value: complex) -> Any:
    if isinstance(value, complex):
        return {"complex": [_write_number(value.real), _write_number(value.imag)]}
    # JSON has no infinity, and some readers take NaN for a mistake: both are written as words.
    return value if math.isfinite(value) else {"number": repr(value)}


def _write_array(array: Any, where: str) -> dict[str, Any]:
    if array.dtype.kind not in "biufc" or not np.all(np.isfinite(array)):
        raise refused(
            "an array in a file holds finite numbers", f"{where}: array of {array.dtype}", "np.nan_to_num(array)"
        )
    imaginary = {"imaginary": array.imag.tolist()} if array.dtype.kind == "c" else {}
    return {"array": array.real.tolist(), **imaginary, "type": str(array.dtype)}


def _write_object(value: Any, where: str, kinds: Kinds) -> dict[str, Any]:
    kind = type(value).__name__
    if kinds.get(kind) is type(value):
        return {"kind": kind, **write_fields(value, where, kinds)}
    if callable(value):
        raise refused(
            "a function cannot be kept in a file: sample it to an array of cells first",
            f"{where}: a function",
            "fa.Pattern(f(x[None, :], y[:, None]), pixel=10*um)",
        )
    raise refused(
        "a file keeps numbers, letters, arrays, states, modes and patterns",
        f"{where}: a {kind}",
        f'train.with_changes({{"{where}": 0.0}})',
    )


def write_fields(value: Any, where: str, kinds: Kinds) -> dict[str, Any]:
    """The declared fields of a dataclass."""
    inner = ((f.name, getattr(value, f.name)) for f in fields(value) if f.init and f.name != "name")
    return {name: write_value(item, f"{where}.{name}", kinds) for name, item in inner}


def read_value(data: Any, where: str, kinds: Kinds) -> Any:
    """The value that :func:`write_value` wrote."""
    if data is None or isinstance(data, bool | str | int | float):
        return data
    if isinstance(data, list):
        return tuple(read_value(item, where, kinds) for item in data)
    if "kind" in data:
        return build(known_kind(data["kind"], where, kinds), data, where, kinds)
    for key, reader in _READERS.items():
        if key in data:
            return _guarded(reader, data, where)
    raise refused("an object in a file names its kind", f"{where}: {_short(data)}", '{"kind": "State", "azimuth": 0.0}')


def _read_number(data: Any) -> float:
    if isinstance(data, dict):
        words = {"inf": math.inf, "-inf": -math.inf, "nan": math.nan}
        return words[data["number"]]
    if not isinstance(data, int | float) or isinstance(data, bool):
        raise TypeError
    return data


def _read_complex(data: Mapping[str, Any]) -> complex:
    real, imaginary = data["complex"]
    # complex(a, b) and not a + 1j*b, which loses the sign of a zero.
    return complex(_read_number(real), _read_number(imaginary))


def _read_array(data: Mapping[str, Any]) -> Any:
    kind = np.dtype(data["type"])
    if kind.kind not in "biufc":
        raise TypeError
    if kind.kind != "c":
        return np.array(data["array"], dtype=kind)
    array = np.array(data["array"], dtype=kind)
    array.imag = np.array(data["imaginary"])
    return array


_READERS = {"expression": read_expression, "complex": _read_complex, "number": _read_number, "array": _read_array}


def _guarded(reader: Any, data: Mapping[str, Any], where: str) -> Any:
    try:
        return reader(data)
    except FastaxisError:
        raise
    except (KeyError, TypeError, ValueError, OverflowError):
        raise refused(
            "a number, complex number or array is written as it was saved",
            f"{where}: {_short(data)}",
            '{"array": [[0.0, 1.0], [1.0, 0.0]], "type": "float64"}',
        ) from None


def known_kind(name: Any, where: str, kinds: Kinds) -> type:
    """The class of this name, if it is one of those a file may hold."""
    if isinstance(name, str) and name in kinds:
        return kinds[name]
    raise refused(
        "a file holds kinds of part and of light that fastaxis knows",
        f"{where}: unknown kind {name!r}",
        f'"kind": "{(*get_close_matches(str(name), kinds, 1), "FreeSpace")[0]}"',
    )


def build(kind: type, data: Mapping[str, Any], where: str, kinds: Kinds, **extra: Any) -> Any:
    """An object of a kind from its stored fields, which may hold values of ``kinds``; its own checks apply."""
    stored = {
        key: read_value(item, f"{where}.{key}", kinds) for key, item in data.items() if key not in {"kind", *extra}
    }
    _check_fields(kind, [*stored, *extra], where)
    try:
        return kind(**stored, **extra)
    except FastaxisError:
        raise
    except (TypeError, ValueError, AttributeError, ArithmeticError) as error:
        raise refused(
            f"the fields of {kind.__name__} must be possible values ({' '.join(str(error).split())})",
            f"{where}: {_short(data)}",
            f"fa.{kind.__name__}",
        ) from error


def _check_fields(kind: type, given: Iterable[str], where: str) -> None:
    known = {f.name: f for f in fields(kind) if f.init} if is_dataclass(kind) else {}
    words = list(given)
    for word in words:
        if word not in known:
            raise refused(
                f"{kind.__name__} has the fields {', '.join(known)}",
                f"{where}: unknown field '{word}'",
                f'"{closest(word, known)}"',
            )
    for word, about in known.items():
        if word not in words and about.default is MISSING and about.default_factory is MISSING:
            raise refused(
                f"{kind.__name__} cannot be made without it", f"{where}: missing field '{word}'", f'"{word}": 0.0'
            )


def _short(data: Any) -> str:
    text = repr(data)
    return text if len(text) <= 60 else text[:57] + "..."
