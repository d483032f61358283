"""JSON laid out for reading and comparing: objects one field a line, plain lists on one line."""

from __future__ import annotations

import json
from typing import Any

__all__ = ["laid_out"]


def laid_out(data: Any, indent: str = "") -> str:
    """The JSON text of plain data.

    >>> print(laid_out({"joints": [["laser.out", "cam.in"]], "shape": [2, 3]}))
    {
      "joints": [
        ["laser.out", "cam.in"]
      ],
      "shape": [2, 3]
    }
    """
    inner = indent + "  "
    if isinstance(data, dict) and data:
        items = [f"{inner}{_atom(key)}: {laid_out(value, inner)}" for key, value in data.items()]
        return "{\n" + ",\n".join(items) + f"\n{indent}}}"
    if isinstance(data, list | tuple) and any(isinstance(item, dict | list | tuple) for item in data):
        return "[\n" + ",\n".join(inner + laid_out(item, inner) for item in data) + f"\n{indent}]"
    return _atom(data)


def _atom(data: Any) -> str:
    return json.dumps(data, ensure_ascii=False, allow_nan=False)
